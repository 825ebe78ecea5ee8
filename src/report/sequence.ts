import type { Finding, SequenceRecord } from '../finding/finding.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { type Column, setColumns } from './layout.ts';
import { shortText } from './number-text.ts';

/** What was found for each limit and order at the worst point: `limit(Fx, s, inf) = 1.804 ± 1e-15 = 1 + kappa`. */
export function sequenceWords({ sequences }: Finding): string[] {
  return (sequences ?? []).map((sequence) => `${sequence.quantity}${valueWords(sequence)}`);
}

function valueWords({ value, error, second, closedForm, note }: SequenceRecord): string {
  if (value === null) return `: ${note}`;
  const exact = closedForm === null ? '' : ` = ${closedForm}`;
  const width = error === null ? '' : ` ± ${shortText(Number(error), 1)}`;
  const check = second === null || second === value ? '' : ` (second sequence ${second})`;
  return ` = ${value}${width}${check}${exact}`;
}

/** The terms of a sequence as a table of two columns. */
export function termLines({ along, toward, terms }: SequenceRecord): string[] {
  const goal = toward === 'inf' ? '∞' : toward;
  const columns: Column[] = [
    { heading: `${coordinateSymbol(along)} → ${goal}`, align: 'left' },
    { heading: 'value', align: 'left' },
  ];
  return setColumns(
    columns,
    terms.map(({ x, value }) => [x, value]),
  ).map((cells) => cells.join('  '));
}
