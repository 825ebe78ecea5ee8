import type { Fault, Findings, FunctionalFindings, Remark } from '../finding/finding.ts';

/** Findings with remarks in the order of their places, each once, and faults; the same whichever way they were gathered. */
export function joinedFindings(
  versions: Pick<Findings, 'engineVersion' | 'catalogueVersion'>,
  functionals: readonly FunctionalFindings[],
  remarks: readonly Remark[],
  faults: readonly Fault[],
): Findings {
  const keyed = new Map(remarks.map((remark) => [keyOf(remark), remark]));
  const sorted = [...keyed].sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0)).map(([, remark]) => remark);
  return {
    format: 'rungcheck findings',
    formatVersion: 1,
    ...versions,
    functionals: [...functionals],
    ...(sorted.length === 0 ? {} : { remarks: sorted }),
    ...(faults.length === 0 ? {} : { faults: [...faults] }),
  };
}

function keyOf({ file, line, column, kind, functional, constraint }: Remark): string {
  return [file, String(line).padStart(8), String(column).padStart(8), kind, functional, constraint].join('\n');
}
