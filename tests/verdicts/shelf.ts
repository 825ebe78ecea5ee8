import { vetFunctional } from '../../src/constraint/vet.ts';
import { conditionOf, functionalOf, shelf, standardSettings } from '../constraint/catalogue.ts';

export const tableFile = 'tests/verdicts/table.csv';
export const tableHead = 'functional,constraint,verdict,gate,margin,violated_share';

/**
 * The lines of the table of verdicts for one functional: every condition of the catalogue that has a margin and applies, on the
 * standard domain. Margins to four digits and shares to two, so that only what a reader would notice changes a line.
 */
export function verdictLines(id: string, onPoints: (points: number) => void = () => {}): string[] {
  // The rules of numerical quality have their own tests, and no margin to compare.
  const conditions = shelf
    .constraintIds()
    .map(conditionOf)
    .filter(({ kind }) => kind !== 'rule');
  const { findings } = vetFunctional(functionalOf(id), conditions, standardSettings, (_subject, points) =>
    onPoints(points),
  );
  return findings
    .filter(({ verdict }) => verdict !== 'not-applicable')
    .map(({ constraint, verdict, gate, margin, violatedShare }) =>
      [id, constraint, verdict, gate, shown(margin, 4), shown(violatedShare, 2)].join(','),
    );
}

function shown(value: number | null, digits: number): string {
  if (value === null) return '';
  // Below this a margin is a touch: round-off decides its digits.
  if (Math.abs(value) < 1e-11) return '0';
  return String(Number(value.toPrecision(digits)));
}
