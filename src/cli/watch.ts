import { type FSWatcher, watch } from 'node:fs';
import { basename, dirname, resolve } from 'node:path';
import { compareStates } from '../finding/compare.ts';
import type { Finding, Findings } from '../finding/finding.ts';
import { exitStatusOf } from '../finding/gate-counts.ts';
import { stateOf } from '../finding/state.ts';
import { watchTable } from '../report/watch-table.ts';
import { faultProblems } from './faults.ts';
import { progressLine } from './progress.ts';
import { openWorkshop, runVet } from './run-vet.ts';
import { endOnSignals } from './signals.ts';
import { faultOf, problemsText } from './status.ts';
import { checkTelling } from './tell.ts';
import type { Terminal } from './terminal.ts';
import type { VetOptions } from './vet-options.ts';
import { readVetRequest } from './vet-request.ts';

/** An editor may save in several steps; they are taken together. */
const settleTime = 60;
/** What is known by then is shown, and again so often; the rest follows. */
const patience = 700;
const exactly = { margin: 0, share: 0 };

/**
 * `rungcheck vet --watch`: vets, and again whenever a sheet, an imported sheet, a condition or the project file is
 * saved; what has changed since the last table is marked. Ends with a signal.
 */
export async function watchCommand(
  sheets: readonly string[],
  options: VetOptions,
  terminal: Terminal,
  today: string,
): Promise<number> {
  const first = await readVetRequest(sheets, options, checkTelling(options));
  const workshop = await openWorkshop(first.jobs, options.cache);
  const silent = progressLine({ writeErr: () => {}, watched: false }, Date.now);
  const folders = new Map<string, FSWatcher>();
  const watched = new Set<string>();
  let timer: NodeJS.Timeout | undefined;
  let running = false;
  let again = false;
  let before: Findings | undefined;
  const clear = terminal.colour ? '\u001b[2J\u001b[H' : '';
  const release = endOnSignals(() => {});

  const look = async () => {
    if (running) {
      again = true;
      return;
    }
    running = true;
    const start = performance.now();
    try {
      const request = await readVetRequest(sheets, options, []);
      for (const folder of request.folders.constraints.slice(0, -1)) watchFolder(folder);
      for (const file of [...request.sheets, ...(request.project === undefined ? [] : [request.project.file])]) {
        watchFile(file);
      }
      const fresh = new Map<string, Finding>();
      const interim = setInterval(() => {
        if (before !== undefined) showInterim(before, fresh);
      }, patience);
      const { findings, files } = await runVet(request, workshop, silent, today, ({ functional, finding }) => {
        fresh.set(`${functional.id} ${finding.constraint}`, finding);
      }).finally(() => clearInterval(interim));
      for (const file of files) watchFile(file);
      const changes = before === undefined ? [] : compareStates(stateOf(before), stateOf(findings), exactly).changes;
      const seconds = (performance.now() - start) / 1000;
      const problems = problemsText(faultProblems(findings.faults ?? []));
      show(`${watchTable(findings, changes, terminal)}${problems}`, seconds, exitStatusOf(findings));
      if (findings.faults === undefined) before = findings;
    } catch (error) {
      show(faultOf(error, false).text, (performance.now() - start) / 1000, 2);
    }
    running = false;
    if (again) {
      again = false;
      await look();
    }
  };

  /** Not all is looked at again yet: what is known, the rest as it was. */
  const showInterim = (last: Findings, fresh: ReadonlyMap<string, Finding>) => {
    const functionals = last.functionals.map((functional) => ({
      ...functional,
      findings: functional.findings.map((old) => fresh.get(`${functional.id} ${old.constraint}`) ?? old),
    }));
    const findings = { ...last, functionals };
    const { changes } = compareStates(stateOf(last), stateOf(findings), exactly);
    const pending = (id: string, constraint: string) => !fresh.has(`${id} ${constraint}`);
    terminal.writeOut(`${clear}${watchTable(findings, changes, terminal, pending)}looking …\n\n`);
  };

  const show = (text: string, seconds: number, status: number) => {
    const words = `looked in ${seconds.toFixed(1)} s; would end with status ${status}; waiting for a change, Ctrl-C ends`;
    terminal.writeOut(`${clear}${text}${words}\n\n`);
  };

  const onChange = () => {
    clearTimeout(timer);
    timer = setTimeout(() => void look(), settleTime);
  };

  // Editors replace files, so that their folders are watched.
  const watchFolder = (folder: string) => {
    const path = resolve(folder);
    if (folders.has(path)) return;
    folders.set(
      path,
      watch(path, (_event, name) => {
        if (name === null || watched.has(resolve(path, name)) || /\.ya?ml$/.test(name)) onChange();
      }),
    );
  };

  const watchFile = (file: string) => {
    watched.add(resolve(file));
    if (basename(file) !== file || /\.ya?ml$/.test(file)) watchFolder(dirname(file));
  };

  await look();
  return new Promise<number>(() => {}).finally(release);
}
