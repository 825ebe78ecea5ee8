import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { standardDomain } from '../../src/constraint/domain.ts';
import { openPool } from '../../src/run/pool.ts';
import { makeQueue } from '../../src/run/queue.ts';
import type { Unit } from '../../src/run/vetter.ts';

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-pool-'));
});
afterAll(() => rmSync(folder, { recursive: true }));

/** A worker that answers with the sheet's name, and dies of `throws` and `exits`. */
const script = `
import { parentPort } from 'node:worker_threads';
parentPort.on('message', ({ kind, unit }) => {
  if (kind !== 'unit') return;
  if (unit.sheet === 'throws') throw new Error('out of the blue');
  if (unit.sheet === 'exits') process.exit(3);
  parentPort.postMessage({ kind: 'progress', subject: unit.sheet, points: 1 });
  parentPort.postMessage({ kind: 'fault', message: 'answered ' + unit.sheet });
});
`;

const begin = {
  kind: 'begin',
  folders: { functionals: [], constraints: [] },
  settings: { domain: standardDomain, constants: {}, parameters: {}, tolerances: {} },
} as const;

async function answers(units: readonly Unit[], size: number) {
  const file = join(folder, 'worker.mjs');
  writeFileSync(file, script);
  const pool = openPool(pathToFileURL(file), size);
  const told: string[] = [];
  let points = 0;
  await pool.run(begin, units, {
    onAnswer: ({ sheet, constraint }, answer) =>
      told.push(`${sheet} ${constraint}: ${answer.kind === 'fault' ? answer.message : answer.kind}`),
    onProgress: (_subject, more) => {
      points += more;
    },
  });
  await pool.close();
  return { told: told.sort(), points };
}

describe('a pool of workers', () => {
  const units = ['a', 'throws', 'b', 'exits', 'c'].map((sheet) => ({ sheet, constraint: 'x' }));

  test.each([1, 2, 8])('of %i: a worker that dies costs the unit it was at, and no other', async (size) => {
    expect(await answers(units, size)).toEqual({
      told: [
        'a x: answered a',
        'b x: answered b',
        'c x: answered c',
        'exits x: a worker ended with status 3',
        'throws x: a worker died: out of the blue',
      ],
      points: 3,
    });
  });

  test('answers no units at once, and starts no worker for them', async () => {
    expect(await answers([], 4)).toEqual({ told: [], points: 0 });
  });
});

describe('the queue of units', () => {
  const unit = fc.record({ sheet: fc.constantFrom('a', 'b', 'c'), constraint: fc.constantFrom('x', 'y', 'z') });

  test('hands out every unit once, whoever asks (seed 2)', () => {
    fc.assert(
      fc.property(fc.array(unit), fc.infiniteStream(fc.nat(2)), (units, workers) => {
        const next = makeQueue(units);
        const last: (Unit | undefined)[] = [];
        const given: Unit[] = [];
        for (const worker of workers) {
          const one = next(last[worker]);
          if (one === undefined) break;
          last[worker] = one;
          given.push(one);
        }
        const sorted = (list: readonly Unit[]) => list.map(({ sheet, constraint }) => `${sheet} ${constraint}`).sort();
        expect(sorted(given)).toEqual(sorted(units));
      }),
      { seed: 2 },
    );
  });

  test('keeps a worker at its sheet, gives another an unbegun one, and lets it help in the end', () => {
    const units = ['a', 'a', 'a', 'b'].map((sheet, at) => ({ sheet, constraint: String(at) }));
    const next = makeQueue(units);
    const first = next(undefined);
    const second = next(undefined);
    expect([first?.sheet, second?.sheet, next(first)?.sheet, next(second)?.sheet, next(second)]).toEqual([
      'a',
      'b',
      'a',
      'a',
      undefined,
    ]);
  });
});
