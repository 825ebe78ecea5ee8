import type { Change, ChangeKind, Comparison } from '../finding/compare.ts';
import type { StateLine } from '../finding/state.ts';
import { labelled } from './layout.ts';
import { percentText, shortText, signedText } from './number-text.ts';
import { makePaint, type Style } from './paint.ts';
import { gateWords, verdictMarks } from './words.ts';

const styles: Record<Change['direction'], Style> = { worse: 'red', better: 'green', other: 'faint' };
const marks: Record<Change['direction'], string> = { worse: '▼ worse', better: '▲ better', other: '· other' };
const labelWidth = 10;

/** What differs between two states, for a reader: circumstances first, then worse, better, other, and a last line. */
export function comparisonText(
  comparison: Comparison,
  options: { readonly width: number; readonly colour: boolean },
): string {
  const paint = makePaint(options.colour);
  const width = Math.max(60, options.width);
  const { circumstances, changes } = comparison;
  const said = circumstances.flatMap(({ what, before, after }) =>
    labelled('! differs', `${what}: recorded ${before}, now ${after}`, labelWidth, width).map((line) =>
      paint('yellow', line),
    ),
  );
  const told = changes.flatMap((change) =>
    labelled(marks[change.direction], changeText(change), labelWidth, width).map((line) =>
      paint(styles[change.direction], line),
    ),
  );
  return `${[...said, ...told, ...labelled('', summary(comparison), 0, width)].join('\n')}\n`;
}

/** `pbe lieb-oxford: margin -0.01 → -0.02`. */
export function changeText({ kind, functional, constraint, before, after }: Change): string {
  const subject = constraint === null ? functional : `${functional} ${constraint}`;
  return `${subject}: ${words[kind](before, after)}`;
}

type Words = (before: StateLine | null, after: StateLine | null) => string;

const words: Record<ChangeKind, Words> = {
  'new-violation': (before, after) =>
    `violated${lineDetails(after)}, ${before === null ? 'not recorded before' : `recorded: ${verdictOf(before)}`}`,
  'violation-gone': (before, after) => `no longer violated: ${verdictOf(after)}${marginStep(before, after)}`,
  verdict: (before, after) => `${verdictOf(before)} → ${verdictOf(after)}${marginStep(before, after)}`,
  gate: (before, after) => `counts as ${gateOf(after)}, recorded: ${gateOf(before)}`,
  margin: (before, after) => `${verdictOf(after)}${marginStep(before, after)}`,
  share: (before, after) => `violated share ${shareOf(before)} → ${shareOf(after)}`,
  'functional-gone': () => 'recorded, and not vetted now',
  'condition-gone': (before) => `recorded as ${verdictOf(before)}, and not asked now`,
  'functional-new': () => 'not recorded before',
  'condition-new': (_before, after) => `${verdictOf(after)}, not recorded before`,
};

function lineDetails(line: StateLine | null): string {
  if (line === null) return '';
  const margin = line.margin === null ? '' : `, margin ${signedText(line.margin, 6)}`;
  return `${margin}${line.share === null ? '' : ` over ${percentText(line.share)}`} (${gateOf(line)})`;
}

function marginStep(before: StateLine | null, after: StateLine | null): string {
  const text = (line: StateLine | null) => (line?.margin == null ? 'none' : signedText(line.margin, 6));
  return before?.margin === after?.margin ? '' : `, margin ${text(before)} → ${text(after)}`;
}

function verdictOf(line: StateLine | null): string {
  return line === null ? 'not asked' : verdictMarks[line.verdict].word;
}

function gateOf(line: StateLine | null): string {
  return (line === null ? '' : gateWords[line.gate]) || 'nothing';
}

function shareOf(line: StateLine | null): string {
  return line?.share == null ? 'not known' : percentText(line.share);
}

/** `2 worse, 1 better, 34 the same (margins to 0.1 %, shares to 0.1 %).` */
function summary({ changes, same, tolerances }: Comparison): string {
  const count = (wanted: Change['direction']) => changes.filter(({ direction }) => direction === wanted).length;
  const counts = (['worse', 'better', 'other'] as const).flatMap((direction) =>
    count(direction) === 0 ? [] : [`${count(direction)} ${direction}`],
  );
  const margins = `margins to ${shortText(tolerances.margin * 100)} % or the tolerance of the condition`;
  return `${[...counts, `${same} the same`].join(', ')} (${margins}, shares to ${shortText(tolerances.share * 100)} %).`;
}
