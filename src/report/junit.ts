import type { Change } from '../finding/compare.ts';
import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import { changeText } from './compare-text.ts';
import { findingMessage } from './issue.ts';
import { makePaint } from './paint.ts';
import type { RunReport } from './run-report.ts';
import { violationLines } from './vet-violation.ts';
import { element, type XmlNode, xmlText } from './xml.ts';

const width = 100;

/**
 * JUnit XML: a suite for each functional, a case for each condition. What fails the run is a failure, a faulty sheet an
 * error, what is accepted, undecided or not asked is skipped with its reason; warnings and notes pass and say so.
 */
export function junitXml({ findings, comparison }: RunReport): string {
  const changes = comparison?.changes ?? null;
  const suites = [
    ...findings.functionals.map((functional) => functionalSuite(functional, changes)),
    ...goneSuites(findings.functionals, changes ?? []),
    suiteOf(
      'acceptances',
      (findings.remarks ?? []).map(({ functional, constraint, text }) =>
        element('testcase', { classname: functional, name: constraint }, [element('skipped', { message: text })]),
      ),
    ),
    suiteOf(
      'faulty sheets',
      (findings.faults ?? []).map(({ sheet, problems }) => {
        const [first] = problems;
        const text = problems.map(({ file, line, message, remedy }) => {
          const at = [file, line].filter((part) => part !== undefined).join(':');
          return `${at === '' ? '' : `${at}: `}${message}\n    ${remedy}`;
        });
        const error = element('error', { type: first?.code ?? 'internal', message: first?.message ?? '' }, [
          text.join('\n'),
        ]);
        return element('testcase', { classname: sheet, name: 'sheet' }, [error]);
      }),
    ),
  ].filter((suite) => suite.cases.length > 0);
  const totals = countsOf(suites.flatMap(({ cases }) => cases));
  return xmlText(
    element(
      'testsuites',
      { name: 'rungcheck', ...totals },
      suites.map(({ node }) => node),
    ),
  );
}

interface Suite {
  readonly cases: readonly XmlNode[];
  readonly node: XmlNode;
}

function suiteOf(name: string, cases: readonly XmlNode[], properties: Readonly<Record<string, string>> = {}): Suite {
  const listed = Object.entries(properties).map(([key, value]) => element('property', { name: key, value }));
  const children = [...(listed.length === 0 ? [] : [element('properties', {}, listed)]), ...cases];
  return { cases, node: element('testsuite', { name, ...countsOf(cases) }, children) };
}

function countsOf(cases: readonly XmlNode[]): Record<string, number> {
  const count = (name: string) =>
    cases.filter(({ children }) => children.some((child) => typeof child !== 'string' && child.name === name)).length;
  return { tests: cases.length, failures: count('failure'), errors: count('error'), skipped: count('skipped') };
}

function functionalSuite(functional: FunctionalFindings, changes: readonly Change[] | null): Suite {
  const { id, name, rung, places, findings } = functional;
  const cases = findings.map((finding) => {
    const own =
      changes?.filter(({ functional: of, constraint }) => of === id && constraint === finding.constraint) ?? null;
    const at = places?.parts[finding.part];
    const where = places === undefined || places.catalogue ? {} : { file: places.file, ...(at && { line: at.line }) };
    return element('testcase', { classname: id, name: finding.constraint, ...where }, [
      ...outcomeOf(functional, finding, own),
    ]);
  });
  return suiteOf(id, cases, { name, rung });
}

function outcomeOf(functional: FunctionalFindings, finding: Finding, changes: readonly Change[] | null): XmlNode[] {
  const { verdict, gate, gateReason, reason } = finding;
  const worse = changes?.filter(({ direction }) => direction === 'worse') ?? [];
  const fails = changes === null ? gate === 'fail' : worse.length > 0;
  if (fails) {
    const message = worse.length > 0 ? worse.map(changeText).join('; ') : findingMessage(functional, finding);
    const text = verdict === 'violated' ? violationLines(finding, functional, width, makePaint(false)) : [reason];
    return [element('failure', { type: verdict, message }, [text.join('\n')])];
  }
  if (gate === 'accepted') return [element('skipped', { message: gateReason })];
  if (verdict === 'undecided' || verdict === 'not-applicable') return [element('skipped', { message: reason })];
  if (verdict !== 'violated') return [];
  const recorded = changes === null ? '' : ' (as recorded)';
  return [element('system-out', {}, [`${findingMessage(functional, finding)}${recorded}`])];
}

/** What was recorded and is gone has no case of its own above. */
function goneSuites(functionals: readonly FunctionalFindings[], changes: readonly Change[]): Suite[] {
  const gone = changes.filter(({ direction, functional, constraint }) => {
    const known = functionals.find(({ id }) => id === functional);
    return direction === 'worse' && !known?.findings.some((finding) => finding.constraint === constraint);
  });
  const cases = gone.map((change) =>
    element('testcase', { classname: change.functional, name: change.constraint ?? 'functional' }, [
      element('failure', { type: change.kind, message: changeText(change) }),
    ]),
  );
  return [suiteOf('recorded before', cases)];
}
