import { describe, expect, test } from 'vitest';
import { bound, labelled, setColumns, textWidth, wrap } from '../../src/report/layout.ts';

describe('layout of text', () => {
  test('symbols count one column each and combining marks none', () => {
    expect(textWidth('ζ ≥ 0')).toBe(5);
    expect(textWidth('ŝ')).toBe(1);
  });

  test('wrapped lines keep to the width, and every word is there', () => {
    const text = 'the quick brown fox jumps over the lazy dog';
    const lines = wrap(text, 12);
    expect(lines.every((line) => textWidth(line) <= 12)).toBe(true);
    expect(lines.join(' ')).toBe(text);
  });

  test('bound words stay on one line and come out with plain spaces', () => {
    expect(wrap(`${bound('r_s 0.51')}, ${bound('ζ 1')}`, 10)).toEqual(['r_s 0.51,', 'ζ 1']);
  });

  test('further lines of a labelled text stand under its first', () => {
    expect(labelled('where', 'one two three four five six', 8, 28)).toEqual([
      'where   one two three four',
      '        five six',
    ]);
  });

  test('columns are as wide as their widest cell', () => {
    const columns = [
      { heading: 'id', align: 'left' as const },
      { heading: 'n', align: 'right' as const },
    ];
    expect(
      setColumns(columns, [
        ['abc', '1'],
        ['d', '200'],
      ]).map((cells) => cells.join(' ')),
    ).toEqual(['id    n', 'abc   1', 'd   200']);
  });
});
