import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { Document, Scalar } from 'yaml';
import { ProblemCollector } from '../../src/definition/collector.ts';
import { TextFile } from '../../src/definition/source-text.ts';
import { sourceOf } from '../../src/definition/tree.ts';
import { parseYaml } from '../../src/definition/yaml.ts';

function valueIn(text: string) {
  const value = sourceOf(parseYaml(text, 'f.yaml', new ProblemCollector()), 'x');
  if (value === undefined) throw new Error(`no value in ${text}`);
  return value;
}

describe('a place in a file', () => {
  test('counts lines and columns from 1 and stays inside the text, by hand count', () => {
    const file = new TextFile('f.yaml', 'ab\ncd\n');
    expect([0, 2, 3, 5, 6, 99, -1].map((offset) => [file.placeAt(offset).line, file.placeAt(offset).column])).toEqual([
      [1, 1],
      [1, 3],
      [2, 1],
      [2, 3],
      [3, 1],
      [3, 1],
      [1, 1],
    ]);
    expect(file.lineAt(4)).toBe('cd');
  });
});

describe('a place in a value, by hand count', () => {
  // Each case: the file, the character of the value to find, and where it stands.
  test.each([
    ['plain', 'x: a + b', 'b', 1, 8],
    ['plain over two lines', 'x: a +\n   b', 'b', 2, 4],
    ['single-quoted', "x: 'a + b'", 'b', 1, 9],
    ['single-quoted after a doubled quote', "x: 'it''s b'", 'b', 1, 11],
    ['double-quoted', 'x: "a + b"', 'b', 1, 9],
    ['double-quoted after escapes', 'x: "\\u0061 \\x61\\n\\"\\t b"', 'b', 1, 23],
    ['double-quoted over two lines', 'x: "a + \\\n  b"', 'b', 2, 3],
    ['literal block', 'x: |\n  a\n  + b\n', 'b', 3, 5],
    ['folded block', 'x: >-\n\n  a\n\n  + b\n', 'b', 5, 5],
    ['block with a comment in its header', 'x: |2- # not b\n    a\n  b', 'b', 3, 3],
    ['block with Windows line ends', 'x: |\r\n  a\r\n  b\r\n', 'b', 3, 3],
    ['flow mapping', '{ y: 1, x: a b }', 'b', 1, 14],
  ])('%s', (_, text, character, line, column) => {
    const value = valueIn(text);
    expect(value.placeAt(value.text.indexOf(character))).toEqual({ file: 'f.yaml', line, column });
  });

  test('white space and the end of the text lie behind the character before them', () => {
    const value = valueIn('x: |\n  a +\n  b\n');
    expect(value.text).toBe('a +\nb\n');
    expect(value.placeAt(3)).toEqual({ file: 'f.yaml', line: 2, column: 6 });
    expect(value.placeAt(99)).toEqual({ file: 'f.yaml', line: 3, column: 4 });
    expect(valueIn("x: ''").placeAt(0)).toEqual({ file: 'f.yaml', line: 1, column: 4 });
  });
});

describe('every character of a value is found where the file has it (the writer of the yaml package is the oracle)', () => {
  // Distinct characters, so that each stands in one place only; quotes and a backslash make escapes.
  const distinct = [...'abcdefghijklmnopqrstuvwz0123456789+*/^()<>=?:,é中文字\'"\\#-'];
  const text = fc
    .tuple(fc.shuffledSubarray(distinct, { minLength: 1 }), fc.array(fc.constantFrom('', '', ' ', '\n', '  ', '\n\n')))
    .map(([characters, gaps]) => characters.map((one, at) => one + (gaps[at] ?? '')).join(''));
  const styles = [
    Scalar.PLAIN,
    Scalar.QUOTE_SINGLE,
    Scalar.QUOTE_DOUBLE,
    Scalar.BLOCK_FOLDED,
    Scalar.BLOCK_LITERAL,
  ] as const;

  test.each(styles)('%s', (style) => {
    let usable = 0;
    const property = fc.property(text, fc.integer({ min: 4, max: 40 }), (written, lineWidth) => {
      const scalar = new Scalar(written);
      scalar.type = style;
      const source = new Document({ first: 'one', x: scalar }).toString({ lineWidth, minContentWidth: 4 });
      const value = sourceOf(parseYaml(source, 'f.yaml', new ProblemCollector()), 'x');
      // The writer does not always write what it was given (`a:` before a line end, a blank line after |).
      if (value?.text !== written) return;
      usable++;
      const lines = source.split('\n');
      const found = [...written].map((one, offset) => {
        const { line, column } = value.placeAt(offset);
        const there = (lines[line - 1] as string).slice(column - 1);
        const escaped = /^(\\["\\]|'')/.exec(there)?.[0].at(-1);
        return { one, there: escaped === one ? escaped : (there[0] ?? '') };
      });
      for (const { one, there } of found) if (!/\s/.test(one)) expect(there).toBe(one);
    });
    fc.assert(property, { seed: 20261, numRuns: 300 });
    expect(usable).toBeGreaterThan(200);
  });
});
