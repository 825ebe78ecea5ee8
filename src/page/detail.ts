import type { Finding, FunctionalFindings, SequenceRecord } from '../finding/finding.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { countText, leadingDigits, percentText, roundTripText, shortText } from '../report/number-text.ts';
import { isProved } from '../report/proof-text.ts';
import { commonDomain, fullPlace, knownCoordinates, ownDomainWords } from '../report/words.ts';
import { html, type Markup } from './markup.ts';
import { notation } from './notation.ts';
import { gateNames, listed, plural } from './words.ts';

const shownDigits = 20;

/** What was found of one condition for one functional: margin, witness, regions, boundary, and what it counts as. */
export function findingDetail(finding: Finding, functional: FunctionalFindings): Markup {
  if (finding.verdict === 'not-applicable')
    return html`<p class="note">Does not apply to ${functional.name}: ${finding.reason}.</p>`;
  const known = knownCoordinates(functional);
  const isViolated = finding.verdict === 'violated';
  const place = finding.witness === null ? '' : fullPlace(finding, known).replaceAll('\u00a0', ' ');
  const own = ownDomainWords(finding, commonDomain(functional)).replaceAll('\u00a0', ' ');
  return html`<dl class="facts">
${item('margin', notation(marginWords(finding)))}
${item(isViolated ? 'worst at' : 'closest at', place === '' ? '' : notation(place))}
${item('where', regionItems(finding))}
${item('boundary', boundaryWords(finding))}
${item('cause', finding.cause?.kind === 'printed-digits' ? notation(finding.cause.text) : '')}
${item('counts as', isViolated ? html`<span class="gate gate-${finding.gate}">${gateNames[finding.gate]}</span> ${notation(finding.gateReason)}` : '')}
${item('looked at', own === '' ? '' : notation(own))}
${item('how', notation(finding.reason))}
${item('proof', proofWords(finding))}
${item('constants', constantWords(finding))}
</dl>${(finding.sequences ?? []).map(sequenceDetail)}`;
}

function item(term: string, content: Markup | string): Markup {
  return content === '' || (typeof content !== 'string' && content.html === '')
    ? html``
    : html`<dt>${term}</dt><dd>${content}</dd>`;
}

function marginWords({ confirmed, confirmedDigits, margin }: Finding): string {
  if (confirmed !== null && confirmedDigits > 0) {
    const shown = leadingDigits(confirmed, Math.min(shownDigits, confirmedDigits));
    return `${shown} (high precision, ${confirmedDigits} digits sure)`;
  }
  return margin === null ? 'not known' : `${roundTripText(margin)} (double precision)`;
}

function regionItems({ violatedShare, regions, moreRegions, verdict, points }: Finding): Markup {
  if (verdict === 'holds') return points > 1 ? html`nowhere at ${countText(points)} points` : html``;
  if (verdict !== 'violated') return html``;
  const share = violatedShare === null ? '' : `${percentText(violatedShare)} of the domain`;
  const more = moreRegions === 0 ? '' : html`<li>and ${moreRegions} smaller</li>`;
  const [only] = regions;
  if (regions.length === 1 && only !== undefined && moreRegions === 0) return html`${share}: ${notation(only.words)}`;
  if (only === undefined) return html`${share}`;
  return html`${share}<ul>${regions.map(({ words, share: part }) => html`<li>${notation(words)} (${percentText(part)})</li>`)}${more}</ul>`;
}

/** Where the violation ends along each coordinate, going from the worst point. */
function boundaryWords({ through }: Finding): Markup | string {
  const words = through.flatMap(({ coordinate, lower, upper, lowerIsEdge, upperIsEdge }) => {
    const ends = [...(lowerIsEdge ? [] : [lower]), ...(upperIsEdge ? [] : [upper])];
    return ends.length === 0
      ? []
      : [`${coordinateSymbol(coordinate)} = ${ends.map((end) => shortText(end, 6)).join(' and ')}`];
  });
  return words.length === 0 ? '' : notation(`${words.join('; ')}, going from the worst point along each`);
}

/** What boxes decided: shares of the whole domain, and what is left. */
function proofWords({ proof, tolerance }: Finding): Markup | string {
  if (proof === undefined) return '';
  if (proof.stop === 'not-provable') return html`none: ${notation(proof.reason)}`;
  const effort = `${countText(proof.boxes).replaceAll(' ', '\u00a0')} ${proof.boxes === 1 ? 'box' : 'boxes'}, the smallest after ${plural(proof.deepest, 'halving')}`;
  const method = `interval arithmetic rounded outward on ${effort}; tolerance ${shortText(tolerance)}`;
  const rewritten = proof.rewrites.length === 0 ? '' : `; exact rewrites: ${proof.rewrites.join(', ')}`;
  if (isProved(proof))
    return notation(`proved on the whole domain, wherever the formula has a value: ${method}${rewritten}`);
  const share = (part: number, state: string, where: string) =>
    part === 0
      ? []
      : [`${state} on ${percentText(part).replaceAll(' ', '\u00a0')}${where === '' ? '' : ` (${where})`}`];
  const shares = [
    ...share(proof.provedShare, 'proved to hold', ''),
    ...share(proof.violatedShare, 'proved to violate', proof.violatedWords),
    ...share(proof.undecidedShare, 'undecided', proof.undecidedWords),
  ];
  const certified = proof.certifiedAtWitness ? 'The violation at the worst point is certified. ' : '';
  const none = proof.violatedShare === 0 && !proof.certifiedAtWitness ? 'Not a proof of the condition. ' : '';
  return notation(`Of the domain ${listed(shares)}. ${certified}${none}By ${method}${rewritten}.`);
}

function constantWords({ constants }: Finding): string {
  return Object.entries(constants)
    .map(([name, value]) => `${name} = ${shortText(value, 10)}`)
    .join(', ');
}

function sequenceDetail({
  quantity,
  along,
  toward,
  at,
  terms,
  value,
  error,
  second,
  closedForm,
  note,
}: SequenceRecord): Markup {
  const place = Object.entries(at).map(
    ([name, coordinate]) => `${coordinateSymbol(name)} = ${shortText(coordinate, 6)}`,
  );
  const digits = (text: string) => notation(leadingDigits(text, 14));
  const goal =
    value === null
      ? html`it could not be told`
      : html`${digits(value)}${error === null ? '' : html`, to about ${notation(shortText(Number(error), 2))}`}`;
  return html`<details class="sequence"><summary><code>${quantity}</code>${place.length === 0 ? '' : html` at ${notation(place.join(', '))}`}: ${goal}</summary>
${closedForm === null ? '' : html`<p>In the parameters of the sheet: <code>${closedForm}</code></p>`}
${second === null ? '' : html`<p>A second sequence gives ${digits(second)}.</p>`}
${note === '' ? '' : html`<p>${notation(note)}</p>`}
${terms.length === 0 ? '' : html`<table><caption>${along} toward ${toward === 'inf' ? '∞' : toward}</caption><thead><tr><th scope="col">${notation(coordinateSymbol(along))}</th><th scope="col">value</th></tr></thead><tbody>${terms.map((term) => html`<tr><td class="number">${digits(term.x)}</td><td class="number">${digits(term.value)}</td></tr>`)}</tbody></table>`}</details>`;
}
