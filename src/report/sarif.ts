import { fingerprintOf } from './annotations.ts';
import type { Explanation } from './explain.ts';
import { explanationText } from './explain.ts';
import { type Issue, issuesOf, type Place } from './issue.ts';
import { jsonText } from './json.ts';
import type { RunReport } from './run-report.ts';

const schema = 'https://json.schemastore.org/sarif-2.1.0.json';

/** Rules that are no conditions of the catalogue. */
const ownRules: readonly { readonly id: string; readonly title: string; readonly help: string }[] = [
  {
    id: 'recorded-state',
    title: 'Worse than recorded',
    help: 'A functional or a condition of the recorded state is missing now, or counts for more.',
  },
  {
    id: 'acceptance',
    title: 'Acceptance that does not fit',
    help: 'An accepted violation of the project file is gone, has grown beyond what was accepted, or is due for review.',
  },
  { id: 'faulty-sheet', title: 'Faulty sheet', help: 'The sheet could not be read; nothing was vetted for it.' },
];

/** SARIF 2.1.0 (OASIS): violations and undecided conditions as results, conditions as rules with their help text. */
export function sarifLog(report: RunReport): string {
  const { findings, comparison, conditions } = report;
  const issues = issuesOf(report);
  const rules = [...conditions.values()].map(conditionRule);
  const known = new Set(rules.map(({ id }) => id));
  const others = ownRules.filter(({ id }) => issues.some(({ rule }) => rule === id) && !known.has(id));
  const all = [...rules, ...others.map(({ id, title, help }) => ({ id, ...texts(title, title, help) }))];
  const indices = new Map(all.map(({ id }, index) => [id, index]));
  const results = issues
    .filter(({ rule }) => rule !== 'faulty-sheet')
    .map((issue) => resultOf(issue, indices, comparison !== null));
  const faults = issues.filter(({ rule }) => rule === 'faulty-sheet');
  return jsonText({
    $schema: schema,
    version: '2.1.0',
    runs: [
      {
        tool: {
          driver: {
            name: 'rungcheck',
            version: findings.engineVersion,
            semanticVersion: findings.engineVersion,
            properties: { catalogueVersion: findings.catalogueVersion },
            rules: all,
          },
        },
        invocations: [
          {
            executionSuccessful: faults.length === 0,
            toolExecutionNotifications: faults.map((issue) => ({
              level: 'error',
              message: { text: `${issue.title}: ${issue.message}` },
              locations: locationsOf(issue),
            })),
          },
        ],
        columnKind: 'utf16CodeUnits',
        results,
      },
    ],
  });
}

function texts(title: string, description: string, help: string) {
  return {
    shortDescription: { text: title },
    fullDescription: { text: description },
    help: { text: help, markdown: `\`\`\`\n${help}\`\`\`\n` },
  };
}

function conditionRule(condition: Explanation) {
  const { id, title, statement, localForm, force, status, part } = condition;
  return {
    id,
    ...texts(title, [statement, localForm ?? ''].filter(Boolean).join('; locally '), helpOf(condition)),
    properties: { force, status, part, tags: [status, part] },
  };
}

function helpOf(condition: Explanation): string {
  return explanationText(condition, { width: 100, colour: false });
}

function resultOf(issue: Issue, indices: ReadonlyMap<string, number>, compared: boolean) {
  const { rule, level, message, finding, functional, accepted } = issue;
  const index = indices.get(rule);
  const isOpen = finding?.verdict === 'undecided';
  return {
    ruleId: rule,
    ...(index === undefined ? {} : { ruleIndex: index }),
    // SARIF 3.27.10: a result of another kind than "fail" has no level.
    ...(isOpen ? { kind: 'open', level: 'none' } : { kind: 'fail', level }),
    message: { text: message },
    locations: locationsOf(issue),
    ...(issue.related.length === 0
      ? {}
      : { relatedLocations: issue.related.map((place, id) => ({ id, physicalLocation: physical(place) })) }),
    partialFingerprints: { 'rungcheckFinding/v1': fingerprintOf(rule, functional, '') },
    ...(compared && finding !== null ? { baselineState: baselineOf(issue) } : {}),
    ...(accepted === null ? {} : { suppressions: [{ kind: 'external', status: 'accepted', justification: accepted }] }),
    ...(finding === null ? {} : { properties: propertiesOf(issue) }),
  };
}

function baselineOf({ changes }: Issue): string {
  if (changes.some(({ kind }) => kind === 'new-violation')) return 'new';
  return changes.length > 0 ? 'updated' : 'unchanged';
}

function propertiesOf({ finding, functional }: Issue) {
  if (finding === null) return {};
  const { verdict, gate, margin, confirmed, witness, violatedShare } = finding;
  return { functional, verdict, gate, margin, confirmed, witness, violatedShare };
}

function locationsOf({ place, functional }: Issue) {
  const logical = functional === null ? {} : { logicalLocations: [{ name: functional, kind: 'module' }] };
  if (place === null) return functional === null ? [] : [logical];
  return [{ physicalLocation: physical(place), ...logical }];
}

function physical({ file, catalogue, line, column }: Place) {
  const isAbsolute = file.startsWith('/') || /^[A-Za-z]:[\\/]/.test(file);
  const path = encodeURI(file.replaceAll('\\', '/')).replaceAll('#', '%23').replaceAll('?', '%3F');
  const uri = isAbsolute ? `file://${path.startsWith('/') ? '' : '/'}${path}` : path.replace(/^\.\//, '');
  const base = catalogue ? { uriBaseId: 'CATALOGUE' } : isAbsolute ? {} : { uriBaseId: 'SRCROOT' };
  return { artifactLocation: { uri, ...base }, region: { startLine: line, startColumn: column } };
}
