import type { DomainRecord, Finding, FunctionalFindings, Gate, Verdict, Witness } from '../finding/finding.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { bound } from './layout.ts';
import { roundTripText, shortText } from './number-text.ts';
import type { Style } from './paint.ts';

/** Symbol and word of a verdict; the word always stands beside the symbol and the colour. */
export const verdictMarks: Record<Verdict, { readonly symbol: string; readonly word: string }> = {
  violated: { symbol: '✗', word: 'violated' },
  undecided: { symbol: '?', word: 'undecided' },
  holds: { symbol: '○', word: 'holds' },
  proved: { symbol: '●', word: 'proved' },
  'not-applicable': { symbol: '–', word: 'does not apply' },
};

export const gateWords: Record<Gate, string> = {
  fail: 'fails',
  warn: 'warning',
  note: 'note',
  score: 'score',
  accepted: 'accepted',
  pass: '',
};

export function verdictStyle(verdict: Verdict, gate: Gate): Style {
  if (verdict === 'violated') return gate === 'fail' ? 'red' : gate === 'warn' ? 'yellow' : 'blue';
  return verdict === 'undecided' ? 'cyan' : verdict === 'not-applicable' ? 'faint' : 'green';
}

export const forceNames: Record<Finding['force'], string> = {
  'necessary-and-sufficient': 'necessary and sufficient',
  sufficient: 'sufficient only',
  definition: 'definition',
};

/** In plain words, after "the local form is". */
export const forceWords: Record<Finding['force'], string> = {
  'necessary-and-sufficient': 'necessary and sufficient: where a point violates it, some density does',
  sufficient: 'sufficient only: where a point violates it, no density need do so',
  definition: 'the definition itself: it has to hold at every point of every density',
};

export const statusWords: Record<Finding['status'], string> = {
  theorem: 'theorem',
  conjecture: 'conjecture: widely believed, not proved',
  estimate: 'estimate: a plausible value, not a theorem',
  norm: 'norm: a value that the exact functional has for one system',
  rule: 'rule of numerical quality',
};

const spinCoordinates = ['rs', 'zeta', 's_up', 's_dn', 'cosine', 'alpha_up', 'alpha_dn'] as const;
const sliceCoordinates = ['rs', 'zeta', 's', 'alpha', 'q'] as const;

/** What moves in the limits of a condition asked at points: `r_s → ∞`. */
export function movingWords({ sequences }: Finding): string[] {
  const limits = (sequences ?? []).filter(({ kind }) => kind !== 'coefficient');
  const moving = limits.map(({ along, toward }) =>
    bound(`${coordinateSymbol(along)} → ${toward === 'inf' ? '∞' : toward}`),
  );
  return [...new Set(moving)];
}

/** The coordinates of a witness that its condition and the functional depend on, in order. */
export function witnessCoordinates(finding: Finding, known: readonly string[]): [name: string, value: number][] {
  const { witness, irrelevant, domain, sequences } = finding;
  if (witness === null) return [];
  const moving = (sequences ?? []).flatMap(({ along, kind }) => (kind === 'coefficient' ? [] : [along]));
  const isSpin = domain.space === 'spin';
  const swept = domain.coordinates.map(({ name }) => name);
  const names: readonly (keyof Witness)[] = isSpin ? spinCoordinates : sliceCoordinates;
  return names.flatMap((name): [string, number][] => {
    const value = witness[name];
    const matters = isSpin ? swept.includes(name) : known.includes(name) && !irrelevant.includes(name);
    return value === undefined || !matters || moving.includes(name) ? [] : [[name, value]];
  });
}

/** The witness for a glance: `r_s 0.512, ζ 1, s 2.1, every α`. */
export function placeWords(finding: Finding, known: readonly string[]): string {
  if (finding.witness === null) return '';
  const given = witnessCoordinates(finding, known).map(([name, value]) =>
    bound(`${coordinateSymbol(name)} ${shortText(value, 4)}`),
  );
  const moving = movingWords(finding);
  const rest = irrelevantCoordinates(finding, known);
  if (given.length === 0 && moving.length === 0) return 'everywhere alike';
  return [...moving, ...given, ...(rest.length === 0 ? [] : [bound(`every ${rest.join(', ')}`)])].join(', ');
}

