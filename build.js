import { spawnSync } from 'node:child_process';
import { copyFileSync, mkdirSync, rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

process.chdir(dirname(fileURLToPath(import.meta.url)));

// Scripts of the project's own: `node build.js bench` makes dist/bench.js.
const scripts = {
  bench: 'tests/bench/grid.ts',
  verdicts: 'tests/verdicts/write.ts',
  proofs: 'tests/verdicts/write-proofs.ts',
  glyphs: 'tests/figure/glyphs/write.ts',
  soak: 'tests/ci/soak-long.ts',
};
// Packages in CommonJS form may ask for built-in modules.
const banner = {
  js: "import { createRequire as makeRequire } from 'node:module'; const require = makeRequire(import.meta.url);",
};
// `node build.js program <folder>` builds the program alone, `node build.js all <folder>` everything, elsewhere.
const [script, outdir = 'dist'] = process.argv.slice(2);
if (script !== undefined && !['program', 'all', 'page'].includes(script)) {
  await build({
    entryPoints: { [script]: scripts[script] },
    outdir: 'dist',
    bundle: true,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    banner,
    logLevel: 'warning',
  });
  process.exit(0);
}

// The script and the style of the page that `rungcheck report` writes; `node build.js page` builds them alone.
await build({
  entryPoints: { 'report-page': 'src/page-script/main.ts' },
  outdir,
  bundle: true,
  minify: true,
  platform: 'browser',
  format: 'iife',
  target: 'es2022',
  legalComments: 'none',
  logLevel: 'warning',
});
await build({
  entryPoints: { 'report-page': 'src/page-script/page.css' },
  outdir,
  minify: true,
  logLevel: 'warning',
});
if (script === 'page') process.exit(0);

// What is left of an earlier build must not be found by a later one.
for (const path of ['cli.js', 'worker.js', 'index.js', 'parts', 'types'])
  rmSync(join(outdir, path), { recursive: true, force: true });
mkdirSync(outdir, { recursive: true });

const library = script !== 'program';

// Of zod's messages only the English ones are wanted; the others are a third of the bundle.
const englishOnly = {
  name: 'english-only',
  setup(bundle) {
    bundle.onLoad({ filter: /zod[/\\]v4[/\\]locales[/\\]index\.js$/ }, () => ({
      contents: "export { default as en } from './en.js';",
      loader: 'js',
    }));
  },
};

// The commands are loaded when asked for (dynamic imports become files of their own), so that --version and --help
// need not load the engine.
await build({
  entryPoints: { cli: 'src/cli/main.ts', worker: 'src/run/worker.ts', ...(library ? { index: 'src/index.ts' } : {}) },
  outdir,
  chunkNames: 'parts/[name]-[hash]',
  bundle: true,
  splitting: true,
  platform: 'node',
  format: 'esm',
  target: 'node20',
  minifySyntax: true,
  legalComments: 'linked',
  banner: {
    js: "import { createRequire as makeRequire } from 'node:module'; const require = makeRequire(import.meta.url);",
  },
  plugins: [englishOnly],
  // Native code, with a package for each platform.
  external: ['@resvg/resvg-js'],
  logLevel: 'warning',
});

// The letters of figures are outlines of a font, whose license goes with them.
copyFileSync('src/figure/glyphs-license.txt', join(outdir, 'glyphs-license.txt'));

if (library) emitTypes();

function emitTypes() {
  const compiler = join(dirname(createRequire(import.meta.url).resolve('typescript/package.json')), 'bin', 'tsc');
  const options = ['--noEmit', 'false', '--emitDeclarationOnly', '--declaration', '--outDir', join(outdir, 'types')];
  const fixed = ['--rootDir', 'src', '--target', 'es2023', '--module', 'nodenext', '--moduleResolution', 'nodenext'];
  const flags = [
    '--strict',
    '--skipLibCheck',
    '--allowImportingTsExtensions',
    '--rewriteRelativeImportExtensions',
    '--verbatimModuleSyntax',
  ];
  const entry = ['--types', 'node', 'src/index.ts'];
  const { status, error } = spawnSync(
    process.execPath,
    [compiler, '--ignoreConfig', ...fixed, ...flags, ...options, ...entry],
    {
      stdio: 'inherit',
    },
  );
  if (error !== undefined) throw error;
  if (status !== 0) process.exit(status ?? 1);
}
