import { createHash } from 'node:crypto';
import { type Issue, issuesOf } from './issue.ts';
import { jsonText } from './json.ts';
import type { RunReport } from './run-report.ts';

/** Workflow commands that GitHub Actions (and Forgejo, Gitea) read from the output of a step. */
export function githubAnnotations(report: RunReport): string {
  const commands = { error: 'error', warning: 'warning', note: 'notice' } as const;
  // https://docs.github.com/actions/reference/workflow-commands: values of properties escape : and , too.
  const data = (text: string) => text.replaceAll('%', '%25').replaceAll('\r', '%0D').replaceAll('\n', '%0A');
  const property = (text: string) => data(text).replaceAll(':', '%3A').replaceAll(',', '%2C');
  return shownIssues(report)
    .map(({ level, title, message, place }) => {
      const at = place === null || place.catalogue ? [] : [`file=${property(place.file)}`, ...lineOf(place)];
      return `::${commands[level]} ${[...at, `title=${property(title)}`].join(',')}::${data(message)}\n`;
    })
    .join('');
}

function lineOf({ line, column }: NonNullable<Issue['place']>): string[] {
  return [`line=${line}`, `col=${column}`];
}

/** Logging commands of Azure Pipelines, which knows errors and warnings. */
export function azureAnnotations(report: RunReport): string {
  const escaped = (text: string) =>
    text
      .replaceAll('%', '%AZP25')
      .replaceAll(';', '%3B')
      .replaceAll('\r', '%0D')
      .replaceAll('\n', '%0A')
      .replaceAll(']', '%5D');
  return shownIssues(report)
    .filter(({ level }) => level !== 'note')
    .map(({ level, rule, title, message, place }) => {
      const at =
        place === null || place.catalogue
          ? ''
          : `sourcepath=${escaped(place.file)};linenumber=${place.line};columnnumber=${place.column};`;
      const text = `${title}: ${message}`.replaceAll('%', '%AZP25').replaceAll('\r', '%0D').replaceAll('\n', '%0A');
      return `##vso[task.logissue type=${level};${at}code=${escaped(rule)};]${text}\n`;
    })
    .join('');
}

/** The code quality report of GitLab: a JSON list; what has no file of the user is left out. */
export function gitlabQuality(report: RunReport): string {
  const severities = { error: 'major', warning: 'minor', note: 'info' } as const;
  const items = shownIssues(report).flatMap(({ level, rule, functional, title, message, place }) =>
    place === null || place.catalogue
      ? []
      : [
          {
            description: `${title}: ${message}`,
            check_name: rule,
            fingerprint: fingerprintOf(rule, functional, place.file),
            severity: severities[level],
            location: { path: place.file, lines: { begin: place.line } },
          },
        ],
  );
  return jsonText(items);
}

/** The same for the same condition and functional, whatever the lines and numbers. */
export function fingerprintOf(rule: string, functional: string | null, file: string): string {
  return createHash('sha256')
    .update(`${rule}\n${functional ?? ''}\n${file}`)
    .digest('hex')
    .slice(0, 40);
}

/** Quiet about what is recorded and not worse, and about what is accepted. */
function shownIssues(report: RunReport): Issue[] {
  return issuesOf(report).filter(({ known, accepted }) => !known && accepted === null);
}
