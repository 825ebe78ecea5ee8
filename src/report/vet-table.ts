import type { Finding, Findings, FunctionalFindings, Remark } from '../finding/finding.ts';
import { countFindings, exitStatusOf } from '../finding/gate-counts.ts';
import { labelled, setColumns } from './layout.ts';
import { countText, shortText } from './number-text.ts';
import { makePaint, type Paint } from './paint.ts';
import { groupBy, idsOf, overviewLines, toleranceWords, worstFirst } from './vet-overview.ts';
import { violationLines } from './vet-violation.ts';
import { commonDomain, domainWords, ownDomainWords } from './words.ts';

export interface TableOptions {
  /** Columns of the terminal. */
  readonly width: number;
  readonly colour: boolean;
  /** The run ends with status 0 whatever is found. */
  readonly exitZero?: boolean;
  /** The last line, where the exit status does not follow from the findings alone. */
  readonly closing?: string | undefined;
}

const labelWidth = 13;
const narrowest = 60;

/** The findings for a reader at a terminal. Ends with a line break. */
export function vetTable(findings: Findings, options: TableOptions): string {
  const width = Math.max(narrowest, options.width);
  const paint = makePaint(options.colour);
  const blocks = findings.functionals.map((functional) => functionalLines(functional, width, paint));
  const several = findings.functionals.length > 1 ? [togetherLines(findings.functionals, paint)] : [];
  const remarks = remarkLines(findings.remarks ?? [], width, paint);
  const closing = labelled('', options.closing ?? exitWords(findings, options.exitZero === true), 0, width);
  return `${[...blocks, ...several, ...remarks, closing].map((lines) => lines.join('\n')).join('\n\n')}\n`;
}

function functionalLines(functional: FunctionalFindings, width: number, paint: Paint): string[] {
  const { findings } = functional;
  const violated = worstFirst(findings).filter(({ verdict }) => verdict === 'violated');
  const blocks = [
    headingLines(functional, width, paint),
    overviewLines(functional, width, paint),
    ...violated.map((finding) => violationLines(finding, functional, width, paint)),
    [...undecidedLines(findings, width), ...notApplicableLines(findings, width, paint)],
    lookedLines(functional, width),
    labelled('', `${functional.id}: ${countWords(findings)}`, 0, width).map((line) => paint('strong', line)),
  ];
  return blocks.filter((lines) => lines.length > 0).flatMap((lines, index) => (index === 0 ? lines : ['', ...lines]));
}

function headingLines(functional: FunctionalFindings, width: number, paint: Paint): string[] {
  const { id, name, rung, exactExchange, nonLocal, parameters } = functional;
  const changed = Object.entries(parameters).map(([key, value]) => `${key} = ${value}`);
  const about = [
    rung,
    ...(exactExchange === null ? [] : [exactExchangeWords(exactExchange)]),
    ...(nonLocal === null ? [] : [`non-local part ${nonLocal} not evaluated`]),
  ].join(', ');
  return [
    `${paint('strong', name)}${name === id ? '' : ` · ${id}`} · ${about}`,
    ...labelled('', changed.length === 0 ? '' : `TRIAL, not the sheet as written: ${changed.join(', ')}`, 0, width).map(
      (line) => paint('yellow', line),
    ),
  ];
}

function exactExchangeWords({
  shortRange,
  longRange,
  omega,
}: NonNullable<FunctionalFindings['exactExchange']>): string {
  if (omega === null && shortRange === longRange) return `${shortText(shortRange, 6)} of exact exchange`;
  const range = omega === null ? '' : ` (ω = ${shortText(omega, 6)} bohr⁻¹)`;
  return `exact exchange ${shortText(shortRange, 6)} at short and ${shortText(longRange, 6)} at long range${range}`;
}

function undecidedLines(findings: readonly Finding[], width: number): string[] {
  return findings
    .filter(({ verdict }) => verdict === 'undecided')
    .flatMap(({ constraint, reason }) => labelled('undecided', `${constraint}: ${reason}`, labelWidth, width));
}

function notApplicableLines(findings: readonly Finding[], width: number, paint: Paint): string[] {
  const groups = groupBy(
    findings.filter(({ verdict }) => verdict === 'not-applicable'),
    ({ reason }) => reason,
  );
  return groups.flatMap(([reason, group], index) =>
    labelled(index === 0 ? '– not asked' : '', `${idsOf(group)}: ${reason}`, labelWidth, width).map((line) =>
      paint('faint', line),
    ),
  );
}

/** Domain, tolerance and constants, once for all conditions; what a reader needs to repeat the run. */
function lookedLines(functional: FunctionalFindings, width: number): string[] {
  const tried = functional.findings.filter(({ verdict }) => verdict !== 'not-applicable');
  const common = commonDomain(functional);
  const others = groupBy(tried, (finding) => ownDomainWords(finding, common)).filter(([words]) => words !== '');
  const constants = new Map(tried.flatMap(({ constants: own }) => Object.entries(own)));
  const chosen = [...constants].map(([name, value]) => `${name} = ${shortText(value, 10)}`).join(', ');
  const holds = tried.filter(({ verdict, rule }) => verdict === 'holds' && rule !== true);
  return [
    ...labelled('domain', `${functional.domain.name}: ${domainWords(common)}`, labelWidth, width),
    ...others.flatMap(([words, group], index) =>
      labelled(index === 0 ? 'but at' : '', `${words} for ${idsOf(group)}`, labelWidth, width),
    ),
    ...labelled('tolerance', toleranceWords(functional.findings), labelWidth, width),
    ...labelled('constants', chosen, labelWidth, width),
    ...labelled('carries', carriedWords(tried), labelWidth, width),
    ...labelled('proved', provedWords(tried), labelWidth, width),
    ...(holds.length === 0 ? [] : labelled('holds', holdsWords(holds), labelWidth, width)),
  ];
}

