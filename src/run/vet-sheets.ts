import { dirname, join, relative } from 'node:path';
import { ProblemError } from '../errors/problem.ts';
import type { Fault, FunctionalFindings, SheetPlaces } from '../finding/finding.ts';
import { findFile, isSheetPath, type ShelfFolders, shownPath } from '../shelf/sheet-files.ts';
import type { UnitAnswer } from './answer.ts';
import { type Cache, keyOf } from './cache.ts';
import { catalogueVersion } from './catalogue-version.ts';
import type { Pool } from './pool.ts';
import { readUses } from './read-uses.ts';
import type { RunSettings } from './settings.ts';
import { openSources, type Sources } from './sources.ts';
import type { Unit, UnitFinding } from './vetter.ts';

export interface VetRun {
  /** Ids, or paths of sheets. */
  readonly sheets: readonly string[];
  /** Ids of conditions, in the order of the findings. */
  readonly constraints: readonly string[];
  readonly folders: ShelfFolders;
  /** The folder of functionals that is the catalogue. */
  readonly catalogue: string;
  readonly settings: RunSettings;
  readonly cache: Cache;
  /** Changes with the program. */
  readonly engine: string;
  readonly pool: Pool;
  readonly onProgress: (subject: string, points: number) => void;
  /** Told of every finding as soon as there is one. */
  readonly onFound?: ((found: UnitFinding) => void) | undefined;
}

export interface Vetted {
  readonly functionals: readonly FunctionalFindings[];
  /** Of the sheets that could not be vetted. */
  readonly faults: readonly Fault[];
  readonly catalogueVersion: string;
  /** The files that the answer depends on. */
  readonly files: ReadonlySet<string>;
}

/**
 * Vets sheets against conditions: findings that the cache has are taken from it, the others are found by the pool. The
 * answer is the same whatever the cache and the pool. A faulty condition throws a ProblemError; a faulty sheet does not
 * keep the others from being vetted.
 */
export async function vetSheets(run: VetRun): Promise<Vetted> {
  const { sheets, constraints, folders, settings, cache, pool } = run;
  const sources = openSources(folders, cache, readUses);
  await checkConditions(run, sources);
  const hashes = new Map<string, string | undefined>();
  for (const sheet of sheets) hashes.set(sheet, await sources.functionalHash(sheet));
  const keys = new Map<Unit, string | undefined>();
  const answers = new Map<string, Map<string, UnitAnswer>>(sheets.map((sheet) => [sheet, new Map()]));
  const missing: Unit[] = [];
  for (const sheet of answers.keys()) {
    for (const constraint of constraints) {
      const unit = { sheet, constraint };
      const key = unitKey(run, hashes.get(sheet), await sources.constraintHash(constraint), constraint);
      const found = key === undefined ? undefined : (cache.read(key) as UnitFinding | undefined);
      if (found !== undefined) {
        answers.get(sheet)?.set(constraint, { kind: 'found', found });
        run.onFound?.(found);
      } else {
        keys.set(unit, key);
        missing.push(unit);
      }
    }
  }
  await pool.run({ kind: 'begin', folders, settings }, missing, {
    onProgress: run.onProgress,
    onAnswer(unit, answer) {
      answers.get(unit.sheet)?.set(unit.constraint, settled(answer, hashes.get(unit.sheet)));
      if (answer.kind === 'found') run.onFound?.(answer.found);
      const key = keys.get(unit);
      if (answer.kind === 'found' && key !== undefined && answer.found.sheetHash === hashes.get(unit.sheet)) {
        cache.write(key, answer.found);
      }
    },
  });
  const outcomes = sheets.map((sheet) => joined(run, sheet, answers.get(sheet) as Map<string, UnitAnswer>));
  return {
    functionals: outcomes.flatMap((outcome) => ('findings' in outcome ? [outcome] : [])),
    faults: outcomes.flatMap((outcome) => ('problems' in outcome ? [outcome] : [])),
    catalogueVersion: catalogueVersion(constraints.map((id) => ({ id, text: sources.constraintText(id) ?? '' }))),
    files: sources.files,
  };
}

