import { azureAnnotations, githubAnnotations, gitlabQuality } from '../report/annotations.ts';
import { findingsJson } from '../report/json.ts';
import { jsonLines } from '../report/json-lines.ts';
import { junitXml } from '../report/junit.ts';
import type { RunReport } from '../report/run-report.ts';
import { sarifLog } from '../report/sarif.ts';
import { vetLatex } from '../report/vet-latex.ts';
import { vetMarkdown } from '../report/vet-markdown.ts';
import { type TableOptions, vetTable } from '../report/vet-table.ts';

type Render = (report: RunReport, look: TableOptions) => string;

/** The forms in which findings are written. */
export const vetFormats = {
  table: ({ findings }, look) => vetTable(findings, look),
  markdown: ({ findings }) => vetMarkdown(findings),
  latex: ({ findings }) => vetLatex(findings),
  json: ({ findings }) => findingsJson(findings),
  jsonl: jsonLines,
  junit: junitXml,
  sarif: sarifLog,
  github: githubAnnotations,
  azure: azureAnnotations,
  gitlab: gitlabQuality,
} as const satisfies Record<string, Render>;

export type VetFormat = keyof typeof vetFormats;
export const vetFormatNames = Object.keys(vetFormats) as VetFormat[];

const endings: Readonly<Record<string, VetFormat>> = {
  txt: 'table',
  md: 'markdown',
  markdown: 'markdown',
  tex: 'latex',
  json: 'json',
  jsonl: 'jsonl',
  xml: 'junit',
  sarif: 'sarif',
};

/** The format that a file name asks for. */
export function formatOfFile(path: string): VetFormat | undefined {
  return endings[/\.([A-Za-z]+)$/.exec(path)?.[1]?.toLowerCase() ?? ''];
}
