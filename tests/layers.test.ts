import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';

/** Which folders of src/ may be imported by which: DEVELOPERS.md, "The pipeline". */
const mayImport: Record<string, readonly string[]> = {
  errors: [],
  number: ['errors'],
  finding: ['errors'],
  graph: ['number', 'errors'],
  search: ['number', 'errors'],
  definition: ['number', 'errors'],
  expression: ['graph', 'number', 'errors'],
  derivative: ['graph', 'number'],
  interval: ['number'],
  rewrite: ['graph', 'number'],
  kernel: ['graph', 'interval', 'number'],
  recheck: ['graph', 'number'],
  functional: ['definition', 'expression', 'graph', 'number', 'errors'],
  shelf: ['definition', 'functional', 'errors'],
  quality: [
    'finding',
    'definition',
    'functional',
    'evaluate',
    'derivative',
    'kernel',
    'search',
    'graph',
    'number',
    'errors',
  ],
  extrapolate: ['number'],
  'closed-form': ['graph'],
  constraint: [
    'quality',
    'extrapolate',
    'closed-form',
    'definition',
    'expression',
    'functional',
    'derivative',
    'kernel',
    'search',
    'finding',
    'graph',
    'number',
    'errors',
  ],
  evaluate: ['definition', 'functional', 'derivative', 'kernel', 'graph', 'number', 'errors'],
  map: [
    'constraint',
    'definition',
    'evaluate',
    'expression',
    'functional',
    'kernel',
    'search',
    'finding',
    'graph',
    'number',
    'errors',
  ],
  figure: ['finding', 'report', 'errors'],
  proof: [
    'constraint',
    'rewrite',
    'interval',
    'recheck',
    'functional',
    'kernel',
    'search',
    'finding',
    'graph',
    'number',
    'errors',
  ],
  run: [
    'constraint',
    'closed-form',
    'proof',
    'definition',
    'functional',
    'search',
    'shelf',
    'finding',
    'number',
    'errors',
  ],
  report: ['finding', 'errors'],
  page: [
    'constraint',
    'definition',
    'evaluate',
    'expression',
    'functional',
    'kernel',
    'map',
    'report',
    'finding',
    'graph',
    'number',
    'errors',
  ],
  'page-script': ['page', 'map', 'finding', 'figure', 'kernel', 'search', 'report'],
  cli: [
    'closed-form',
    'errors',
    'number',
    'finding',
    'definition',
    'functional',
    'search',
    'shelf',
    'constraint',
    'evaluate',
    'page',
    'report',
    'map',
    'figure',
    'proof',
    'run',
  ],
};

/** Packages that only one folder may use. */
const packageOwners: Record<string, readonly string[]> = {
  mathjs: ['expression'],
  yaml: ['definition'],
  zod: ['definition', 'finding'],
  'decimal.js': ['number'],
  'fraction.js': ['number'],
  commander: ['cli'],
  '@resvg/resvg-js': ['cli'],
  'd3-contour': ['map', 'figure'],
  'd3-scale': ['figure'],
  'd3-shape': ['figure'],
  'culori/fn': ['figure', 'page-script'],
};

interface ImportLine {
  readonly file: string;
  readonly folder: string;
  readonly target: string;
}

const imports = readdirSync('src', { recursive: true, encoding: 'utf8' })
  .filter((path) => path.endsWith('.ts') && path.includes('/'))
  .flatMap((path): ImportLine[] => {
    const text = readFileSync(join('src', path), 'utf8');
    return [...text.matchAll(/^(?:import|export)[^'"]*?from\s*['"]([^'"]+)['"]/gm)].map((match) => ({
      file: path,
      folder: path.split('/')[0] as string,
      target: match[1] as string,
    }));
  });

describe('the layers of src/ (DEVELOPERS.md)', () => {
  test('imports are read at all', () => expect(imports.length).toBeGreaterThan(100));

  test('every folder has its rule', () => {
    const folders = readdirSync('src', { withFileTypes: true }).filter((entry) => entry.isDirectory());
    expect(folders.map(({ name }) => name).filter((name) => !(name in mayImport))).toEqual([]);
  });

  test('folders import only what lies below them', () => {
    const broken = imports.filter(({ folder, target }) => {
      const match = /^\.\.\/([^/]+)\//.exec(target);
      return match !== null && match[1] !== folder && !mayImport[folder]?.includes(match[1] as string);
    });
    expect(broken).toEqual([]);
  });

  test('packages are used only where they belong', () => {
    const broken = imports.filter(({ folder, target }) => {
      const owners = packageOwners[target];
      return !target.startsWith('.') && !target.startsWith('node:') && !owners?.includes(folder);
    });
    expect(broken).toEqual([]);
  });
});
