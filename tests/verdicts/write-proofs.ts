import { readFileSync, writeFileSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { isMainThread, parentPort, Worker } from 'node:worker_threads';
import { keyOf, type Pair, type ProofRow, pointwisePairs, proofsFile, readProofs, writeProofs } from './proof-rows.ts';
import { proofSummary, withSummary } from './proof-summary.ts';
import { isFinal, provePair } from './prove-pair.ts';

/*
 * Tries to prove every pointwise pair of the table of verdicts, a thread per core, and writes the table of proofs.
 *
 *   --boxes N                   boxes for a pair, at most
 *   --only functional[:condition],…   these alone; the other rows stay as they are
 *   --verdict holds             only pairs of this verdict; the other rows stay as they are
 *   --continue                  keeps the rows that more boxes would not change
 *
 * Without the last every row that is asked for is made anew, which a change of the engine or of a sheet needs.
 */
interface Task {
  readonly pair: Pair;
  readonly budget: number;
}

const readmeFile = 'tests/verdicts/README.md';
const betweenWrites = 20_000;

interface Request {
  readonly budget: number;
  readonly goesOn: boolean;
  /** Every pair of the table, and those asked for. */
  readonly pairs: readonly Pair[];
  readonly asked: readonly Pair[];
}

/** What the command line asks for, or what is wrong with it. */
function readRequest(): Request | string {
  const options = {
    boxes: { type: 'string', default: '1e5' },
    only: { type: 'string' },
    verdict: { type: 'string' },
    continue: { type: 'boolean', default: false },
  } as const;
  const known = Object.keys(options).map((name) => `--${name}`);
  const { values, tokens } = parseArgs({ options, strict: false, tokens: true });
  const stray = tokens.find((token) => token.kind !== 'option' || !known.includes(token.rawName));
  if (stray !== undefined) return `argument ${stray.index + 1} is none of ${known.join(', ')}`;
  const budget = Number(values.boxes);
  if (!(Number.isInteger(budget) && budget > 0)) return `--boxes ${values.boxes} is no number of boxes`;
  const pairs = pointwisePairs();
  const names = values.only === undefined ? [] : String(values.only).split(',');
  const isNamed = (pair: Pair, name: string) => name === pair.functional || name === keyOf(pair);
  const unknown = names.find((name) => !pairs.some((pair) => isNamed(pair, name)));
  if (unknown !== undefined) return `--only ${unknown}: no pointwise pair of the table of verdicts has that name`;
  const asked = pairs.filter(
    (pair) =>
      (names.length === 0 || names.some((name) => isNamed(pair, name))) &&
      (values.verdict === undefined || values.verdict === pair.verdict),
  );
  if (asked.length === 0) return `--verdict ${values.verdict}: no pair asked for has that verdict`;
  return { budget, goesOn: values.continue === true, pairs, asked };
}

async function writeTable({ budget, goesOn, pairs, asked }: Request): Promise<void> {
  const rows = new Map(readProofs().map((row) => [keyOf(row), row]));
  if (!goesOn) for (const pair of asked) rows.delete(keyOf(pair));
  const ofTable = () =>
    pairs.flatMap((pair) => {
      const row = rows.get(keyOf(pair));
      return row === undefined ? [] : [{ ...row, ...pair }];
    });
  const isOpen = (pair: Pair) => {
    const row = rows.get(keyOf(pair));
    return row === undefined || !isFinal(row, budget);
  };
  // What is nearest to a proof comes first.
  const hope = (pair: Pair) => (pair.verdict === 'holds' ? 0 : 2) + (rows.get(keyOf(pair))?.undecided ?? 1);
  const tasks = asked.filter(isOpen).sort((a, b) => hope(a) - hope(b));
  const started = performance.now();
  let done = 0;
  const keep = () => {
    writeProofs(ofTable());
    const seconds = Math.round((performance.now() - started) / 1000);
    console.error(`${done} of ${tasks.length} pairs, ${seconds} s`);
  };
  const timer = setInterval(keep, betweenWrites);
  process.once('SIGINT', () => {
    keep();
    process.exit(130);
  });
  try {
    await proveAll(tasks, budget, (row, seconds) => {
      done++;
      rows.set(keyOf(row), row);
      if (seconds > 10) console.error(`${keyOf(row)}: ${row.outcome}, ${row.boxes} boxes, ${seconds.toFixed(0)} s`);
    });
  } finally {
    clearInterval(timer);
    keep();
  }
  const summary = proofSummary(ofTable());
  writeFileSync(readmeFile, withSummary(readFileSync(readmeFile, 'utf8'), summary));
  console.log(`${proofsFile}: ${ofTable().length} of ${pairs.length} pairs\n\n${summary}`);
}

/** Every thread takes the next pair when it is done with one. */
async function proveAll(
  pairs: readonly Pair[],
  budget: number,
  onRow: (row: ProofRow, seconds: number) => void,
): Promise<void> {
  const waiting = [...pairs];
  const workers = Array.from({ length: Math.min(availableParallelism(), pairs.length) }, serve);
  await Promise.all(workers);

  function serve(): Promise<void> {
    return new Promise((resolve, reject) => {
      const worker = new Worker(fileURLToPath(import.meta.url));
      let begun = performance.now();
      let current: Pair | undefined;
      const next = () => {
        current = waiting.shift();
        begun = performance.now();
        if (current !== undefined) return worker.postMessage({ pair: current, budget } satisfies Task);
        worker.terminate().then(() => resolve(), reject);
      };
      worker.on('message', (row: ProofRow) => {
        onRow(row, (performance.now() - begun) / 1000);
        next();
      });
      worker.on('error', (cause) => reject(new Error(`at ${current && keyOf(current)}`, { cause })));
      next();
    });
  }
}

async function main(): Promise<void> {
  const request = readRequest();
  if (typeof request !== 'string') return writeTable(request);
  console.error(request);
  process.exitCode = 2;
}

if (isMainThread) await main();
else parentPort?.on('message', ({ pair, budget }: Task) => parentPort?.postMessage(provePair(pair, budget)));
