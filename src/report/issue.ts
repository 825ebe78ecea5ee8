import type { Change } from '../finding/compare.ts';
import type { Finding, FunctionalFindings, Remark } from '../finding/finding.ts';
import { changeText } from './compare-text.ts';
import { percentText, signedText } from './number-text.ts';
import type { RunReport } from './run-report.ts';
import { gateWords, knownCoordinates, placeWords } from './words.ts';

export interface Place {
  readonly file: string;
  readonly catalogue: boolean;
  readonly line: number;
  readonly column: number;
}

/** Something to be pointed at in a file: the common ground of annotations and SARIF. */
export interface Issue {
  readonly level: 'error' | 'warning' | 'note';
  /** Recorded before, and not worse: told only where a format has a place for it. */
  readonly known: boolean;
  /** The reason where the project accepts it. */
  readonly accepted: string | null;
  /** Condition id, or `acceptance`, `faulty-sheet`, `recorded-state`. */
  readonly rule: string;
  readonly functional: string | null;
  readonly title: string;
  readonly message: string;
  readonly place: Place | null;
  /** Further places: both parts of a condition on their sum. */
  readonly related: readonly Place[];
  readonly finding: Finding | null;
  readonly changes: readonly Change[];
}

/** All issues of a run: violations, undecided conditions, what is gone, remarks on acceptances, faulty sheets. */
export function issuesOf({ findings, comparison }: RunReport): Issue[] {
  const changes = comparison?.changes ?? [];
  const found = findings.functionals.flatMap((functional) =>
    functional.findings.flatMap((finding) => {
      if (finding.verdict !== 'violated' && finding.verdict !== 'undecided') return [];
      const own = changes.filter(
        (change) => change.functional === functional.id && change.constraint === finding.constraint,
      );
      return [findingIssue(functional, finding, comparison === null ? null : own)];
    }),
  );
  const told = new Set(found.map((issue) => `${issue.functional} ${issue.rule}`));
  const others = changes.filter(
    ({ direction, functional, constraint }) => direction === 'worse' && !told.has(`${functional} ${constraint}`),
  );
  const faults = (findings.faults ?? []).flatMap(({ sheet, problems }) =>
    problems.map(({ message, remedy, file, line, column }): Issue => {
      const place = file === undefined ? null : { file, catalogue: false, line: line ?? 1, column: column ?? 1 };
      return { ...plain('faulty-sheet', `Faulty sheet ${sheet}`, `${message}. ${remedy}`), level: 'error', place };
    }),
  );
  return [
    ...found,
    ...others.map(
      (change): Issue => ({
        ...plain('recorded-state', 'Worse than recorded', changeText(change)),
        level: 'error',
        functional: change.functional,
        changes: [change],
      }),
    ),
    ...(findings.remarks ?? []).map(remarkIssue),
    ...faults,
  ];
}

function findingIssue(functional: FunctionalFindings, finding: Finding, changes: readonly Change[] | null): Issue {
  const [place = null, ...related] = placesOf(functional, finding);
  const isWorse = changes?.some(({ direction }) => direction === 'worse') ?? false;
  const usual = finding.gate === 'fail' ? 'error' : finding.gate === 'warn' ? 'warning' : 'note';
  const recorded = (changes ?? []).map((change) => ` (${changeText(change)})`).join('');
  return {
    level: changes === null ? usual : isWorse ? 'error' : 'note',
    known: changes !== null && !isWorse,
    accepted: finding.gate === 'accepted' ? finding.gateReason : null,
    rule: finding.constraint,
    functional: functional.id,
    title: finding.title,
    message: `${findingMessage(functional, finding)}${recorded}`,
    place,
    related,
    finding,
    changes: changes ?? [],
  };
}

/** One line: `PBE violates F_c ≥ 0 by -0.012 at r_s 1, over 3 % of the domain; fails: a theorem …`. */
export function findingMessage(functional: FunctionalFindings, finding: Finding): string {
  const { name } = functional;
  if (finding.verdict === 'undecided') return `${name}: undecided whether ${finding.requirement}: ${finding.reason}`;
  const gate = `${gateWords[finding.gate]}: ${finding.gateReason}`;
  if (finding.rule === true) return `${name} breaks the rule ${finding.constraint}: ${finding.reason}; ${gate}`;
  const place = placeWords(finding, knownCoordinates(functional)).replaceAll('\u00a0', ' ');
  const margin = finding.margin === null ? '' : `, margin ${signedText(finding.margin, 6)}`;
  const share = finding.violatedShare === null ? '' : `, over ${percentText(finding.violatedShare)} of the domain`;
  const cause = finding.cause?.kind === 'printed-digits' ? `; ${finding.cause.text}` : '';
  return `${name} violates ${finding.requirement}${margin}${place === '' ? '' : ` at ${place}`}${share}${cause}; ${gate}`;
}

/** The parameter to blame, or the terms of the part that the condition is about. */
function placesOf({ id, places }: FunctionalFindings, finding: Finding): Place[] {
  if (places === undefined) return [];
  const { file, catalogue, parts, parameters } = places;
  const blamed = finding.cause?.parameter;
  const parameter = blamed?.sheet === id ? parameters[blamed.name] : undefined;
  const own = parts[finding.part];
  const any = [parts['exchange-correlation'], parts.exchange, parts.correlation];
  const found = parameter !== undefined ? [parameter] : own !== undefined ? [own] : any;
  return found.flatMap((at) => (at === undefined ? [] : [{ file, catalogue, ...at }]));
}

function remarkIssue({ constraint, functional, text, file, line, column }: Remark): Issue {
  return {
    ...plain('acceptance', `Acceptance of ${constraint} for ${functional}`, text),
    level: 'warning',
    functional,
    place: { file, catalogue: false, line, column },
  };
}

function plain(rule: string, title: string, message: string) {
  const nothing = {
    known: false,
    accepted: null,
    functional: null,
    place: null,
    related: [],
    finding: null,
    changes: [],
  };
  return { rule, title, message, ...nothing };
}
