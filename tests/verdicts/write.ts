import { execFile } from 'node:child_process';
import { renameSync, writeFileSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { promisify } from 'node:util';
import { functionalOf, shelf } from '../constraint/catalogue.ts';
import { tableFile, tableHead, verdictLines } from './shelf.ts';

/*
 * Writes the table of verdicts anew, a process per core, and says what the scan of the shelf costs: time, points, the
 * slowest sheets, and what large parameterised forms cost against small ones. A point is one place of one grid or
 * sample, with all the conditions that are looked at together there.
 */
interface Cost {
  readonly id: string;
  readonly parameters: number;
  readonly rung: string;
  readonly seconds: number;
  readonly points: number;
}

interface Vetted {
  readonly lines: string[];
  readonly costs: Cost[];
}

function vetPart(part: number, parts: number): Vetted {
  const lines: string[] = [];
  const costs: Cost[] = [];
  for (const id of shelf.functionalIds().filter((_, index) => index % parts === part)) {
    const started = performance.now();
    let points = 0;
    lines.push(
      ...verdictLines(id, (more) => {
        points += more;
      }),
    );
    const { parameters, definition } = functionalOf(id);
    const seconds = (performance.now() - started) / 1000;
    costs.push({ id, parameters: parameters.size, rung: definition.rung, seconds, points });
  }
  return { lines, costs };
}

async function writeTable(): Promise<void> {
  const parts = availableParallelism();
  const started = performance.now();
  const run = promisify(execFile);
  const outputs = await Promise.all(
    Array.from({ length: parts }, (_, part) =>
      run(process.execPath, [process.argv[1] as string, String(part), String(parts)], { maxBuffer: 2 ** 26 }),
    ),
  );
  const vetted = outputs.map(({ stdout }) => JSON.parse(stdout) as Vetted);
  const order = new Map(shelf.functionalIds().map((id, index) => [id, index]));
  const place = (line: string) => order.get(line.slice(0, line.indexOf(','))) ?? 0;
  const lines = vetted.flatMap((part) => part.lines).sort((a, b) => place(a) - place(b));
  writeFileSync(`${tableFile}.new`, `${[tableHead, ...lines].join('\n')}\n`);
  renameSync(`${tableFile}.new`, tableFile);
  tellCosts(
    vetted.flatMap(({ costs }) => costs),
    lines.length,
    (performance.now() - started) / 1000,
  );
}

function tellCosts(costs: readonly Cost[], verdicts: number, elapsed: number): void {
  const total = (of: (cost: Cost) => number, among: readonly Cost[]) => among.reduce((sum, cost) => sum + of(cost), 0);
  const rate = (among: readonly Cost[]) => total((cost) => cost.points, among) / total((cost) => cost.seconds, among);
  const shown = (value: number) => Math.round(value).toLocaleString('en');
  const slowest = [...costs].sort((a, b) => b.seconds - a.seconds).slice(0, 6);
  const metaGgas = costs.filter(({ rung }) => rung === 'meta-gga');
  const large = rate(metaGgas.filter(({ parameters }) => parameters >= 30));
  const small = rate(metaGgas.filter(({ parameters }) => parameters < 10));
  const seconds = total((cost) => cost.seconds, costs);
  console.log(
    `${costs.length} functionals, ${verdicts} verdicts: ${shown(elapsed)} s, ${shown(seconds)} s of one core`,
  );
  console.log(`${shown(total((cost) => cost.points, costs))} points, ${shown(rate(costs))} a second and core`);
  console.log(`slowest: ${slowest.map(({ id, seconds: time }) => `${id} ${time.toFixed(1)} s`).join(', ')}`);
  console.log(`meta-GGAs of 30 parameters and more: ${shown(large)} points/s; of fewer than 10: ${shown(small)}`);
}

const [part, parts] = process.argv.slice(2).map(Number);
if (part === undefined || parts === undefined) await writeTable();
else process.stdout.write(JSON.stringify(vetPart(part, parts)));
