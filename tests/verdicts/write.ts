import { renameSync, writeFileSync } from 'node:fs';
import { functionalOf, shelf } from '../constraint/catalogue.ts';
import { tableFile, tableHead, verdictLines } from './shelf.ts';

/*
 * Writes the table of verdicts anew, and says what the scan of the shelf costs: time, points, the slowest sheets, and
 * what large parameterised forms cost against small ones. A point is one place of one grid or sample, with all the
 * conditions that are looked at together there.
 */
interface Cost {
  readonly id: string;
  readonly parameters: number;
  readonly seconds: number;
  readonly points: number;
}

const lines = [tableHead];
const costs: Cost[] = [];
for (const id of shelf.functionalIds()) {
  const started = performance.now();
  let points = 0;
  lines.push(
    ...verdictLines(id, (more) => {
      points += more;
    }),
  );
  const seconds = (performance.now() - started) / 1000;
  costs.push({ id, parameters: functionalOf(id).parameters.size, seconds, points });
}
writeFileSync(`${tableFile}.new`, `${lines.join('\n')}\n`);
renameSync(`${tableFile}.new`, tableFile);

const total = (of: (cost: Cost) => number, among: readonly Cost[] = costs) =>
  among.reduce((sum, cost) => sum + of(cost), 0);
const rate = (among: readonly Cost[]) => total(({ points }) => points, among) / total(({ seconds }) => seconds, among);
const shown = (value: number) => Math.round(value).toLocaleString('en');
const slowest = [...costs].sort((a, b) => b.seconds - a.seconds).slice(0, 6);
const metaGgas = costs.filter(({ id }) => functionalOf(id).definition.rung === 'meta-gga');
const small = metaGgas.filter(({ parameters }) => parameters < 10);
const large = metaGgas.filter(({ parameters }) => parameters >= 30);
console.log(`${costs.length} functionals, ${lines.length - 1} verdicts in ${shown(total(({ seconds }) => seconds))} s`);
console.log(
  `${shown(total(({ points }) => points))} points, ${shown(rate(costs))} points/s with local searches and confirmation`,
);
console.log(`slowest: ${slowest.map(({ id, seconds }) => `${id} ${seconds.toFixed(1)} s`).join(', ')}`);
console.log(
  `meta-GGAs with 30 parameters and more: ${shown(rate(large))} points/s; with fewer than 10: ${shown(rate(small))} points/s`,
);
