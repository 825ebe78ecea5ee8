import { describe, expect, test } from 'vitest';
import type { Expression } from '../../src/expression/expression.ts';
import { parseExpression, parseRequirement } from '../../src/expression/parse.ts';

const source = (text: string) => ({
  text,
  placeAt: (offset: number) => ({ file: 'sheet', line: 1, column: offset + 1 }),
});

function parse(text: string): Expression {
  const outcome = parseExpression(source(text));
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems));
  return outcome.value;
}

function fault(text: string): { code: string; column: number | undefined } {
  const outcome = parseExpression(source(text));
  if (outcome.ok) throw new Error(`${text} was accepted`);
  const [problem] = outcome.problems;
  return { code: problem?.code ?? '', column: problem?.column };
}

/** The expression in full parentheses. */
function show(expression: Expression): string {
  switch (expression.kind) {
    case 'number':
      return expression.value.toFraction();
    case 'name':
      return expression.name;
    case 'member':
      return `${expression.object}.${expression.name}`;
    case 'call':
      return `${expression.name}(${expression.args.map(show).join(', ')})`;
    case 'member-call':
      return `${expression.object}.${expression.name}(${expression.args.map(show).join(', ')})`;
    case 'negation':
      return `(-${show(expression.operand)})`;
    case 'arithmetic':
      return `(${show(expression.left)} ${expression.op} ${show(expression.right)})`;
    case 'conditional':
      return `(${show(expression.left)} ${expression.comparison} ${show(expression.right)} ? ${show(expression.whenTrue)} : ${show(expression.whenFalse)})`;
  }
}

describe('expressions as they stand in a paper', () => {
  test.each([
    ['1 + kappa - kappa/(1 + mu*s^2/kappa)', '((1 + kappa) - (kappa / (1 + ((mu * (s ^ 2)) / kappa))))'],
    ['-x^2', '(-(x ^ 2))'],
    ['x^-1/3', '((x ^ (-1)) / 3)'],
    ['2^3^2', '(2 ^ (3 ^ 2))'],
    ['gas.correlation(rs, zeta) + b.mu', '(gas.correlation(rs, zeta) + b.mu)'],
    ['alpha < 1 ? a : alpha > 1 ? b : 0', '(alpha < 1 ? a : (alpha > 1 ? b : 0))'],
    ['spinsum(n_sigma*g(x_sigma))', 'spinsum((n_sigma * g(x_sigma)))'],
    ['+x', 'x'],
  ])('%s', (text, shown) => expect(show(parse(text))).toBe(shown));

  test('number literals keep every digit', () => {
    expect(show(parse('0.06672455060314922'))).toBe('3336227530157461/50000000000000000');
    expect(show(parse('1e-5'))).toBe('1/100000');
  });

  test('names know their place', () => {
    const tree = parse('1.5e1*foo + bar.exchange(foo)');
    expect(tree).toMatchObject({ left: { right: { offset: 6 } }, right: { offset: 12, args: [{ offset: 25 }] } });
  });
});

describe('what has no place in an expression is a problem at its place', () => {
  test.each([
    ['2x', 'expression-form', 1],
    ['1/2x', 'expression-form', 1],
    ['a + ', 'expression-syntax', 4],
    ['(a', 'expression-syntax', 2],
    ['', 'expression-syntax', 1],
    ['x = 2', 'expression-form', 1],
    ['f(x) = 2', 'expression-form', 1],
    ['[1, 2]', 'expression-syntax', 1],
    ['a + "s"', 'expression-syntax', 5],
    ['5!', 'expression-syntax', 2],
    ['a % b', 'expression-syntax', 3],
    ['a and b', 'expression-form', 1],
    ['a < b', 'expression-form', 1],
    ['a < b < c ? 1 : 2', 'expression-form', 1],
    ['x ? 1 : 2', 'expression-form', 1],
    ['1:3', 'expression-form', 1],
    ['x.y.z', 'expression-form', 1],
    ['1e999999', 'expression-form', 1],
    ['true', 'expression-form', 1],
    ['a # b', 'expression-syntax', 3],
    ['x to y', 'expression-form', 1],
    ['0ond', 'expression-syntax', 1],
  ])('%s', (text, code, column) => expect(fault(text)).toEqual({ code, column }));

  test('deep nesting and long text are refused, not overflowed', () => {
    expect(fault('('.repeat(100)).code).toBe('expression-size');
    expect(fault('x+'.repeat(20_000)).code).toBe('expression-size');
    expect(fault(`${'-'.repeat(15_000)}x`).code).toBe('expression-size');
    expect(fault(`${'2^'.repeat(9_000)}2`).code).toBe('expression-size');
    expect(parse(`${'x + '.repeat(500)}x`).kind).toBe('arithmetic');
  });
});

test('a requirement compares two expressions', () => {
  expect(parseRequirement(source('d(Fc, rs) >= 0'))).toMatchObject({ ok: true, value: { relation: '>=' } });
  expect(parseRequirement(source('Fx'))).toMatchObject({ ok: false, problems: [{ code: 'expression-form' }] });
});
