import { existsSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { quick, type Running, run, sheet, start, writeFiles } from './program.ts';

/** Random numbers from 0 to 1, the same for the same seed (mulberry32). */
function randomFrom(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}

/**
 * Runs that share a cache and an output, two at a time, killed at random moments. Answers what was found unsound: an
 * output that is neither absent nor whole, or a last run whose bytes are not those of a run without cache.
 */
export async function killedRuns(
  folder: string,
  { kills, seed }: { readonly kills: number; readonly seed: number },
): Promise<string[]> {
  const random = randomFrom(seed);
  const faults: string[] = [];
  const sheets = Object.fromEntries(['a', 'b', 'c'].map((id, at) => [`sheets/${id}.yaml`, sheet(`0.${at + 4}`)]));
  writeFiles(folder, { 'rungcheck.yaml': `sheets: [sheets]\nonly: [${quick}]\n`, ...sheets });
  const output = join(folder, 'o.json');
  const expected = (await run(folder, 'vet', '--format', 'json', '--no-cache')).out;
  // A run takes from a third of a second (all from the cache) to some: kills fall into all of it.
  const killOne = (running: Running) =>
    new Promise<void>((done) => {
      const timer = setTimeout(() => running.child.kill(random() < 0.7 ? 'SIGKILL' : 'SIGTERM'), random() * 1200);
      void running.ended.then(() => {
        clearTimeout(timer);
        done();
      });
    });
  for (let killed = 0; killed < kills; killed += 2) {
    // From time to time the cache is empty again, so that runs have entries to write.
    if (killed % 4 === 0) rmSync(join(folder, '.cache'), { recursive: true, force: true });
    const two = [0, 1].map(() => start(folder, ['vet', '--format', 'json', '--out', 'o.json']));
    await Promise.all(two.map(killOne));
    if (existsSync(output) && readFileSync(output, 'utf8') !== expected) faults.push(`the output after kill ${killed}`);
    rmSync(output, { force: true });
  }
  const last = await run(folder, 'vet', '--format', 'json');
  if (last.out !== expected) faults.push('the run after all kills');
  return faults;
}

/** One run over many sheets: its status, and the largest memory in its first two thirds and in its last third, in MB. */
export async function memoryOfRun(folder: string, sheets: number) {
  const files = Array.from({ length: sheets }, (_, at) => [`sheets/s${at}.yaml`, sheet(`0.${1000 + at}`)] as const);
  writeFiles(folder, {
    'rungcheck.yaml': 'sheets: [sheets]\nonly: [exchange-uniform-gas, exchange-lieb-oxford]\n',
    ...Object.fromEntries(files),
  });
  const running = start(folder, ['vet', '--no-cache', '--format', 'jsonl', '--out', 'o.jsonl']);
  const samples: number[] = [];
  const timer = setInterval(() => {
    const kilobytes = residentKilobytes(running.child.pid);
    if (kilobytes !== undefined) samples.push(kilobytes / 1024);
  }, 25);
  const { status, err } = await running.ended;
  clearInterval(timer);
  const third = Math.ceil(samples.length / 3);
  const most = (part: readonly number[]) => part.reduce((a, b) => Math.max(a, b), 0);
  return { status, err, early: most(samples.slice(0, third * 2)), late: most(samples.slice(-third)) };
}

/** Linux tells the memory of a process in /proc; elsewhere nothing is sampled. */
function residentKilobytes(pid: number | undefined): number | undefined {
  try {
    const text = readFileSync(`/proc/${pid}/status`, 'utf8');
    // A process that is just ending has no such line.
    const found = /VmRSS:\s+(\d+)/.exec(text);
    return found === null ? undefined : Number(found[1]);
  } catch {
    return undefined;
  }
}
