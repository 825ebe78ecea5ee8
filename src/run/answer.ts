import type { Problem } from '../errors/problem.ts';
import type { RecheckWork } from '../proof/recheck.ts';
import type { Block } from '../search/box-blocks.ts';
import type { ShelfFolders } from '../shelf/sheet-files.ts';
import type { RunSettings } from './settings.ts';
import type { Unit, UnitFinding, Vetter } from './vetter.ts';

/** What a worker is told. */
export type Order =
  | { readonly kind: 'begin'; readonly folders: ShelfFolders; readonly settings: RunSettings }
  | { readonly kind: 'unit'; readonly unit: Unit }
  /** To make ready for the boxes of the claim of a unit, which has this identity. */
  | { readonly kind: 'claim'; readonly unit: Unit; readonly identity: string }
  | { readonly kind: 'boxes'; readonly block: Block }
  /** To make ready for boxes of a certificate. */
  | { readonly kind: 'recheck'; readonly work: RecheckWork }
  | { readonly kind: 'leaves'; readonly boxes: Float64Array<ArrayBuffer> };

/** What becomes of a unit: a finding, faults of the user, or a fault of the program. */
export type UnitAnswer =
  | { readonly kind: 'found'; readonly found: UnitFinding }
  | { readonly kind: 'problems'; readonly problems: readonly Problem[] }
  | { readonly kind: 'fault'; readonly message: string };

export interface Progress {
  readonly kind: 'progress';
  readonly subject: string;
  readonly points: number;
}

/**
 * What a worker says: to a claim or a certificate that it is ready, to boxes their judgements, with the block that was
 * lent, to boxes of a certificate the first that does not hold.
 */
export type Answer =
  | UnitAnswer
  | Progress
  | { readonly kind: 'ready' }
  | { readonly kind: 'rechecked'; readonly failing: number }
  | {
      readonly kind: 'judged';
      readonly block: Block;
      readonly judgements: Int8Array<ArrayBuffer>;
    };

/** Never throws: a fault of the program in one unit must not end the others. */
export function answerUnit(
  vetter: Vetter,
  unit: Unit,
  onProgress: (subject: string, points: number) => void,
): UnitAnswer {
  try {
    const outcome = vetter.vet(unit, onProgress);
    return outcome.ok ? { kind: 'found', found: outcome.value } : { kind: 'problems', problems: outcome.problems };
  } catch (error) {
    return { kind: 'fault', message: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}
