import { describe, expect, test } from 'vitest';
import { explanationText } from '../../src/report/explain.ts';
import { textWidth } from '../../src/report/layout.ts';
import { constraintList, functionalList } from '../../src/report/list.ts';

const plain = { width: 100, colour: false };

describe('lists and explanations, from invented data', () => {
  test('functionals are one line each, with the share of exact exchange', () => {
    const text = functionalList(
      [
        {
          id: 'inv-0',
          name: 'INV-0',
          rung: 'gga',
          year: 2001,
          parts: ['exchange', 'correlation'],
          parameters: 3,
          exactExchange: '0.25',
          summary: null,
        },
        {
          id: 'inv-c',
          name: 'INV-C',
          rung: 'lda',
          year: null,
          parts: ['correlation'],
          parameters: 0,
          exactExchange: null,
          summary: null,
        },
      ],
      plain,
    );
    expect(text.split('\n')).toEqual([
      'id     name   year  parameters  gives  exact exchange',
      'lda',
      'inv-c  INV-C                 ·  c',
      '',
      'hybrid gga',
      'inv-0  INV-0  2001           3  x + c  0.25',
      '',
      '2 functionals',
      '',
    ]);
  });

  test('conditions have their titles where there is room, and leave them out where not', () => {
    const listed = [
      {
        id: 'inv-bound',
        title: 'Invented bound',
        part: 'exchange' as const,
        force: 'sufficient' as const,
        status: 'theorem' as const,
      },
    ];
    expect(constraintList(listed, { width: 140, colour: false })).toContain('Invented bound');
    expect(constraintList(listed, { width: 60, colour: false })).not.toContain('Invented bound');
  });

  test('an explanation is the golden text', async () => {
    const text = explanationText(
      {
        id: 'invented-bound',
        title: 'Invented bound',
        statement: 'E_x[n] ≥ −C ∫ n^(4/3), said of nothing in particular',
        localForm: 'F_x ≤ C/A_x',
        requirement: 'Fx <= C/A',
        derivation:
          'Two lines that say how the local form comes about, long enough that they have to be broken somewhere.',
        force: 'sufficient',
        status: 'theorem',
        gate: { level: 'note', reason: 'invented' },
        part: 'exchange',
        rungs: ['lda', 'gga'],
        domain: 'r_s 0.01 … 100 (log), s 0 … 5',
        constants: [{ name: 'invented', value: '1.5', meaning: 'C', published: [{ value: '1.5', source: 'nobody' }] }],
        tolerance: '1e-9',
        toleranceReason: 'round-off',
        conflicts: [{ rungs: ['lda'], with: 'another', reason: 'it has no s' }],
        holds: ['inv-0'],
        breaks: [{ id: 'inv-c', where: 'everywhere', source: 'this file' }],
        traps: ['Beware of one.', 'And of another.'],
        sources: ['N. Obody, J. Inv. 1, 1 (1900)'],
      },
      plain,
    );
    expect(text.split('\n').every((line) => textWidth(line) <= 100)).toBe(true);
    await expect(text).toMatchFileSnapshot('golden/explain.txt');
  });
});
