import type { ProofRecord } from '../finding/finding.ts';
import { labelled } from './layout.ts';
import { countText, shortText } from './number-text.ts';

export interface ProofReport {
  readonly functional: string;
  readonly constraint: string;
  readonly requirement: string;
  readonly tolerance: number;
  readonly domain: string;
  readonly proof: ProofRecord;
}

const labelWidth = 12;

const endings: Readonly<Partial<Record<ProofRecord['stop'], string>>> = {
  budget: 'The budget of boxes ended; --boxes gives it more.',
  resolution: 'What is left are boxes too small to divide.',
  interrupted: 'The search was interrupted; --state keeps one to go on from.',
};

/** What was asked, whether it is proved, and the shares of the domain. Ends with a line break. */
export function proofText(
  { functional, constraint, requirement, tolerance, domain, proof }: ProofReport,
  width: number,
): string {
  const { stop, boxes, deepest, provedShare, violatedShare, undecidedShare, rewrites } = proof;
  const verdict =
    stop === 'not-provable'
      ? 'not provable here'
      : isProved(proof)
        ? 'proved'
        : violatedShare > 0
          ? 'violated'
          : 'undecided';
  const share = (value: number, words: string) => `${shortText(100 * value, 3)} %${words === '' ? '' : ` (${words})`}`;
  const shares = [
    `holds on ${share(provedShare, '')}`,
    `violated on ${share(violatedShare, proof.violatedWords)}`,
    `undecided on ${share(undecidedShare, proof.undecidedWords)}`,
  ];
  const line = (label: string, text: string) => labelled(label, text, labelWidth, width);
  return `${[
    `${functional}: ${constraint} ${verdict}`,
    '',
    ...line('claim', `${requirement}, to ${shortText(tolerance)}`),
    ...line('domain', stop === 'not-provable' ? '' : domain),
    ...(stop === 'not-provable'
      ? line('reason', proof.reason)
      : [
          ...line('shares', shares.join('; ')),
          ...line('boxes', `${countText(boxes)}, the smallest after ${deepest} halvings`),
          ...line('rewrites', rewrites.join(', ')),
          ...line('', endings[stop] ?? ''),
        ]),
  ].join('\n')}\n`;
}

export function isProved({ stop, violatedShare }: ProofRecord): boolean {
  return stop === 'decided' && violatedShare === 0;
}
