import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Condition } from '../../src/constraint/condition.ts';
import { type ProblemCode, ProblemError } from '../../src/errors/problem.ts';
import { claimFields } from '../../src/proof/certificate.ts';
import { claimJudge, decideClaim } from '../../src/proof/decide-claim.ts';
import { provableClaim } from '../../src/proof/prove.ts';
import { claimIdentity } from '../../src/proof/search-state.ts';
import { openClaimThreads } from '../../src/run/claim-threads.ts';
import { type RunSettings, settingsOf } from '../../src/run/settings.ts';
import { BoxSearch } from '../../src/search/box-search.ts';
import { type Judge, searchTogether } from '../../src/search/share-blocks.ts';
import { builtProgram } from '../ci/program.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-claim-'));
});
afterAll(() => rmSync(folder, { recursive: true }));

const worker = () => pathToFileURL(join(dirname(builtProgram()), 'worker.js'));
const folders = { functionals: ['functionals'], constraints: ['constraints'] };
const unit = { sheet: 'pbe', constraint: 'correlation-coordinate-scaling' };
const settings: RunSettings = { domain: standardSettings.domain, constants: {}, parameters: {}, tolerances: {} };

function claimHere() {
  const condition = conditionOf(unit.constraint) as Condition;
  const functional = functionalOf(unit.sheet);
  const claim = provableClaim(condition, functional, settingsOf(settings));
  if (typeof claim === 'string') throw new Error(claim);
  return { claim, identity: claimIdentity(claimFields(condition, functional, settingsOf(settings), claim), claim) };
}

describe('threads for one claim', () => {
  test('find, byte for byte, what one thread finds, and do most of the work', async () => {
    const { claim, identity } = claimHere();
    const options = { budget: 8_000, keepTree: true };
    const threads = openClaimThreads(worker(), 2, { folders, settings, unit, identity });
    let helped = 0;
    const counting = (judge: Judge): Judge => {
      return (block) => {
        helped++;
        return judge(block);
      };
    };
    try {
      const judges = await Promise.all(threads.start());
      const helpers = () => judges.map((judge) => Promise.resolve(counting(judge)));
      const search = new BoxSearch(claim.axes, options);
      const result = await searchTogether(search, claimJudge(claim), { helpers, patience: 0 });
      expect(result).toEqual(decideClaim(claim, options));
      expect(helped).toBeGreaterThan(2);
    } finally {
      await threads.close();
    }
  });

  test('refuse a claim that is not the one that was read: a sheet was changed meanwhile', async () => {
    const { identity } = claimHere();
    const other = { ...settings, parameters: { beta: '0.06' } };
    const threads = openClaimThreads(worker(), 1, { folders, settings: other, unit, identity });
    const refused = await Promise.allSettled(threads.start());
    await threads.close();
    const reason = refused[0]?.status === 'rejected' ? refused[0].reason : undefined;
    expect(reason).toBeInstanceOf(ProblemError);
    expect((reason as ProblemError).problems[0]?.code).toBe('changed-meanwhile' satisfies ProblemCode);
  });

  test('that die end the search with a fault', async () => {
    const script = join(folder, 'dies.mjs');
    writeFileSync(
      script,
      "import { parentPort } from 'node:worker_threads'; parentPort.on('message', () => process.exit(3));",
    );
    const threads = openClaimThreads(pathToFileURL(script), 1, { folders, settings, unit, identity: '' });
    await expect(threads.start()[0]).rejects.toThrow('a worker ended with status 3');
    await threads.close();
  });
});
