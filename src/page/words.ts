import type { Finding, Gate, Verdict } from '../finding/finding.ts';
import { countText, percentText, signedText } from '../report/number-text.ts';
import { verdictMarks } from '../report/words.ts';
import { html, type Markup } from './markup.ts';
import { notation } from './notation.ts';

export const verdictOrder: readonly Verdict[] = ['violated', 'undecided', 'holds', 'proved', 'not-applicable'];
export const gateOrder: readonly Gate[] = ['fail', 'warn', 'note', 'score', 'accepted', 'pass'];

/** What a finding counts as, in words that stand alone. */
export const gateNames: Record<Gate, string> = {
  fail: 'failure',
  warn: 'warning',
  note: 'note',
  score: 'score',
  accepted: 'accepted',
  pass: '',
};

/** Worse comes first. */
export function severity({ verdict, gate }: Finding): number {
  return verdictOrder.indexOf(verdict) * 10 + gateOrder.indexOf(gate);
}

/** Symbol and word of a verdict; colour comes from the class. */
export function verdictMark(finding: Finding, withWord = true): Markup {
  const { symbol, word } = verdictMarks[finding.verdict];
  const text = withWord ? html` <span>${word}</span>` : html` <span class="unseen">${word}</span>`;
  return html`<span class="verdict ${toneOf(finding)}"><span class="symbol" aria-hidden="true">${symbol}</span>${text}</span>`;
}

/** The class that colours a finding. */
export function toneOf({ verdict, gate }: Finding): string {
  return verdict === 'violated' ? `violated gate-${gate}` : verdict;
}

/** The margin for a glance; `≈ 0` where it is zero but for round-off. */
export function marginShort({ margin, verdict, tolerance }: Finding): Markup {
  if (margin === null || verdict === 'not-applicable') return html``;
  if (verdict !== 'violated' && margin !== 0 && Math.abs(margin) <= Math.min(tolerance, 1e-9)) return html`≈ 0`;
  return notation(signedText(margin).replace('e+', 'e'));
}

export function shareShort({ verdict, violatedShare, points }: Finding): string {
  if (verdict === 'violated') return violatedShare === null ? '' : percentText(violatedShare);
  return verdict === 'holds' && points > 1 ? `0 of ${countText(points)}` : '';
}

export const partWords: Record<Finding['part'], string> = {
  exchange: 'exchange',
  correlation: 'correlation',
  'exchange-correlation': 'exchange and correlation',
};

export function plural(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}

export function listed(items: readonly string[]): string {
  return items.length < 2 ? items.join('') : `${items.slice(0, -1).join(', ')} and ${items.at(-1)}`;
}
