import type { DomainRecord, Finding, FunctionalFindings } from '../finding/finding.ts';
import { worstFirst } from './vet-overview.ts';
import {
  commonDomain,
  forceWords,
  gateWords,
  knownCoordinates,
  statusWords,
  verdictMarks,
  witnessCoordinates,
} from './words.ts';

/** A note below a table, with the letter that marks its rows. */
export interface TableNote {
  readonly letter: string;
  readonly note:
    | { readonly kind: 'words'; readonly text: string }
    | { readonly kind: 'domain'; readonly domain: DomainRecord };
}

export interface SupplementRow {
  readonly finding: Finding;
  readonly verdict: string;
  readonly place: readonly (readonly [name: string, value: number])[];
  /** Coordinates that the margin does not depend on. */
  readonly every: readonly string[];
  readonly notes: readonly string[];
}

/** What a table for a supplement says of one functional, before it is set in a language. */
export interface SupplementTable {
  readonly functional: FunctionalFindings;
  readonly rows: readonly SupplementRow[];
  readonly notes: readonly TableNote[];
  /** The domain of the run; rows tried elsewhere have a note. */
  readonly domain: DomainRecord;
  readonly notApplicable: readonly Finding[];
}

export function supplementTable(functional: FunctionalFindings): SupplementTable {
  const known = knownCoordinates(functional);
  const domain = commonDomain(functional);
  const notes: TableNote[] = [];
  const letterOf = (note: TableNote['note']): string => {
    const same = notes.find((other) => JSON.stringify(other.note) === JSON.stringify(note));
    if (same !== undefined) return same.letter;
    const letter = letterNumber(notes.length);
    notes.push({ letter, note });
    return letter;
  };
  const rows = worstFirst(functional.findings)
    .filter(({ verdict }) => verdict !== 'not-applicable')
    .map((finding): SupplementRow => {
      const marks = [letterOf({ kind: 'words', text: `The local form is ${forceWords[finding.force]}.` })];
      const own = ownDomain(finding, domain);
      if (own !== undefined) marks.push(letterOf({ kind: 'domain', domain: own }));
      if (finding.status !== 'theorem')
        marks.push(letterOf({ kind: 'words', text: `${capital(statusWords[finding.status])}.` }));
      if (finding.cause?.kind === 'printed-digits')
        marks.push(letterOf({ kind: 'words', text: `${capital(finding.cause.text)}.` }));
      return {
        finding,
        verdict: `${verdictMarks[finding.verdict].word}${gateWords[finding.gate] === '' ? '' : ` (${gateWords[finding.gate]})`}`,
        place: witnessCoordinates(finding, known),
        every: finding.witness === null ? [] : finding.irrelevant.filter((name) => known.includes(name)),
        notes: marks.sort(),
      };
    });
  return {
    functional,
    rows,
    notes,
    domain,
    notApplicable: functional.findings.filter(({ verdict }) => verdict === 'not-applicable'),
  };
}

/** a … z, aa … */
function letterNumber(index: number): string {
  const letter = String.fromCharCode(97 + (index % 26));
  return index < 26 ? letter : letterNumber(Math.floor(index / 26) - 1) + letter;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** Where a condition was tried, when that is more than leaving out coordinates that do not matter. */
function ownDomain({ domain }: Finding, common: DomainRecord): DomainRecord | undefined {
  if (domain.space === 'spin') return domain;
  const known = common.coordinates.map(({ name }) => name);
  const fixed = Object.fromEntries(Object.entries(domain.fixed).filter(([name]) => known.includes(name)));
  return Object.keys(fixed).length === 0 ? undefined : { ...domain, coordinates: [], fixed };
}
