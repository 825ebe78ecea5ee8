import type { Finding, FunctionalFindings, Gate, Verdict } from '../finding/finding.ts';
import { type Column, padEnd, setColumns, textWidth, wrap } from './layout.ts';
import { countText, percentText, shortText, signedText } from './number-text.ts';
import type { Paint } from './paint.ts';
import { forceNames, gateWords, knownCoordinates, placeWords, verdictMarks, verdictStyle } from './words.ts';

const verdictOrder: readonly Verdict[] = ['violated', 'undecided', 'holds', 'proved', 'not-applicable'];
const gateOrder: readonly Gate[] = ['fail', 'warn', 'note', 'score', 'accepted', 'pass'];

/** Worst first: by verdict, then by what it counts as; otherwise in the order given. */
export function worstFirst(findings: readonly Finding[]): Finding[] {
  return [...findings].sort(
    (a, b) =>
      verdictOrder.indexOf(a.verdict) - verdictOrder.indexOf(b.verdict) ||
      gateOrder.indexOf(a.gate) - gateOrder.indexOf(b.gate),
  );
}

/** Below this width the table leaves out the place, which the paragraphs below it give. */
const widthWithPlace = 96;
/** From this width on it has the force of the local form as well. */
const widthWithForce = 124;
/** A place is wrapped rather than given less than this. */
const narrowestPlace = 18;

/** One line for each finding that applies: verdict, margin, violated share, worst place. */
export function overviewLines(functional: FunctionalFindings, width: number, paint: Paint): string[] {
  const { findings } = functional;
  const known = knownCoordinates(functional);
  const rows = worstFirst(findings).filter(({ verdict }) => verdict !== 'not-applicable');
  if (rows.length === 0) return [];
  const withForce = width >= widthWithForce;
  const columns: Column[] = [
    { heading: '  verdict', align: 'left' },
    { heading: 'condition', align: 'left' },
    { heading: 'margin', align: 'right' },
    { heading: 'violated', align: 'right' },
    { heading: 'counts as', align: 'left' },
    ...(withForce ? [{ heading: 'local form is', align: 'left' } as const] : []),
  ];
  const cells = rows.map((finding) => [
    `${verdictMarks[finding.verdict].symbol} ${verdictMarks[finding.verdict].word}`,
    finding.constraint,
    marginText(finding),
    shareText(finding),
    gateWords[finding.gate],
    ...(withForce ? [forceNames[finding.force]] : []),
  ]);
  // The last column is padded too where the place follows it.
  const [heading, ...lines] = setColumns([...columns, { heading: '', align: 'left' }], cells) as [
    string[],
    ...string[][],
  ];
  const used = textWidth(heading.slice(0, -1).join('  '));
  const room = width - used - 2;
  const withPlace = width >= widthWithPlace && room >= narrowestPlace;
  const line = (cellsOf: readonly string[]) => cellsOf.slice(0, -1).join('  ').trimEnd();
  return [
    paint('faint', withPlace ? `${padEnd(line(heading), used)}  worst or closest at` : line(heading)),
    ...rows.flatMap((finding, index) => {
      const [verdict = '', ...rest] = (lines[index] as string[]).slice(0, -1);
      const place = withPlace ? wrap(placeOf(finding, known), room) : [];
      const tail = withPlace ? rest.join('  ') : rest.join('  ').trimEnd();
      const first = `${paint(verdictStyle(finding.verdict, finding.gate), verdict)}  ${tail}`;
      return [
        withPlace ? `${first}  ${place[0] ?? ''}`.trimEnd() : first,
        ...place.slice(1).map((part) => `${' '.repeat(used)}  ${part}`),
      ];
    }),
  ];
}

/** The margin for a glance; `≈ 0` where it is zero but for round-off and the condition holds. */
export function marginText({ margin, verdict, tolerance }: Finding): string {
  if (margin === null) return '';
  if (verdict !== 'violated' && margin !== 0 && Math.abs(margin) <= Math.min(tolerance, 1e-9)) return '≈ 0';
  return signedText(margin);
}

/** An identity that holds exactly has no worst point. */
function placeOf(finding: Finding, known: readonly string[]): string {
  const isIdentity = finding.verdict === 'holds' && finding.margin === 0 && finding.domain.space === 'spin';
  return isIdentity ? '' : placeWords(finding, known);
}

function shareText({ verdict, violatedShare, points, rule }: Finding): string {
  // A rule looks at other things than points of the domain.
  if (rule === true) return '';
  if (verdict === 'proved') return 'nowhere';
  if (verdict === 'holds') return `0 of ${countText(points)}`;
  if (verdict !== 'violated' || violatedShare === null) return '';
  return percentText(violatedShare);
}

/** `1e-9`, or which conditions have which tolerance. */
export function toleranceWords(findings: readonly Finding[]): string {
  const groups = groupBy(
    findings.filter(({ verdict, rule }) => verdict !== 'not-applicable' && rule !== true),
    ({ tolerance, relative }) => `${shortText(tolerance)}${relative ? ' (relative)' : ''}`,
  ).sort(([, a], [, b]) => b.length - a.length);
  const [most, ...others] = groups;
  if (most === undefined) return '';
  return [most[0], ...others.map(([text, group]) => `${text} for ${idsOf(group)}`)].join('; ');
}

export function idsOf(findings: readonly Finding[]): string {
  return findings.map(({ constraint }) => constraint).join(', ');
}

export function groupBy<Item>(items: readonly Item[], keyOf: (item: Item) => string): [string, Item[]][] {
  const groups = new Map<string, Item[]>();
  for (const item of items) {
    const group = groups.get(keyOf(item));
    if (group === undefined) groups.set(keyOf(item), [item]);
    else group.push(item);
  }
  return [...groups];
}
