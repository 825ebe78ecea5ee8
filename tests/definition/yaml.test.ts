import { describe, expect, test } from 'vitest';
import { ProblemCollector } from '../../src/definition/collector.ts';
import { plainData } from '../../src/definition/tree.ts';
import { parseYaml } from '../../src/definition/yaml.ts';

function read(text: string) {
  const problems = new ProblemCollector();
  const root = parseYaml(text, 'f.yaml', problems);
  const said = problems.sorted().map(({ line, column, code, message }) => `${line}:${column} ${code} ${message}`);
  return { root, said, remedies: problems.sorted().map(({ remedy }) => remedy) };
}

describe('a YAML text', () => {
  test('keeps every scalar as the text that was written', () => {
    const { root, said } = read('a: 0.10\nb: [1e-9, yes, null, ~, 0x10, 2001-01-01]\nc:\nd: ""\n<<: x');
    expect(said).toEqual([]);
    expect(root && plainData(root)).toEqual({
      a: '0.10',
      b: ['1e-9', 'yes', 'null', '~', '0x10', '2001-01-01'],
      c: null,
      d: '',
      '<<': 'x',
    });
  });

  test('accepts a mark of byte order, directives and one document between its markers', () => {
    for (const text of ['\ufeffa: 1', '%YAML 1.2\n---\na: 1\n...\n', '# only\n---\na: 1']) {
      expect(read(text).said).toEqual([]);
    }
  });
});

describe('a fault in a YAML text is named at its place, by hand count', () => {
  test.each([
    ['a: 1\nb: 2\na: 3', '3:1 duplicate-key the key a is given twice'],
    ['a: &x 1', '1:7 yaml-alias the anchor &x has no place in a sheet'],
    ['a: *x', '1:4 yaml-alias the alias *x has no place in a sheet'],
    ['&x a: 1', '1:4 yaml-alias an anchor or alias has no place in a sheet'],
    ['? [a]\n: b', '1:3 yaml-syntax a key must be a plain name'],
    ['__proto__: b', '1:1 yaml-syntax a key must be a plain name, not __proto__'],
    ['a: !x b', '1:4 yaml-syntax not YAML: unresolved tag: !x'],
    ['a: "b', '1:6 yaml-syntax not YAML: missing closing "quote'],
    ['a: 1\n---\nb: 2', '2:1 yaml-syntax not one YAML document: a second one begins here'],
    ['a: u < v ? w : z', '1:4 yaml-syntax not YAML: nested mappings are not allowed in compact mappings'],
    ['- '.repeat(17), '1:33 yaml-depth values are nested more than 16 deep'],
    ['['.repeat(200_000), '1:17 yaml-depth values are nested more than 16 deep'],
    [' '.repeat(262_145), '1:1 file-too-large the file has 262145 characters; a sheet may have 262144'],
    ['}'.repeat(50_000), '1:20000 file-too-large the file has more than 20000 YAML tokens'],
  ])('%s', (text, expected) => {
    expect(read(text).said).toEqual([expected]);
  });

  test('a conditional that YAML cannot read is told to be quoted', () => {
    expect(read('a: u < v ? w : z').remedies).toEqual([
      'Quote the expression, or write it below a | : in plain YAML a colon before a space ends a text.',
    ]);
  });

  test('sixteen levels are still read', () => {
    expect(read(`${'['.repeat(16)}${']'.repeat(16)}`).said).toEqual([]);
  });

  test('all faults are named at once, in the order of the file', () => {
    expect(read('b: *x\na: &y 1\na: 2').said.map((one) => one.split(' ', 2).join(' '))).toEqual([
      '1:4 yaml-alias',
      '2:7 yaml-alias',
      '3:1 duplicate-key',
    ]);
  });

  test('at most 100 are named, and text of the file is shown short and without control characters', () => {
    const many = read(`a: [${'*x,'.repeat(500)}]`);
    expect(many.said).toHaveLength(100);
    const [said] = read(`"a\\e[31m${'b'.repeat(500)}": 1\n"a\\e[31m${'b'.repeat(500)}": 1`).said;
    expect(said).toBe(`2:1 duplicate-key the key a [31m${'b'.repeat(54)}… is given twice`);
  });
});