/** The witness to compute with: `r_s = 0.5120345678901234, ζ = 1, s = 2.1; any α`. */
export function fullPlace(finding: Finding, known: readonly string[]): string {
  const given = witnessCoordinates(finding, known).map(([name, value]) =>
    bound(`${coordinateSymbol(name)} = ${roundTripText(value)}`),
  );
  const rest = irrelevantCoordinates(finding, known);
  const parts = [
    [...movingWords(finding), ...given].join(', '),
    rest.length === 0 ? '' : bound(`any ${rest.join(', ')}`),
  ];
  return parts.filter((part) => part !== '').join('; ') || 'everywhere alike';
}

function irrelevantCoordinates({ irrelevant }: Finding, known: readonly string[]): string[] {
  return irrelevant.filter((name) => known.includes(name)).map(coordinateSymbol);
}

const scaleWords: Record<DomainRecord['coordinates'][number]['scale'], string> = {
  linear: '',
  logarithmic: ' (log)',
  'toward-upper': '',
  compact: ' (compact)',
  listed: '',
};

/** `ζ = 0; r_s 0.01 … 100 (log), s 0 … 5`: fixed coordinates first. */
export function domainWords({ coordinates, fixed, space }: DomainRecord): string {
  const axes = coordinates
    .filter(({ name }) => !(name in fixed))
    .map(({ name, lower, upper, scale, values }) => {
      if (values !== undefined)
        return bound(`${coordinateSymbol(name)} = ${values.map((at) => shortText(at, 6)).join(' | ')}`);
      const end = upper === null ? '∞' : shortText(upper, 6);
      return bound(`${coordinateSymbol(name)} ${shortText(lower, 6)} … ${end}${scaleWords[scale]}`);
    });
  const parts = [fixedWords(fixed), axes.join(', ')].filter((part) => part !== '');
  return `${space === 'spin' ? 'general spin space: ' : ''}${parts.join('; ')}`;
}

function fixedWords(fixed: DomainRecord['fixed']): string {
  return Object.entries(fixed)
    .map(([name, value]) => bound(`${coordinateSymbol(name)} = ${shortText(value, 6)}`))
    .join(', ');
}

/** The coordinates that a functional can depend on: those of its rung; q only where a condition was swept over it. */
export function knownCoordinates({ rung, domain, findings }: FunctionalFindings): string[] {
  const isSwept = findings.some((finding) => finding.domain.coordinates.some(({ name }) => name === 'q'));
  const beyond: Readonly<Record<string, readonly string[]>> = { lda: ['s', 'alpha', 'q'], gga: ['alpha', 'q'] };
  const hidden = [...(beyond[rung] ?? []), ...(isSwept ? [] : ['q'])];
  return domain.coordinates.map(({ name }) => name).filter((name) => !hidden.includes(name));
}

/** The domain of a run, with only the coordinates that the functional has. */
export function commonDomain(functional: FunctionalFindings): DomainRecord {
  const known = knownCoordinates(functional);
  const { domain } = functional;
  return { ...domain, coordinates: domain.coordinates.filter(({ name }) => known.includes(name)) };
}

/** Where a condition was tried, as far as that differs from the domain of the run: fixed coordinates, or another space. */
export function ownDomainWords({ domain }: Finding, common: DomainRecord): string {
  const isSame = domain.coordinates.every(({ name, lower, upper }) =>
    common.coordinates.some((axis) => axis.name === name && axis.lower === lower && axis.upper === upper),
  );
  if (domain.space === 'spin' || !isSame) return domainWords(domain);
  const known = common.coordinates.map(({ name }) => name);
  return fixedWords(Object.fromEntries(Object.entries(domain.fixed).filter(([name]) => known.includes(name))));
}
