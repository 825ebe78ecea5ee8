import { describe, expect, test } from 'vitest';
import { parseConstraintSheet } from '../../src/definition/constraint.ts';
import { acceptedValue, origin, problemsOf, wholeConstraint } from './sheets.ts';

const parse = (text: string) => parseConstraintSheet(text, origin);

const necessary = `title: t
statement: s
force: definition
status: rule
sources: [a]
part: exchange
rungs: [gga]
requirement: Fx >= 0
tolerance: 0
`;

describe('a constraint sheet', () => {
  test('with every key gives the definition that it states', () => {
    expect(acceptedValue(parse(wholeConstraint))).toMatchObject({
      id: 'f',
      file: 'f.yaml',
      text: wholeConstraint,
      title: 'Correlation energy under uniform coordinate scaling',
      statement: 'E_c[n_γ] ≥ γ E_c[n] for γ > 1',
      localForm: '∂F_c/∂r_s ≥ 0',
      derivation: 'r_s goes to r_s/γ',
      force: 'sufficient',
      status: 'theorem',
      gate: { level: 'warn', reason: 'a reason' },
      sources: ['Levy, Perdew, PRA 32, 2010 (1985)'],
      part: 'correlation',
      rungs: ['lda', 'gga', 'meta-gga'],
      space: 'spin',
      at: [
        { name: 'zeta', value: { text: '1' }, place: { line: 13, column: 7 } },
        { name: 's', value: { text: '1/2' } },
      ],
      uses: [{ alias: 'gas', sheet: 'pw92', parameters: [] }],
      constants: [{ name: 'C', constant: 'lieb-oxford' }],
      requirement: { text: 'd(Fc, rs) >= 0' },
      relative: true,
      tolerance: 1e-9,
      toleranceReason: 'round-off',
      sweep: [{ name: 'rs', values: [{ text: '1' }, { text: '10' }] }],
      table: {
        columns: [{ text: 's' }, { text: 'value' }],
        rows: [
          [{ text: '0' }, { text: '1' }],
          [{ text: '1' }, { text: '1/2' }],
        ],
      },
      cannotMeet: [{ rungs: ['lda', 'gga'], with: 'correlation-uniform-gas', reason: 'known' }],
      holds: [{ id: 'pbe', place: { line: 23, column: 9 } }],
      breaks: [{ id: 'lyp', where: 's > 1', source: 'somebody' }],
      traps: ['one', 'two'],
    });
  });

  test('names a rule in the place of a requirement', () => {
    const sheet = acceptedValue(parse(necessary.replace('requirement: Fx >= 0', 'rule: digits-lost')));
    expect(sheet).toMatchObject({ rule: 'digits-lost', requirement: { text: 'digits-lost' } });
    expect(problemsOf(parse(necessary.replace('requirement: Fx >= 0\n', '')))).toEqual([
      '1:1 missing-key the sheet has no requirement',
    ]);
    expect(problemsOf(parse(`${necessary}rule: digits-lost\n`))).toEqual([
      '10:1 duplicate-key the sheet has a requirement and a rule',
    ]);
    expect(problemsOf(parse(necessary.replace('requirement: Fx >= 0', 'rule: digit-lost')))).toEqual([
      expect.stringMatching(/^8:7 wrong-value rule must be one of /),
    ]);
  });

  test('with the necessary keys alone is about the slice, absolute and without gate', () => {
    const sheet = acceptedValue(parse(necessary));
    expect(sheet).toMatchObject({ space: 'slice', relative: false, tolerance: 0, at: [], holds: [], breaks: [] });
    expect('gate' in sheet).toBe(false);
    expect(sheet.requirement.placeAt(3)).toEqual({ file: 'f.yaml', line: 8, column: 17 });
  });
});

describe('a fault in a constraint sheet is named at its place, by hand count', () => {
  test.each([
    ['a missing key', necessary.replace('tolerance: 0\n', ''), ['1:1 missing-key the sheet has no tolerance']],
    [
      'a negative tolerance',
      necessary.replace('tolerance: 0', 'tolerance: -1e-9'),
      ['9:12 wrong-value tolerance must be a decimal number that is not negative, not "-1e-9"'],
    ],
    [
      'a tolerance in hexadecimal',
      necessary.replace('tolerance: 0', 'tolerance: 0x1'),
      ['9:12 wrong-value tolerance must be a decimal number that is not negative, not "0x1"'],
    ],
    [
      'an unknown force',
      necessary.replace('definition', 'suficient'),
      ['3:8 wrong-value force must be one of necessary-and-sufficient, sufficient, definition, not "suficient"'],
    ],
    [
      'an unknown rung in a list',
      necessary.replace('[gga]', '[gga, mga]'),
      ['7:14 wrong-value rungs item 2 must be one of lda, gga, meta-gga, not "mga"'],
    ],
    [
      'an empty list of rungs',
      necessary.replace('[gga]', '[]'),
      ['7:8 wrong-value rungs must be a list with at least one rung, not a list'],
    ],
    ['an unknown coordinate', `${necessary}at: { zta: 1 }`, ['10:7 unknown-key unknown key zta in at']],
    [
      'an unknown key in a list',
      `${necessary}breaks: [{ id: lyp, were: x }]`,
      ['10:21 unknown-key unknown key were in breaks item 1'],
    ],
    [
      'a functional id with capitals',
      `${necessary}holds: [PBE]`,
      ['10:9 wrong-value holds item 1 must be a functional id: lower case letters, digits and hyphens, not "PBE"'],
    ],
    [
      'relative neither true nor false',
      `${necessary}relative: maybe`,
      ['10:11 wrong-value relative must be true or false, not "maybe"'],
    ],
    ['a gate without reason', `${necessary}gate: warn`, ['10:1 missing-key the sheet has a gate and no gate-reason']],
    [
      'a reason without gate',
      `${necessary}gate-reason: a`,
      ['10:1 missing-key the sheet has a gate-reason and no gate'],
    ],
    [
      'a constant named like an import',
      `${necessary}uses: { C: pw92 }\nconstants: { C: lieb-oxford }`,
      ['11:14 duplicate-key C is a constant here and an alias in line 10'],
    ],
    ['a list for a sheet', '[]', ['1:1 wrong-value the sheet must be a mapping of keys, not a list']],
    ['not YAML', 'title: "', ['1:9 yaml-syntax not YAML: missing closing "quote']],
  ])('%s', (_, text, expected) => {
    expect(problemsOf(parse(text))).toEqual(expected);
  });
});
