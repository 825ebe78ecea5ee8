import type { ProofRow } from './proof-rows.ts';

/** A share of the domain that is a corner, not a region. */
const corner = 1e-9;

const readmeMarks = ['<!-- written by npm run proofs -->\n', '<!-- end of what it writes -->\n'] as const;

/** How many of the true pairs are proved, and of the violated ones proved to be, in words and by condition. */
export function proofSummary(rows: readonly ProofRow[]): string {
  const decidable = rows.filter(({ outcome }) => outcome !== 'not provable');
  // Of an undecided pair they are what it was given.
  const budget = Math.max(0, ...decidable.map(({ boxes }) => boxes));
  const total = countOf(decidable);
  const constraints = [...new Set(rows.map(({ constraint }) => constraint))].sort();
  const lines = constraints.map((constraint) => {
    const own = decidable.filter((row) => row.constraint === constraint);
    if (own.length === 0) return `| ${constraint} | not provable | | | |`;
    const { holds, proved, breaks, refuted } = countOf(own);
    return `| ${constraint} | ${holds} | ${ratio(proved, holds)} | ${breaks} | ${ratio(refuted, breaks)} |`;
  });
  const { holds: allTrue } = countOf(rows);
  const fewer = decidable.filter(({ outcome, boxes }) => outcome === 'undecided' && boxes < budget).length;
  const nearly = decidable.filter(
    ({ verdict, outcome, violated, undecided }) =>
      verdict === 'holds' && outcome !== 'proved' && violated === 0 && undecided < corner,
  ).length;
  const sentences = [
    `Within ${budget.toLocaleString('en')} boxes a pair, ${total.proved} of the ${total.holds} true pairs that boxes can`,
    `decide (${ratio(total.proved, total.holds)}) are proved on the standard domain to the tolerance of the condition,`,
    ...(nearly === 0
      ? []
      : [`${nearly} more (${ratio(nearly, total.holds)}) but for a corner of less than 10⁻⁹ of it, most at ζ = 1,`]),
    `and ${total.refuted} of the ${total.breaks} violated ones (${ratio(total.refuted, total.breaks)}) have a region that`,
    'is proved to violate it.',
    ...(fewer === 0 ? [] : [`Undecided pairs that were given fewer boxes: ${fewer}.`]),
    `Of all ${allTrue} true pairs, those that boxes cannot decide included, ${ratio(total.proved, allTrue)} are proved.`,
  ];
  const head = [
    '| condition | true | of them proved | violated | of them proved to be |',
    '| --- | --: | --: | --: | --: |',
  ];
  const sum = `| all | ${total.holds} | ${ratio(total.proved, total.holds)} | ${total.breaks} | ${ratio(total.refuted, total.breaks)} |`;
  return `${wrapped(sentences.join(' '))}\n\n${[...head, ...lines, sum].join('\n')}\n`;
}

/** A text with the summary put in place of the one between the marks. */
export function withSummary(text: string, summary: string): string {
  const [from, to] = readmeMarks;
  const start = text.indexOf(from) + from.length;
  const end = text.indexOf(to);
  if (start < from.length || end < start) throw new Error('the text has no place for the summary');
  return `${text.slice(0, start)}\n${summary}\n${text.slice(end)}`;
}

function countOf(rows: readonly ProofRow[]) {
  const holding = rows.filter(({ verdict }) => verdict === 'holds');
  const violated = rows.filter(({ verdict }) => verdict === 'violated');
  return {
    holds: holding.length,
    proved: holding.filter(({ outcome }) => outcome === 'proved').length,
    breaks: violated.length,
    refuted: violated.filter(({ outcome }) => outcome === 'violation proved').length,
  };
}

/** In percent, rounded down to a tenth, so that 100 % means all. */
function ratio(part: number, whole: number): string {
  return whole === 0 ? '' : `${Math.floor((1000 * part) / whole) / 10} %`;
}

function wrapped(text: string): string {
  const lines = [''];
  for (const word of text.split(' ')) {
    const last = lines[lines.length - 1] as string;
    if (last.length + word.length >= 120) lines.push(word);
    else lines[lines.length - 1] = last === '' ? word : `${last} ${word}`;
  }
  return lines.join('\n');
}
