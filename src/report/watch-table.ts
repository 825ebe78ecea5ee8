import type { Change } from '../finding/compare.ts';
import type { Finding, Findings, FunctionalFindings } from '../finding/finding.ts';
import { changeText } from './compare-text.ts';
import { labelled, setColumns } from './layout.ts';
import { percentText, signedText } from './number-text.ts';
import { makePaint, type Paint } from './paint.ts';
import { worstFirst } from './vet-overview.ts';
import { gateWords, knownCoordinates, placeWords, verdictMarks, verdictStyle } from './words.ts';

const marks: Record<Change['direction'], string> = { worse: '▼', better: '▲', other: '·' };

/** Findings in one line each, those that have changed marked, and those not looked at again yet; what has changed below. */
export function watchTable(
  findings: Findings,
  changes: readonly Change[],
  options: { readonly width: number; readonly colour: boolean },
  pending: (functional: string, constraint: string) => boolean = () => false,
): string {
  const paint = makePaint(options.colour);
  const width = Math.max(60, options.width);
  const tables = findings.functionals.map((functional) => functionalLines(functional, changes, paint, pending));
  const told = changes.flatMap((change) =>
    labelled(marks[change.direction], changeText(change), 2, width).map((line) => paint('strong', line)),
  );
  return [...tables, ...(told.length === 0 ? [] : [told])].map((lines) => `${lines.join('\n')}\n\n`).join('');
}

function functionalLines(
  functional: FunctionalFindings,
  changes: readonly Change[],
  paint: Paint,
  pending: (functional: string, constraint: string) => boolean,
): string[] {
  const known = knownCoordinates(functional);
  const rows = worstFirst(functional.findings).filter(({ verdict }) => verdict !== 'not-applicable');
  const left = (heading: string) => ({ heading, align: 'left' as const });
  const right = (heading: string) => ({ heading, align: 'right' as const });
  const columns = [
    left(' '),
    left('verdict'),
    left('condition'),
    right('margin'),
    right('violated'),
    left('counts as'),
    left('at'),
  ];
  const cells = rows.map((finding) => [
    pending(functional.id, finding.constraint) ? '…' : markOf(functional, finding, changes),
    `${verdictMarks[finding.verdict].symbol} ${verdictMarks[finding.verdict].word}`,
    finding.constraint,
    finding.margin === null ? '' : signedText(finding.margin),
    finding.verdict === 'violated' && finding.violatedShare !== null ? percentText(finding.violatedShare) : '',
    gateWords[finding.gate],
    finding.verdict === 'violated' ? placeWords(finding, known).replaceAll('\u00a0', ' ') : '',
  ]);
  const [heading, ...lines] = setColumns(columns, cells).map((line) => line.join('  ').trimEnd());
  return [
    paint('strong', functional.name),
    paint('faint', heading ?? ''),
    ...lines.map((line, index) => {
      const { verdict, gate } = rows[index] as Finding;
      return paint(verdictStyle(verdict, gate), line);
    }),
  ];
}

function markOf({ id }: FunctionalFindings, { constraint }: Finding, changes: readonly Change[]): string {
  const own = changes.find((change) => change.functional === id && change.constraint === constraint);
  return own === undefined ? ' ' : marks[own.direction];
}
