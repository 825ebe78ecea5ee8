import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';

/** Tests and scripts are run from the root of the project. */
const root = resolve('.');

let built: string | undefined;

/** The path of the built program. */
export function builtProgram(): string {
  built ??= buildProgram();
  return built;
}

/** The program built from the source as it is now; built once, however many tests ask at the same time. */
function buildProgram(): string {
  const hash = createHash('sha256');
  for (const file of readdirSync(join(root, 'src'), { recursive: true, encoding: 'utf8' }).sort()) {
    if (/\.(ts|json)$/.test(file)) hash.update(file).update(readFileSync(join(root, 'src', file)));
  }
  const folder = join(root, 'dist', 'under-test', hash.digest('hex').slice(0, 16));
  if (!existsSync(folder)) {
    const temporary = `${folder}.${process.pid}`;
    const { status, stderr } = spawnSync('node', ['build.js', 'program', temporary], { cwd: root, encoding: 'utf8' });
    if (status !== 0) throw new Error(stderr);
    try {
      renameSync(temporary, folder);
    } catch {
      // Another test was faster.
      rmSync(temporary, { recursive: true, force: true });
    }
    // Builds of yesterday's source are of no use; one of an hour ago may be in use.
    for (const other of readdirSync(join(folder, '..'))) {
      const path = join(folder, '..', other);
      if (Date.now() - statSync(path).mtimeMs > 86_400_000) rmSync(path, { recursive: true, force: true });
    }
  }
  return join(folder, 'cli.js');
}

export interface Ended {
  readonly status: number | null;
  readonly signal: NodeJS.Signals | null;
  readonly out: string;
  readonly err: string;
  /** Milliseconds. */
  readonly time: number;
}

export interface Running {
  readonly child: ChildProcess;
  readonly ended: Promise<Ended>;
  /** What has been written so far. */
  readonly out: () => string;
}

/** Starts the built program in a folder; its cache is a folder of that folder. */
export function start(folder: string, args: readonly string[]): Running {
  const begun = performance.now();
  const env = { ...process.env, XDG_CACHE_HOME: join(folder, '.cache'), NO_COLOR: '1' };
  const child = spawn(process.execPath, [builtProgram(), ...args], { cwd: folder, env });
  let out = '';
  let err = '';
  child.stdout.on('data', (data: Buffer) => {
    out += data.toString();
  });
  child.stderr.on('data', (data: Buffer) => {
    err += data.toString();
  });
  const ended = new Promise<Ended>((done) => {
    child.on('close', (status, signal) => done({ status, signal, out, err, time: performance.now() - begun }));
  });
  return { child, ended, out: () => out };
}

export function run(folder: string, ...args: readonly string[]): Promise<Ended> {
  return start(folder, args).ended;
}

/** An invented exchange sheet; `slope` makes it another one. */
export function sheet(slope: string, name = 'Invented'): string {
  return `name: ${name}\nrung: gga\nparameters: { slope: ${slope} }\nexchange:\n  enhancement: 1 + slope*s^2/(1 + s^2)\n`;
}

/** Writes files into a folder, their folders too. */
export function writeFiles(folder: string, files: Readonly<Record<string, string>>): void {
  for (const [name, text] of Object.entries(files)) {
    mkdirSync(join(folder, name, '..'), { recursive: true });
    writeFileSync(join(folder, name), text);
  }
}

/** Conditions of the catalogue that are looked at quickly. */
export const quick = 'exchange-non-positive,exchange-uniform-gas,exchange-lieb-oxford,exchange-coordinate-scaling';
