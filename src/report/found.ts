import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { bound, labelled } from './layout.ts';
import { shortText, signedText } from './number-text.ts';
import { makePaint } from './paint.ts';
import { sequenceWords, termLines } from './sequence.ts';
import { marginWords } from './vet-violation.ts';
import { fullPlace, gateWords, knownCoordinates, verdictMarks, verdictStyle } from './words.ts';

const labelWidth = 15;

/** What one condition found in one functional: verdict, margin, witness, the margin around it, and the sequences. */
export function foundText(
  finding: Finding,
  functional: FunctionalFindings,
  options: { readonly width: number; readonly colour: boolean },
): string {
  const paint = makePaint(options.colour);
  const width = Math.max(60, options.width);
  const item = (label: string, text: string) => labelled(label, text, labelWidth, width);
  const items = (label: string, texts: readonly string[]) =>
    texts.flatMap((text, index) => item(index === 0 ? label : '', text));
  const { symbol, word } = verdictMarks[finding.verdict];
  const mark = paint(verdictStyle(finding.verdict, finding.gate), `${symbol} ${word}`);
  const known = knownCoordinates(functional);
  const asked = finding.verdict !== 'not-applicable';
  const blocks = [
    [`${paint('strong', `${functional.name} · ${functional.id}`)}: ${mark}`],
    [
      ...item('because', finding.reason),
      ...(finding.gate === 'pass' ? [] : item('counts as', `${gateWords[finding.gate]}: ${finding.gateReason}`)),
      ...(asked ? item('margin', marginWords(finding)) : []),
      ...(asked ? item(finding.verdict === 'violated' ? 'worst at' : 'closest at', fullPlace(finding, known)) : []),
      ...items(
        'where',
        finding.regions.map(({ words }) => words),
      ),
    ],
    items('margin along', neighbourhoodWords(finding, known)),
    items('margin at', askedWords(finding)),
    items('found', sequenceWords(finding)),
    ...(finding.sequences ?? []).map((sequence) => (sequence.terms.length === 0 ? [] : termLines(sequence))),
  ];
  return `${blocks
    .filter((lines) => lines.length > 0)
    .map((lines) => lines.join('\n'))
    .join('\n\n')}\n`;
}

/** `s: 0 → +0.8, 0.625 → +0.72 …`, with the other coordinates of the witness. */
function neighbourhoodWords({ neighbourhood }: Finding, known: readonly string[]): string[] {
  return (neighbourhood ?? [])
    .filter(({ coordinate }) => known.includes(coordinate) || coordinate.includes('_') || coordinate === 'cosine')
    .map(({ coordinate, values }) => {
      const shown = values.map(({ at, margin }) => bound(`${shortText(at)} → ${marginText(margin)}`));
      return `${coordinateSymbol(coordinate)}: ${shown.join(', ')}`;
    });
}

function askedWords({ asked }: Finding): string[] {
  return (asked ?? []).map(({ at, margin }) => {
    const place = Object.entries(at).map(([name, value]) => `${coordinateSymbol(name)} = ${shortText(value)}`);
    return `${place.length === 0 ? 'every point alike' : place.join(', ')}: ${marginText(margin)}`;
  });
}

function marginText(margin: number | null): string {
  return margin === null ? 'no value' : signedText(margin);
}
