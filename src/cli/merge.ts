import { failure, type Outcome, type Problem, ProblemError, success } from '../errors/problem.ts';
import { usualTolerances } from '../finding/compare.ts';
import { type Findings, findingsSchema } from '../finding/finding.ts';
import { catalogueFolders } from './catalogue.ts';
import { readInputFile } from './input-file.ts';
import { joinedFindings } from './joined-findings.ts';
import { settle, wrongOption } from './problems.ts';
import { readProject } from './project-file.ts';
import { parseJson } from './state-file.ts';
import { checkTelling, tellFindings } from './tell.ts';
import type { Terminal } from './terminal.ts';
import type { TellOptions } from './vet-options.ts';

/** `rungcheck merge`: the findings of all shards of a run, as the run without shards would have told them. */
export async function mergeCommand(
  files: readonly string[],
  options: TellOptions & { readonly project?: string | false },
  terminal: Terminal,
): Promise<number> {
  const problems = checkTelling(options);
  const shards = files.flatMap((file) => {
    const read = readShard(file);
    if (!read.ok) problems.push(...read.problems);
    return read.ok ? [{ file, findings: read.value }] : [];
  });
  if (problems.length > 0) throw new ProblemError(problems);
  const project = settle(readProject(options.project));
  const constraintFolders = [...(options.constraints ?? []), ...(project?.constraintFolders ?? [])];
  const folders = settle(catalogueFolders(constraintFolders));
  const tolerances = { ...usualTolerances, ...project?.definition.compare };
  return tellFindings(settle(mergeShards(shards)), options, tolerances, folders, terminal);
}

interface Shard {
  readonly file: string;
  readonly findings: Findings;
}

/** All shards of one run joined; problems when one is missing, given twice, or of another run. */
export function mergeShards(shards: readonly Shard[]): Outcome<Findings> {
  const [first] = shards;
  if (first === undefined) return failure([wrongOption('no shard is named', 'Name the findings files of all shards.')]);
  const { count = 0, sheets = [] } = first.findings.shard ?? {};
  const problems: Problem[] = [];
  const places = new Map<number, Shard>();
  for (const shard of shards) {
    const index = shard.findings.shard?.index ?? 0;
    const other = places.get(index);
    if (runOf(shard.findings) !== runOf(first.findings)) {
      problems.push(wrongShard(shard.file, `the file is of another run than ${first.file}`));
    } else if (other !== undefined) problems.push(wrongShard(shard.file, `shard ${index} is in ${other.file} too`));
    places.set(index, shard);
  }
  const indices = Array.from({ length: count }, (_, place) => place + 1);
  const missing = indices.filter((index) => !places.has(index));
  if (missing.length > 0) {
    const which = `${missing.length === 1 ? 'shard' : 'shards'} ${missing.join(', ')} of ${count}`;
    problems.push(wrongOption(`${which} not given`, 'Name the findings files of all shards.'));
  }
  if (problems.length > 0) return failure(problems);
  const ordered = indices.map((index) => (places.get(index) as Shard).findings);
  const queues = ordered.map(({ functionals, faults = [] }) => ({
    functionals: [...functionals],
    faults: [...faults],
  }));
  const functionals: Findings['functionals'] = [];
  const faults: NonNullable<Findings['faults']> = [];
  sheets.forEach((sheet, place) => {
    const queue = queues[place % count];
    const fault = queue?.faults[0]?.sheet === sheet ? queue.faults.shift() : undefined;
    const functional = fault === undefined ? queue?.functionals.shift() : undefined;
    if (fault !== undefined) faults.push(fault);
    if (functional !== undefined) functionals.push(functional);
  });
  const { engineVersion, catalogueVersion } = first.findings;
  const remarks = ordered.flatMap((findings) => findings.remarks ?? []);
  return success(joinedFindings({ engineVersion, catalogueVersion }, functionals, remarks, faults));
}

/** What all shards of one run have in common. */
function runOf({ engineVersion, catalogueVersion, shard }: Findings): string {
  return JSON.stringify([engineVersion, catalogueVersion, shard?.count, shard?.sheets]);
}

function readShard(file: string): Outcome<Findings> {
  const text = readInputFile(file);
  if (!text.ok) return text;
  const data = parseJson(text.value);
  const read = findingsSchema.safeParse(data);
  // The data itself, so that the keys keep their order.
  if (read.success && read.data.shard !== undefined) return success(data as Findings);
  return failure([
    wrongShard(file, read.success ? 'the findings are not those of a shard' : 'the file has no findings'),
  ]);
}

function wrongShard(file: string, message: string): Problem {
  const remedy = 'Write each shard with rungcheck vet … --shard i/n --format json --out file.';
  return { code: 'wrong-state', file, message, remedy };
}
