import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { killedRuns, memoryOfRun } from './soak.ts';

/* npm run soak: 200 runs killed at random, then 1,000 sheets in one run; about ten minutes. */

const folder = mkdtempSync(join(tmpdir(), 'rungcheck-soak-'));
try {
  const seed = Number(process.argv[2] ?? Date.now() % 1e6);
  console.log(`200 runs killed at random, seed ${seed}`);
  const faults = await killedRuns(folder, { kills: 200, seed });
  console.log(faults.length === 0 ? 'cache and outputs are sound' : `unsound: ${faults.join(', ')}`);
  rmSync(join(folder, 'sheets'), { recursive: true });
  const { status, err, early, late } = await memoryOfRun(folder, 1000);
  console.log(
    `1,000 sheets: status ${status}, at most ${early.toFixed(0)} MB in the first two thirds, ${late.toFixed(0)} MB in the last`,
  );
  console.log(err);
  if (faults.length > 0 || status !== 0 || !(late < early + 80)) process.exitCode = 1;
} finally {
  rmSync(folder, { recursive: true });
}
