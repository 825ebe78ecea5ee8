import { describe, expect, test } from 'vitest';
import { parseFunctionalSheet } from '../../src/definition/functional.ts';
import { acceptedValue, origin, problemsOf, wholeFunctional } from './sheets.ts';

const parse = (text: string) => parseFunctionalSheet(text, origin);
const head = 'name: a\nrung: lda\n';

describe('a functional sheet', () => {
  test('with every key gives the definition that it states', () => {
    const sheet = acceptedValue(parse(wholeFunctional));
    expect(sheet).toMatchObject({
      id: 'f',
      file: 'f.yaml',
      text: wholeFunctional,
      name: 'Whole',
      year: 2026,
      rung: 'meta-gga',
      summary: 'every key once',
      notes: 'invented for tests',
      citations: ['nobody, nowhere (2026)'],
      nonLocal: 'vv10',
      uses: [
        { alias: 'gas', sheet: 'pw92', parameters: [], place: { line: 9, column: 3 } },
        { alias: 'base', sheet: 'pbe', parameters: [{ name: 'mu', value: { text: '10/81' } }] },
      ],
      parameters: [
        { name: 'kappa', value: { text: '0.8040' }, place: { line: 12, column: 3 } },
        { name: 'mu', value: { text: '0.21951' }, digits: 5, source: 'Eq. (12)', meaning: 'gradient coefficient' },
      ],
      functions: [{ name: 'G', arguments: ['rs', 'A'], body: { text: '-2*A*(1 + rs)' } }],
      where: [{ name: 'u', value: { text: 'kappa*s^2' } }],
      exactExchange: {
        kind: 'range-separated',
        shortRange: { text: '0.19' },
        longRange: { text: '0.65' },
        omega: { text: '0.33' },
      },
      parts: [
        {
          name: 'exchange',
          where: [{ name: 'F', value: { text: 's < 1\n  ? kappa : mu\n' } }],
          form: { kind: 'enhancement', value: { text: '1 + F' } },
          place: { line: 20, column: 1 },
        },
        {
          name: 'correlation',
          where: [],
          form: { kind: 'pairs', partition: 'gas', sameSpin: { text: '1' }, oppositeSpin: { text: 'u' } },
        },
      ],
    });
  });

  test('with the necessary keys alone leaves the others out', () => {
    const sheet = acceptedValue(parse(`${head}exchange: { per-volume: 1 }\nexact-exchange: 1/4`));
    expect(Object.keys(sheet).toSorted()).toEqual(
      'citations exactExchange file functions id name parameters parts rung text uses where'.split(' '),
    );
    expect(sheet.exactExchange).toMatchObject({ kind: 'global', fraction: { text: '1/4' } });
  });

  test('takes a part of another sheet in the long and in the short form', () => {
    const uses = 'uses: { base: pbe }\n';
    const long = acceptedValue(parse(`${head}${uses}exchange: { from: base }`)).parts[0];
    const short = acceptedValue(parse(`${head}${uses}exchange: base`)).parts[0];
    expect(long?.form).toMatchObject({ kind: 'from', alias: 'base', place: { line: 4, column: 19 } });
    expect(short?.form).toMatchObject({ kind: 'from', alias: 'base', place: { line: 4, column: 11 } });
  });

  test('lets two parts use the same name for steps of their own', () => {
    const part = '{ where: { y: 1 }, per-particle: y }';
    expect(problemsOf(parse(`${head}exchange: ${part}\ncorrelation: ${part}`))).toEqual([]);
  });
});

