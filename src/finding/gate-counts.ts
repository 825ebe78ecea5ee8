import type { Finding, Findings, Gate, Verdict } from './finding.ts';

/** How many findings have each verdict, and how many of the violated ones count as what. */
export interface FindingCounts {
  readonly verdicts: Readonly<Record<Verdict, number>>;
  readonly gates: Readonly<Record<Gate, number>>;
}

export function countFindings(findings: readonly Finding[]): FindingCounts {
  const verdicts: Record<Verdict, number> = { proved: 0, holds: 0, violated: 0, undecided: 0, 'not-applicable': 0 };
  const gates: Record<Gate, number> = { fail: 0, warn: 0, note: 0, score: 0, accepted: 0, pass: 0 };
  for (const { verdict, gate } of findings) {
    verdicts[verdict]++;
    gates[gate]++;
  }
  return { verdicts, gates };
}

/** 1 when a finding of any functional fails, else 0. */
export function exitStatusOf({ functionals }: Findings): 0 | 1 {
  return functionals.some(({ findings }) => findings.some(({ gate }) => gate === 'fail')) ? 1 : 0;
}
