import type { RunReport } from './run-report.ts';

/** One JSON object a line, each with its `type`: run, functional, finding, remark, fault, change. */
export function jsonLines({ findings, comparison }: RunReport): string {
  const { functionals, remarks = [], faults = [], shard: _shard, ...run } = findings;
  const lines: object[] = [
    { type: 'run', ...run },
    ...functionals.flatMap(({ findings: found, ...functional }) => [
      { type: 'functional', ...functional },
      ...found.map((finding) => ({ type: 'finding', functional: functional.id, ...finding })),
    ]),
    ...remarks.map((remark) => ({ type: 'remark', ...remark })),
    ...faults.map((fault) => ({ type: 'fault', ...fault })),
    ...(comparison === null ? [] : [{ type: 'comparison', circumstances: comparison.circumstances }]),
    ...(comparison?.changes ?? []).map((change) => ({ type: 'change', ...change })),
  ];
  return lines.map((line) => `${JSON.stringify(line)}\n`).join('');
}
