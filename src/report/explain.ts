import type { Finding } from '../finding/finding.ts';
import { labelled, wrap } from './layout.ts';
import { makePaint } from './paint.ts';
import { forceWords, statusWords } from './words.ts';

/** All that is known of a condition, as plain data. */
export interface Explanation {
  readonly id: string;
  readonly title: string;
  readonly statement: string;
  readonly localForm: string | null;
  readonly requirement: string;
  readonly derivation: string | null;
  readonly force: Finding['force'];
  readonly status: Finding['status'];
  readonly gate: { readonly level: string; readonly reason: string } | null;
  readonly part: Finding['part'];
  readonly rungs: readonly string[];
  /** Where it is tried, in words. */
  readonly domain: string;
  readonly constants: readonly {
    readonly name: string;
    readonly value: string;
    readonly meaning: string;
    readonly published: readonly { readonly value: string; readonly source: string }[];
  }[];
  readonly tolerance: string;
  readonly toleranceReason: string | null;
  readonly conflicts: readonly {
    readonly rungs: readonly string[];
    readonly with: string | null;
    readonly reason: string;
  }[];
  readonly holds: readonly string[];
  readonly breaks: readonly { readonly id: string; readonly where: string | null; readonly source: string | null }[];
  readonly traps: readonly string[];
  readonly sources: readonly string[];
}

const labelWidth = 15;

/** A condition explained: what it says, how the local form comes about, what a violation means, who breaks it. */
export function explanationText(
  explanation: Explanation,
  options: { readonly width: number; readonly colour: boolean },
): string {
  const paint = makePaint(options.colour);
  const width = Math.max(60, options.width);
  const item = (label: string, text: string | null) => (text === null ? [] : labelled(label, text, labelWidth, width));
  const items = (label: string, texts: readonly string[]) =>
    texts.flatMap((text, index) => item(index === 0 ? label : '', text));
  const { localForm, requirement, conflicts, breaks, constants } = explanation;
  const blocks = [
    wrap(`${explanation.title} · ${explanation.id}`, width).map((line) => paint('strong', line)),
    [
      ...item('statement', explanation.statement),
      ...item('local form', localForm ?? requirement),
      ...item('derivation', explanation.derivation),
    ],
    [
      ...item('status', statusWords[explanation.status]),
      ...item('local form is', forceWords[explanation.force]),
      ...item('counts as', explanation.gate === null ? null : `${explanation.gate.level}: ${explanation.gate.reason}`),
      ...items('conflict', conflicts.map(conflictText)),
    ],
    [
      ...item('asked of', `${explanation.part} of ${explanation.rungs.join(', ')} forms`),
      ...item('checked as', localForm === null ? null : requirement),
      ...item('tried on', explanation.domain),
      ...item('tolerance', reasonAfter(explanation.tolerance, explanation.toleranceReason)),
      ...constants.flatMap(({ name, value, meaning, published }) => [
        ...item('constant', `${name} = ${value}: ${meaning}; choose with --constants ${name}=…`),
        ...published.flatMap((choice) => item('', `${choice.value}: ${choice.source}`)),
      ]),
    ],
    [
      ...item('held by', explanation.holds.length === 0 ? null : explanation.holds.join(', ')),
      ...items(
        'broken by',
        breaks.map(({ id, where, source }) => reasonAfter(where === null ? id : `${id}, ${where}`, source)),
      ),
    ],
    items('beware', explanation.traps),
    items('source', explanation.sources),
  ];
  return `${blocks
    .filter((lines) => lines.length > 0)
    .map((lines) => lines.join('\n'))
    .join('\n\n')}\n`;
}

function conflictText({ rungs, with: other, reason }: Explanation['conflicts'][number]): string {
  return `${rungs.join(', ')} forms cannot meet it${other === null ? '' : ` together with ${other}`}: ${reason}`;
}

function reasonAfter(text: string, reason: string | null): string {
  return reason === null ? text : `${text} (${reason})`;
}
