import type { Problem } from '../errors/problem.ts';
import type { ShelfFolders } from '../shelf/sheet-files.ts';
import type { RunSettings } from './settings.ts';
import type { Unit, UnitFinding, Vetter } from './vetter.ts';

/** What a worker is told. */
export type Order =
  | { readonly kind: 'begin'; readonly folders: ShelfFolders; readonly settings: RunSettings }
  | { readonly kind: 'unit'; readonly unit: Unit };

/** What becomes of a unit: a finding, faults of the user, or a fault of the program. */
export type UnitAnswer =
  | { readonly kind: 'found'; readonly found: UnitFinding }
  | { readonly kind: 'problems'; readonly problems: readonly Problem[] }
  | { readonly kind: 'fault'; readonly message: string };

/** What a worker says. */
export type Answer = UnitAnswer | { readonly kind: 'progress'; readonly subject: string; readonly points: number };

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