describe('a fault in a functional sheet is named at its place, by hand count', () => {
  const x = 'exchange: { per-particle: 1 }\n';
  test.each([
    ['an empty file', '', ['1:1 wrong-value the sheet is empty']],
    ['a list', '- a', ['1:1 wrong-value the sheet must be a mapping of keys, not a list']],
    ['a text', 'a', ['1:1 wrong-value the sheet must be a mapping of keys, not "a"']],
    ['no name', `rung: lda\n${x}`, ['1:1 missing-key the sheet has no name']],
    ['no rung', `name: a\n${x}`, ['1:1 missing-key the sheet has no rung']],
    ['no part', head, ['1:1 missing-key the sheet has no part']],
    [
      'an unknown rung',
      `name: a\nrung: gag\n${x}`,
      ['2:7 wrong-value rung must be one of lda, gga, meta-gga, not "gag"'],
    ],
    ['an unknown key', `${head}${x}yaer: 1`, ['4:1 unknown-key unknown key yaer']],
    [
      'an unknown key of a part',
      `${head}exchange: { per-particle: 1, wher: {} }`,
      ['3:30 unknown-key unknown key wher in exchange'],
    ],
    [
      'an unknown key of a parameter',
      `${head}${x}parameters: { a: { value: 1, unit: 2 } }`,
      ['4:30 unknown-key unknown key unit in parameters.a'],
    ],
    [
      'enhancement outside exchange',
      `${head}correlation: { enhancement: 1, per-particle: 1 }`,
      ['3:16 unknown-key unknown key enhancement in correlation'],
    ],
    [
      'an impossible year',
      `${head}${x}year: 1066`,
      ['4:7 wrong-value year must be a whole number from 1920 to 2100, not "1066"'],
    ],
    ['a key without value', `${head}${x}summary:`, ['4:1 wrong-value summary has no value']],
    ['a blank text', `name: " "\nrung: lda\n${x}`, ['1:7 wrong-value name must be a text, not " "']],
    ['a list where a text belongs', `${head}${x}notes: [a]`, ['4:8 wrong-value notes must be a text, not a list']],
    ['a text where a list belongs', `${head}${x}citations: a`, ['4:12 wrong-value citations must be a list, not "a"']],
    [
      'a mapping where a citation belongs',
      `${head}${x}citations: [a, { b: c }]`,
      ['4:16 wrong-value citations item 2 must be a text, not a mapping'],
    ],
    [
      'a list where an expression belongs',
      `${head}exchange: { per-particle: [1] }`,
      ['3:27 wrong-value exchange.per-particle must be an expression, not a list'],
    ],
    [
      'too many digits',
      `${head}${x}parameters: { a: { value: 1, digits: 41 } }`,
      ['4:38 wrong-value parameters.a.digits must be a whole number from 1 to 40, not "41"'],
    ],
    [
      'a parameter without value',
      `${head}${x}parameters: { a: { digits: 4 } }`,
      ['4:15 missing-key parameters.a has no value'],
    ],
    [
      'a bad parameter name',
      `${head}${x}parameters: { 1a: 1 }`,
      ['4:15 wrong-value 1a must be a name: a letter, then letters, digits and _'],
    ],
    [
      'a bad step name',
      `${head}where: { a-b: 1 }\n${x}`,
      ['3:10 wrong-value a-b must be a name: a letter, then letters, digits and _'],
    ],
    [
      'a function without arguments',
      `${head}${x}functions: { G: 1 }`,
      ['4:14 wrong-value G must be a function with its arguments, such as G(rs, A); quote it inside { }'],
    ],
    ['an argument twice', `${head}${x}functions:\n  G(a, a): 1`, ['5:3 wrong-value G has two arguments called a']],
    [
      'a sheet id with capitals',
      `${head}${x}uses: { a: PBE }`,
      ['4:12 wrong-value uses.a must be a sheet id: lower case letters, digits and hyphens, not "PBE"'],
    ],
    [
      'a changed sheet without id',
      `${head}${x}uses: { a: { parameters: {} } }`,
      ['4:9 missing-key uses.a has no sheet'],
    ],
    [
      'a missing end of the range',
      `${head}${x}exact-exchange: { short-range: 1, omega: 1 }`,
      ['4:1 missing-key exact-exchange has no long-range'],
    ],
    ['a part without form', `${head}exchange: { where: { a: 1 } }`, ['3:1 missing-key exchange has no form']],
    ['a part without value', `${head}exchange:`, ['3:1 wrong-value exchange has no value']],
    [
      'two forms',
      `${head}exchange: { per-particle: 1, enhancement: 2 }`,
      ['3:30 wrong-value exchange has both per-particle and enhancement'],
    ],
    [
      'pairs beside another form',
      `${head}uses: { g: pw92 }\ncorrelation: { same-spin: 1, partition: g, from: g }`,
      ['4:44 wrong-value correlation has both same-spin and from'],
    ],
    [
      'half of the pairs form',
      `${head}uses: { g: pw92 }\ncorrelation: { partition: g, same-spin: 1 }`,
      ['4:1 missing-key correlation has no opposite-spin'],
    ],
    [
      'steps of a part taken whole',
      `${head}uses: { g: pw92 }\nexchange: { from: g, where: { a: 1 } }`,
      ['4:22 wrong-value where has no use in exchange, which is taken from another sheet'],
    ],
    [
      'both combined and separate parts',
      `${head}${x}exchange-correlation: { per-particle: 1 }`,
      ['4:1 wrong-value exchange-correlation stands beside exchange or correlation'],
    ],
    ['from without its import', `${head}exchange: { from: base }`, ['3:19 missing-import uses has no base']],
    ['the short form without its import', `${head}exchange: base`, ['3:11 missing-import uses has no base']],
    [
      'partition without its import',
      `${head}correlation: { partition: g, same-spin: 1, opposite-spin: 1 }`,
      ['3:27 missing-import uses has no g'],
    ],
    [
      'a parameter named like an import',
      `${head}${x}uses: { a: pbe }\nparameters: { a: 1 }`,
      ['5:15 duplicate-key a is a parameter here and an alias in line 4'],
    ],
    [
      'a function named like a parameter',
      `${head}${x}parameters: { a: 1 }\nfunctions:\n  a(b): 1`,
      ['6:3 duplicate-key a is a function here and a parameter in line 4'],
    ],
    [
      'a step of a part named like a shared step',
      `${head}where: { a: 1 }\nexchange: { where: { a: 1 }, per-particle: a }`,
      ['4:22 duplicate-key a is a step here and a step in line 3'],
    ],
  ])('%s', (_, text, expected) => {
    expect(problemsOf(parse(text))).toEqual(expected);
  });

  test('a file name that is no id', () => {
    const outcome = parseFunctionalSheet(`${head}${x}`, { file: 'My_PBE.yaml', id: 'My_PBE' });
    expect(problemsOf(outcome)).toEqual(['1:1 wrong-value "My_PBE" is not an id']);
  });

  test('misspelt words come with the word that was meant', () => {
    const text = 'name: a\nrung: metagga\nexchnage: 1\nuses: { base: pbe }\ncorrelation: bsae';
    const outcome = parse(text);
    expect(outcome.ok ? [] : outcome.problems.map(({ remedy }) => remedy)).toEqual([
      'Did you mean meta-gga?',
      'Did you mean exchange?',
      'Did you mean base?',
    ]);
  });

  test('all faults of a sheet are named at once, in the order of the file', () => {
    const text = `name: &a x\nrung: x\nname: y\nyear: z\nfoo: 1\nexchange: { per-particle: 1, from: b }`;
    expect(problemsOf(parse(text)).map((one) => one.split(' ', 2).join(' '))).toEqual([
      '1:10 yaml-alias',
      '2:7 wrong-value',
      '3:1 duplicate-key',
      '4:7 wrong-value',
      '5:1 unknown-key',
      '6:30 wrong-value',
    ]);
  });

  test('names of the object prototype are names like others', () => {
    const text = `${head}where: { constructor: 1, toString: 2 }\nexchange: { per-particle: constructor }\nvalueOf: 1`;
    expect(problemsOf(parse(text))).toEqual(['5:1 unknown-key unknown key valueOf']);
  });
});