/** What was read off the functional: which published constants it carries. */
function carriedWords(findings: readonly Finding[]): string {
  return findings.find(({ constraint }) => constraint === 'known-constants')?.reason ?? '';
}

/** On how many boxes; and what of those that hold was left undecided by the proof. */
function provedWords(findings: readonly Finding[]): string {
  const proofs = findings.flatMap(({ verdict, proof }) => (verdict === 'proved' && proof !== undefined ? [proof] : []));
  const open = findings.flatMap(({ constraint, verdict, proof }) =>
    verdict === 'holds' && proof !== undefined && proof.stop !== 'not-provable'
      ? [`${shortText(100 * proof.undecidedShare, 2)} % of ${constraint}`]
      : [],
  );
  const most = Math.max(0, ...proofs.map(({ boxes }) => boxes));
  const proved = most === 0 ? '' : `by interval arithmetic, rounded outward, on up to ${countText(most)} boxes`;
  const left = open.length === 0 ? '' : `not decided: ${open.join(', ')}`;
  return [proved, left].filter((text) => text !== '').join('; ');
}

function holdsWords(findings: readonly Finding[]): string {
  const scanned = findings.filter(({ sequences }) => sequences === undefined);
  const counts = scanned.map(({ points }) => points);
  const atPoints = findings.length - scanned.length;
  const asked = atPoints === 0 ? '' : `${atPoints} asked at listed points, limits by two sequences`;
  if (scanned.length === 0) return `no violation: ${asked}; not a proof`;
  const [least, most] = [Math.min(...counts), Math.max(...counts)];
  const looked = least === most ? countText(least) : `${countText(least)} to ${countText(most)}`;
  const gaps = findings.filter(({ withoutValue }) => withoutValue > 0);
  const missing = gaps.map(({ constraint, withoutValue }) => `${countText(withoutValue)} in ${constraint}`);
  const without = gaps.length === 0 ? '' : `; points without a value: ${missing.join(', ')}`;
  return `no violation in ${looked} points, refined where the margin is small${asked === '' ? '' : `; ${asked}`}; not a proof${without}`;
}

/** `2 of 14 conditions violated (1 fails, 1 warning); 11 hold, 1 undecided; 5 not asked`. */
function countWords(findings: readonly Finding[]): string {
  const { verdicts, gates } = countFindings(findings);
  const asked = findings.length - verdicts['not-applicable'];
  const counts = [
    gates.fail === 0 ? '' : `${gates.fail} ${gates.fail === 1 ? 'fails' : 'fail'}`,
    gates.warn === 0 ? '' : `${gates.warn} ${gates.warn === 1 ? 'warning' : 'warnings'}`,
    gates.note === 0 ? '' : `${gates.note} ${gates.note === 1 ? 'note' : 'notes'}`,
    gates.score === 0 ? '' : `${gates.score} ${gates.score === 1 ? 'score' : 'scores'}`,
    gates.accepted === 0 ? '' : `${gates.accepted} accepted`,
  ].filter((text) => text !== '');
  const others = [
    verdicts.proved === 0 ? '' : `${verdicts.proved} proved`,
    verdicts.holds === 0 ? '' : `${verdicts.holds} ${verdicts.holds === 1 ? 'holds' : 'hold'}`,
    verdicts.undecided === 0 ? '' : `${verdicts.undecided} undecided`,
    verdicts['not-applicable'] === 0 ? '' : `${verdicts['not-applicable']} not asked`,
  ].filter((text) => text !== '');
  const broken =
    verdicts.violated === 0
      ? `none of ${asked} conditions violated`
      : `${verdicts.violated} of ${asked} conditions violated (${counts.join(', ')})`;
  return [broken, ...others].join(', ');
}

/** One line a functional, to compare several. */
function togetherLines(functionals: readonly FunctionalFindings[], paint: Paint): string[] {
  const right = (heading: string) => ({ heading, align: 'right' as const });
  const columns = [
    { heading: 'together', align: 'left' as const },
    right('fails'),
    right('warnings'),
    right('notes'),
    right('undecided'),
    right('holds'),
    right('not asked'),
  ];
  const rows = functionals.map(({ id, findings }) => {
    const { verdicts, gates } = countFindings(findings);
    const counts = [
      gates.fail,
      gates.warn,
      gates.note + gates.score,
      verdicts.undecided,
      verdicts.holds + verdicts.proved,
      verdicts['not-applicable'],
    ];
    return [id, ...counts.map((count) => (count === 0 ? '·' : String(count)))];
  });
  const [heading, ...lines] = setColumns(columns, rows).map((cells) => cells.join('  '));
  return [paint('faint', heading ?? ''), ...lines];
}

/** What is to be told of the acceptances of the project file. */
function remarkLines(remarks: readonly Remark[], width: number, paint: Paint): string[][] {
  const lines = remarks.flatMap(({ file, line, functional, constraint, text }) =>
    labelled('! acceptance', `${file}:${line}: ${functional} ${constraint}: ${text}`, labelWidth, width),
  );
  return lines.length === 0 ? [] : [lines.map((line) => paint('yellow', line))];
}

function exitWords(findings: Findings, exitZero: boolean): string {
  const fails = exitStatusOf(findings) === 1;
  if (exitZero) return `Exit status 0, as asked${fails ? ', although a condition fails' : ''}.`;
  return fails
    ? 'Exit status 1: a condition fails. Warnings, notes and scores alone would not.'
    : 'Exit status 0: nothing fails; warnings, notes and scores do not count as failures.';
}