/** Reads the conditions that are not known to be sound; every problem of all of them at once. */
async function checkConditions({ constraints, folders, settings, cache, engine }: VetRun, sources: Sources) {
  const unknown: { readonly id: string; readonly key: string | undefined }[] = [];
  for (const id of constraints) {
    const hash = await sources.constraintHash(id);
    const key = hash === undefined ? undefined : keyOf('sound condition', engine, hash);
    if (key === undefined || cache.read(key) !== true) unknown.push({ id, key });
  }
  if (unknown.length === 0) return;
  const { Vetter } = await import('./vetter.ts');
  const vetter = new Vetter(folders, settings);
  const problems = unknown.flatMap(({ id, key }) => {
    const condition = vetter.condition(id);
    if (condition.ok && key !== undefined) cache.write(key, true);
    return condition.ok ? [] : condition.problems;
  });
  if (problems.length > 0) throw new ProblemError(problems);
}

function unitKey(
  { engine, settings }: VetRun,
  sheet: string | undefined,
  condition: string | undefined,
  constraint: string,
): string | undefined {
  if (sheet === undefined || condition === undefined) return undefined;
  const { tolerances, ...others } = settings;
  const sorted = (values: Readonly<Record<string, string>>) =>
    Object.entries(values).sort(([a], [b]) => (a < b ? -1 : 1));
  const plain = {
    ...others,
    constants: sorted(settings.constants),
    parameters: sorted(settings.parameters),
    tolerance: tolerances[constraint] ?? null,
  };
  return keyOf('finding', engine, sheet, condition, JSON.stringify(plain));
}

/** A finding for another text than the one that was read first is none. */
function settled(answer: UnitAnswer, hash: string | undefined): UnitAnswer {
  if (answer.kind !== 'found' || hash === undefined || answer.found.sheetHash === hash) return answer;
  const message = 'the sheet, or one that it uses, was changed while it was being vetted';
  return { kind: 'problems', problems: [{ code: 'changed-meanwhile', message, remedy: 'Run it again.' }] };
}

function joined(run: VetRun, sheet: string, answers: ReadonlyMap<string, UnitAnswer>): FunctionalFindings | Fault {
  const all = run.constraints.map((constraint) => answers.get(constraint) as UnitAnswer);
  const faults = all.flatMap((answer) => (answer.kind === 'fault' ? [answer.message] : []));
  const problems = all.flatMap((answer) => (answer.kind === 'problems' ? answer.problems : []));
  if (faults.length > 0 || problems.length > 0) {
    const internal = faults.map((text) => ({
      code: 'internal',
      message: `internal fault while vetting ${sheet}: ${text.split('\n')[0]}`,
      remedy: 'This is a fault of rungcheck itself; the other sheets were vetted.',
    }));
    return { sheet, internal: faults.length > 0, problems: unique([...internal, ...problems]) };
  }
  const found = all.flatMap((answer) => (answer.kind === 'found' ? [answer.found] : []));
  const [first] = found as [UnitFinding];
  return {
    ...first.functional,
    findings: found.map(({ finding }) => finding),
    places: { ...fileOf(run, sheet), ...first.places },
  };
}

function unique<Item extends { readonly message: string }>(problems: readonly Item[]): Item[] {
  const seen = new Set<string>();
  return problems.filter((problem) => {
    const text = JSON.stringify(problem);
    return !seen.has(text) && seen.add(text);
  });
}

/** The sheet as a report names it: from the current folder, or from the root of the catalogue. */
function fileOf({ folders, catalogue }: VetRun, sheet: string): Pick<SheetPlaces, 'file' | 'catalogue'> {
  const path = isSheetPath(sheet) ? sheet : (findFile(folders.functionals, sheet) ?? sheet);
  const slashed = (text: string) => text.replaceAll('\\', '/');
  const isOwn = isSheetPath(sheet) || dirname(path) !== catalogue;
  return isOwn
    ? { file: slashed(shownPath(path)), catalogue: false }
    : { file: slashed(relative(join(catalogue, '..'), path)), catalogue: true };
}
