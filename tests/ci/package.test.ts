import { spawnSync } from 'node:child_process';
import {
  chmodSync,
  copyFileSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { parse } from 'yaml';
import { quick, sheet, writeFiles } from './program.ts';

const root = resolve(import.meta.dirname, '../..');
let folder = '';
let app = '';

/** Runs a command in the scratch project, its caches in the scratch folder. */
function execute(command: string, args: readonly string[], cwd = app) {
  const env = {
    ...process.env,
    HOME: folder,
    XDG_CACHE_HOME: join(folder, 'cache'),
    npm_config_cache: npmCache,
    npm_config_prefer_offline: 'true',
    npm_config_audit: 'false',
    npm_config_fund: 'false',
    npm_config_update_notifier: 'false',
  };
  const { status, stdout, stderr } = spawnSync(command, args, { cwd, env, encoding: 'utf8' });
  return { status, out: stdout, err: stderr };
}

const npmCache = spawnSync('npm', ['config', 'get', 'cache'], { encoding: 'utf8' }).stdout.trim();
const git = (...args: string[]) => execute('git', ['-c', 'user.name=A', '-c', 'user.email=a@example.org', ...args]);

/** Packs the project as `npm pack` does, from a copy with a fresh build, and installs it into an empty project. */
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rungcheck-package-'));
  const copy = join(folder, 'copy');
  app = join(folder, 'app');
  const built = join(folder, 'copy', 'dist');
  for (const part of ['package.json', 'README.md', 'bin', 'functionals', 'constraints']) {
    cpSync(join(root, part), join(copy, part), { recursive: true });
  }
  const build = spawnSync('node', ['build.js', 'all', built], { cwd: root, encoding: 'utf8' });
  if (build.status !== 0) throw new Error(build.stderr);
  mkdirSync(app);
  const packed = execute('npm', ['pack', '--ignore-scripts', '--pack-destination', app], copy);
  if (packed.status !== 0) throw new Error(packed.err);
  writeFiles(app, {
    'package.json': '{ "name": "app", "private": true, "type": "module" }\n',
    '.gitignore': 'node_modules/\n*.sarif\n*.xml\n',
    'rungcheck.yaml': `sheets: [functionals]\nonly: [${quick}]\n`,
    'functionals/mine.yaml': sheet('0.7'),
  });
  const [tarball = ''] = readdirSync(app).filter((name) => name.endsWith('.tgz'));
  const installed = execute('npm', ['install', '--save-dev', '--ignore-scripts', `./${tarball}`]);
  if (installed.status !== 0) throw new Error(installed.err);
}, 120_000);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('the package', () => {
  test('runs where it is installed', () => {
    const { status, out } = execute('npx', ['rungcheck', 'vet', 'pbe', '--only', quick]);
    expect([status, out]).toEqual([0, expect.stringContaining('exchange-lieb-oxford')]);
  });

  test('draws a picture in pixels, for which it needs native code', () => {
    const { status, err } = execute('npx', ['rungcheck', 'plot', 'pbe', '--out', 'pbe.png']);
    expect([status, err]).toEqual([0, '']);
  });

  test('has types for a library user', () => {
    const used = `import { openShelf, type Findings } from 'rungcheck';
const shelf = openShelf({ functionals: [], constraints: [] });
const found = shelf.functional('x');
export const name: string = found.ok ? found.value.definition.name : found.problems[0]?.message ?? '';
export const verdictOf = (findings: Findings) => findings.functionals[0]?.findings[0]?.verdict;
// @ts-expect-error a verdict is one of five words
export const none: 'broken' | undefined = verdictOf({} as Findings);
`;
    writeFiles(app, { 'use.ts': used });
    const flags = [
      '--noEmit',
      '--strict',
      '--module',
      'nodenext',
      '--target',
      'es2022',
      '--ignoreConfig',
      '--types',
      'node',
    ];
    const roots = ['--typeRoots', join(root, 'node_modules', '@types')];
    const compiler = join(root, 'node_modules', 'typescript', 'bin', 'tsc');
    const { status, out } = execute(process.execPath, [compiler, ...flags, ...roots, 'use.ts']);
    expect([status, out]).toEqual([0, '']);
  });
});

describe('the recipes, run in a scratch git repository', () => {
  beforeAll(() => {
    git('init', '-q');
    expect(execute('npx', ['rungcheck', 'vet', '--record', 'rungcheck-state.json']).status).toBe(0);
    copyFileSync(join(root, 'recipes', 'pre-commit.sh'), join(app, '.git', 'hooks', 'pre-commit'));
    chmodSync(join(app, '.git', 'hooks', 'pre-commit'), 0o755);
    copyFileSync(join(root, 'recipes', 'ci.sh'), join(app, 'ci.sh'));
  });

  test('the hook lets a commit pass that is no worse, and stops one that is', () => {
    git('add', '.');
    expect(git('commit', '-q', '-m', 'a').status).toBe(0);
    writeFiles(app, { 'functionals/mine.yaml': sheet('0.9') });
    git('add', '.');
    const stopped = git('commit', '-q', '-m', 'b');
    expect([stopped.status, stopped.out + stopped.err]).toEqual([1, expect.stringContaining('▼ worse')]);
    git('reset', '-q', '--hard');
  });

  test('the script passes and leaves JUnit XML', () => {
    expect(execute('sh', ['ci.sh']).status).toBe(0);
    expect(readFileSync(join(app, 'rungcheck.xml'), 'utf8')).toContain('failures="0"');
  });

  test('the commands of the hosted workflow fail when a functional is worse, annotate its sheet and write SARIF', () => {
    const workflow = parse(readFileSync(join(root, 'recipes', 'workflow.yml'), 'utf8')) as {
      jobs: { vet: { steps: { run?: string; with?: Record<string, string> }[] } };
    };
    const { steps } = workflow.jobs.vet;
    const commands = steps.flatMap(({ run }) => (run === undefined || run === 'npm ci' ? [] : [run]));
    writeFiles(app, { 'functionals/mine.yaml': sheet('0.9') });
    const ended = commands.map((command) => execute('bash', ['-e', '-c', command]));
    expect(ended.map(({ status }) => status)).toEqual([1]);
    expect(ended[0]?.out).toMatch(
      /^::error file=functionals\/mine\.yaml,line=5,col=16,title=Lieb-Oxford bound on exchange::/,
    );
    const uploaded = steps.at(-1)?.with?.sarif_file ?? '';
    expect(existsSync(join(app, uploaded))).toBe(true);
  });

  test('the README shows them as they are', () => {
    const readme = readFileSync(join(root, 'README.md'), 'utf8');
    if (!readme.includes('## In continuous integration')) return;
    for (const file of readdirSync(join(root, 'recipes'))) {
      expect(readme).toContain(readFileSync(join(root, 'recipes', file), 'utf8'));
    }
  });
});
