import { renameSync, writeFileSync } from 'node:fs';
import { shelf } from '../constraint/catalogue.ts';
import { tableFile, tableHead, verdictLines } from './shelf.ts';

const started = performance.now();
const lines = [tableHead];
const times: [string, number][] = [];
for (const id of shelf.functionalIds()) {
  const before = performance.now();
  lines.push(...verdictLines(id));
  times.push([id, performance.now() - before]);
}
writeFileSync(`${tableFile}.new`, `${lines.join('\n')}\n`);
renameSync(`${tableFile}.new`, tableFile);
const slowest = times.sort((a, b) => b[1] - a[1]).slice(0, 5);
console.log(
  `${times.length} functionals, ${lines.length - 1} verdicts in ${((performance.now() - started) / 1000).toFixed(0)} s`,
);
console.log(`slowest: ${slowest.map(([id, time]) => `${id} ${(time / 1000).toFixed(1)} s`).join(', ')}`);
