import { homedir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { applyAcceptances, strayAcceptances } from '../finding/acceptance.ts';
import type { Findings } from '../finding/finding.ts';
import { type Cache, noCache, openCache, pruneCache } from '../run/cache.ts';
import { openPool, type Pool } from '../run/pool.ts';
import { builtFolder, programHash } from '../run/program-files.ts';
import { vetSheets } from '../run/vet-sheets.ts';
import type { UnitFinding } from '../run/vetter.ts';
import { sheetId } from '../shelf/sheet-files.ts';
import { hintAtOwnSheet } from './catalogue.ts';
import { joinedFindings } from './joined-findings.ts';
import { packageVersion } from './package-root.ts';
import type { ProgressLine } from './progress.ts';
import type { VetRequest } from './vet-request.ts';

/** What stays from one run to the next while sheets are watched. */
export interface Workshop {
  readonly pool: Pool;
  readonly cache: Cache;
  /** Changes with the program. */
  readonly engine: string;
  readonly close: () => Promise<void>;
}

/** Days after which an entry of the cache that nothing has renewed is removed. */
const daysKept = 90;

/**
 * Worker threads, so that this thread can answer signals, and the cache. Without a build (in tests) everything is done
 * in this thread, and there is no cache unless a folder is named.
 */
export async function openWorkshop(jobs: number, cacheOption: string | false | undefined): Promise<Workshop> {
  const built = builtFolder();
  const engine = built === undefined ? 'source' : programHash(built);
  const folder = cacheOption ?? (built === undefined ? false : usualCacheFolder(process.env, process.platform));
  const pool =
    built === undefined
      ? (await import('../run/inline-pool.ts')).inlinePool
      : openPool(pathToFileURL(join(built, 'worker.js')), jobs);
  return {
    pool,
    cache: folder === false ? noCache : openCache(folder),
    engine,
    async close() {
      await pool.close();
      if (folder !== false && Math.random() < 0.02) pruneCache(folder, daysKept, Date.now());
    },
  };
}

/** The folder for caches of the platform: XDG_CACHE_HOME, ~/Library/Caches, LOCALAPPDATA, else ~/.cache. */
export function usualCacheFolder(environment: Readonly<Record<string, string | undefined>>, platform: string): string {
  const { XDG_CACHE_HOME, LOCALAPPDATA } = environment;
  if (XDG_CACHE_HOME !== undefined && XDG_CACHE_HOME !== '') return join(XDG_CACHE_HOME, 'rungcheck');
  if (platform === 'win32' && LOCALAPPDATA !== undefined) return join(LOCALAPPDATA, 'rungcheck', 'cache');
  return join(homedir(), ...(platform === 'darwin' ? ['Library', 'Caches'] : ['.cache']), 'rungcheck');
}

export interface VetRunResult {
  readonly findings: Findings;
  /** The files that they depend on. */
  readonly files: ReadonlySet<string>;
}

/** The findings of a request, with what the project accepts, and the faults of the sheets that could not be vetted. */
export async function runVet(
  request: VetRequest,
  workshop: Workshop,
  progress: ProgressLine,
  today: string,
  onFound?: (found: UnitFinding) => void,
): Promise<VetRunResult> {
  const { shard, folders, acceptances, constraints } = request;
  const sheets = request.sheets.filter((_, place) => shard === undefined || place % shard.count === shard.index - 1);
  const vetted = await vetSheets({
    sheets,
    constraints,
    folders,
    catalogue: folders.functionals.at(-1) as string,
    settings: request.settings,
    cache: workshop.cache,
    engine: workshop.engine,
    pool: workshop.pool,
    onProgress: progress.report,
    onFound,
  });
  progress.end();
  const { functionals, remarks } = applyAcceptances(vetted.functionals, acceptances, today);
  const stray = request.complete ? strayAcceptances(acceptances, request.sheets.map(sheetId), constraints) : [];
  const findings = joinedFindings(
    { engineVersion: packageVersion(), catalogueVersion: vetted.catalogueVersion },
    functionals,
    [...remarks, ...stray],
    vetted.faults.map((fault) => ({
      ...fault,
      problems: fault.problems.map((problem) => hintAtOwnSheet(problem, fault.sheet)),
    })),
  );
  const withShard = shard === undefined ? findings : { ...findings, shard: { ...shard, sheets: [...request.sheets] } };
  return { findings: withShard, files: vetted.files };
}
