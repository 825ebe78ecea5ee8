import { type Change, roundedFunctional } from './rounded.ts';
import type { Rule } from './rule.ts';
import { pointWords, shown } from './words.ts';

/**
 * Rounds every parameter that states its printed digits, first to these digits and then to fewer and fewer, and
 * compares F and four verdicts on a grid of the standard domain. Violated where rounding to the printed digits moves F
 * by more than the threshold or turns a verdict; otherwise it tells at which count of digits that first happens.
 */
export const printedDigits: Rule = (question) => {
  const { threshold } = question;
  const rounded = roundedFunctional(question);
  const { points } = rounded;
  if (rounded.printedDigits.length === 0) {
    const reason = 'no parameter of the sheet states its printed digits';
    return { verdict: 'not-applicable', reason, margin: null, witness: null, points: 0 };
  }
  const matters = ({ size, turned }: Change) => !(size <= threshold) || turned.length > 0;
  const asPrinted = rounded.roundedTo(Number.POSITIVE_INFINITY);
  const margin = threshold - asPrinted.size;
  if (matters(asPrinted)) {
    const reason = `rounded to the digits printed, ${changeWords(asPrinted)}`;
    return { verdict: 'violated', reason, margin, witness: asPrinted.at, points };
  }
  const most = Math.max(...rounded.printedDigits);
  const fewer = Array.from({ length: most - 1 }, (_, index) => most - 1 - index).map((count) => ({
    count,
    ...rounded.roundedTo(count),
  }));
  const first = fewer.find(matters);
  const turning = fewer.find(({ turned }) => turned.length > 0);
  const parts = [
    `rounding to the digits printed moves F by ${shown(asPrinted.size, 2)}`,
    ...(first === undefined
      ? ['fewer digits change nothing']
      : [`with ${digitWords(first.count)} ${changeWords(first)}`]),
    ...(turning === undefined || turning.count === first?.count
      ? []
      : [`with ${digitWords(turning.count)} the verdict of ${turning.turned.join(', ')} turns`]),
  ];
  return { verdict: 'holds', reason: parts.join('; '), margin, witness: null, points };
};

function changeWords({ size, at, turned }: Change): string {
  const verdicts = turned.length === 0 ? '' : `, and the verdict of ${turned.join(', ')} turns`;
  return `F moves by up to ${shown(size, 2)} (at ${pointWords(at)})${verdicts}`;
}

function digitWords(count: number): string {
  return count === 1 ? '1 digit' : `${count} digits`;
}
