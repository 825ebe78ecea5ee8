import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { bound, labelled, wrap } from './layout.ts';
import { leadingDigits, percentText, roundTripText, shortText } from './number-text.ts';
import type { Paint } from './paint.ts';
import { sequenceWords } from './sequence.ts';
import {
  commonDomain,
  forceWords,
  fullPlace,
  gateWords,
  knownCoordinates,
  ownDomainWords,
  statusWords,
  verdictStyle,
} from './words.ts';

const labelWidth = 11;
const gateNames: Record<Finding['gate'], string> = { ...gateWords, fail: 'failure' };
/** Digits of a confirmed margin that are shown; the findings file has them all. */
const shownDigits = 20;

/**
 * The paragraph of a violated condition, behind a rail in the colour of its gate: what is required, by how much it is
 * missed, the witness with all digits, the region in words, and what the violation counts as.
 */
export function violationLines(
  finding: Finding,
  functional: FunctionalFindings,
  width: number,
  paint: Paint,
): string[] {
  const room = width - 2;
  const own = ownDomainWords(finding, commonDomain(functional));
  const body = [
    ...labelled('requires', requirementWords(finding), labelWidth, room),
    ...labelled('found', finding.rule === true ? finding.reason : '', labelWidth, room),
    ...labelled('margin', finding.rule === true ? '' : marginWords(finding), labelWidth, room),
    ...labelled('worst at', fullPlace(finding, knownCoordinates(functional)), labelWidth, room),
    ...labelled('where', regionWords(finding), labelWidth, room),
    ...labelled('boundary', crossingWords(finding), labelWidth, room),
    ...sequenceWords(finding).flatMap((text, index) => labelled(index === 0 ? 'found' : '', text, labelWidth, room)),
    ...labelled('looked at', own, labelWidth, room),
    ...labelled('cause', causeWords(finding), labelWidth, room),
    ...labelled('status', standingWords(finding), labelWidth, room),
    ...labelled('counts as', `${gateNames[finding.gate]}: ${finding.gateReason}`, labelWidth, room),
  ];
  const style = verdictStyle(finding.verdict, finding.gate);
  const rail = paint(style, '┃');
  const heading = wrap(`${finding.title} · ${finding.constraint}`, room).map((line) => paint('strong', line));
  return [...heading, ...body].map((line) => `${rail} ${line}`);
}

function requirementWords(finding: Finding): string {
  return finding.rule === true ? finding.requirement : `${finding.requirement}, to within ${toleranceText(finding)}`;
}

function standingWords({ rule, status, force }: Finding): string {
  return rule === true ? statusWords[status] : `${status}; the local form is ${forceWords[force]}`;
}

function toleranceText({ tolerance, relative }: Finding): string {
  return `${shortText(tolerance)}${relative ? ' relative' : ''}`;
}

/** The margin with the digits that are sure. */
export function marginWords({ margin, confirmed, confirmedDigits, sequences, proof }: Finding): string {
  if (confirmed !== null && confirmedDigits > 0) {
    const shown = leadingDigits(confirmed, Math.min(shownDigits, confirmedDigits));
    const certified = proof?.certifiedAtWitness === true ? '; certified by interval arithmetic' : '';
    return `${shown} (high precision, ${confirmedDigits} digits sure${certified})`;
  }
  const unbounded = sequences?.some(({ value }) => value === null);
  if (margin === null) return unbounded ? 'unbounded' : 'not known';
  return `${roundTripText(margin)} (double precision, not confirmed)`;
}

function regionWords({ violatedShare, regions, moreRegions, sequences, points }: Finding): string {
  if (sequences !== undefined) {
    const violated = Math.round((violatedShare ?? 0) * points);
    return points === 1 ? '' : `${violated} of the ${points} points that it is asked at`;
  }
  const share = violatedShare === null ? '' : `${percentText(violatedShare)} of the domain`;
  if (regions.length === 0) return share;
  const named = regions.map((region) =>
    regions.length + moreRegions === 1 ? region.words : `${region.words} (${percentText(region.share)})`,
  );
  const more = moreRegions === 0 ? '' : ` | and ${moreRegions} smaller ${moreRegions === 1 ? 'region' : 'regions'}`;
  return `${share === '' ? '' : `${share}: `}${named.join(' | ')}${more}`;
}

/** Where the violation ends along each coordinate, going from the worst point. */
function crossingWords({ through }: Finding): string {
  const words = through.flatMap(({ coordinate, lower, upper, lowerIsEdge, upperIsEdge }) => {
    const ends = [...(lowerIsEdge ? [] : [lower]), ...(upperIsEdge ? [] : [upper])];
    const symbol = coordinateSymbol(coordinate);
    return ends.length === 0 ? [] : [bound(`${symbol} = ${ends.map((end) => shortText(end, 6)).join(' and ')}`)];
  });
  if (words.length === 0) return '';
  return `${words.join('; ')}${words.length === 1 ? '' : ', each with the other coordinates of the worst point'}`;
}

/** Said only of printed digits: that the formula is to blame goes without saying. */
function causeWords({ cause }: Finding): string {
  return cause?.kind === 'printed-digits' ? cause.text : '';
}
