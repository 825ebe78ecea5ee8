import { describe, expect, test } from 'vitest';
import { parseExpression } from '../../src/expression/parse.ts';
import { parseDecimal, type Rational, rational } from '../../src/number/rational.ts';
import { decimalText } from '../../src/page/decimal-text.ts';
import { escaped, html } from '../../src/page/markup.ts';
import { expressionMathml, termsMathml } from '../../src/page/mathml.ts';
import { notation } from '../../src/page/notation.ts';

function parsed(text: string) {
  const outcome = parseExpression({ text, placeAt: () => ({ file: 'test', line: 1, column: 1 }) });
  if (!outcome.ok) throw new Error(outcome.problems[0]?.message);
  return outcome.value;
}

/** The texts of the elements, without the invisible signs of product and application. */
function spoken(mathml: string): string {
  return mathml
    .replace(/&#x206[12];/g, '')
    .replace(/&lt;/g, '<')
    .replace(/<[^<>]*>/g, '');
}

describe('formulas as MathML', () => {
  test.each([
    // From the rules of arithmetic: parentheses only where the order of operations needs them.
    ['a*(b + c)', 'a(b+c)'],
    ['a - (b - c)', 'a−(b−c)'],
    ['a + (b + c)', 'a+b+c'],
    ['(a + b)^2', '(a+b)2'],
    ['-(a + b)', '−(a+b)'],
    ['2*3', '2×3'],
    ['abs(x)', '|x|'],
    ['log(1 + x)', 'ln(1+x)'],
  ])('%s is set as %s', (text, expected) => {
    expect(spoken(expressionMathml(parsed(text)))).toBe(expected);
  });

  test('a quotient is a fraction, and its parts need no parentheses', () => {
    expect(expressionMathml(parsed('(a + b)/c'))).toBe(
      '<mfrac><mrow><mrow><mi>a</mi><mo>+</mo><mi>b</mi></mrow></mrow><mrow><mi>c</mi></mrow></mfrac>',
    );
  });

  test('a sum is parted into its terms, each with its sign', () => {
    expect(termsMathml(parsed('1 + kappa - kappa/2')).map(spoken)).toEqual(['1', '+κ', '−κ2']);
    expect(termsMathml(parsed('-(a + b) - (c - d)')).map(spoken)).toEqual(['−(a+b)', '−(c−d)']);
  });

  test('quantities have the symbols of the field', () => {
    expect(expressionMathml(parsed('rs'))).toBe('<msub><mi>r</mi><mi>s</mi></msub>');
    expect(expressionMathml(parsed('s_sigma'))).toBe('<msub><mi>s</mi><mi>σ</mi></msub>');
    expect(expressionMathml(parsed('gas.correlation'))).toBe(
      '<msubsup><mi>ε</mi><mi mathvariant="normal">c</mi><mtext>gas</mtext></msubsup>',
    );
  });

  test('numbers are decimals where they have an end, as the sheet writes them', () => {
    const text = (decimal: string) => decimalText(parseDecimal(decimal) as Rational);
    expect(['0.804', '-12.5', '0.0000021', '100', '0.06672455060314922'].map(text)).toEqual([
      '0.804',
      '-12.5',
      '2.1e-6',
      '100',
      '0.06672455060314922',
    ]);
    expect(decimalText(rational(10, 81))).toBe('10/81');
  });
});

describe('text in the page', () => {
  test('values of a template are escaped, markup is not', () => {
    expect(html`<p title="${'"<&\'>'}">${html`<b>${'<i>'}</b>`}</p>`.html).toBe(
      '<p title="&quot;&lt;&amp;&#39;&gt;"><b>&lt;i&gt;</b></p>',
    );
    expect(escaped('a\u0000b\ud800')).toBe('a\ufffdb\ufffd');
  });

  test('plain notation gets real indices and exponents, and stays text otherwise', () => {
    expect(notation('F_xc ≤ 2.3e-7').html).toBe('<i>F</i><sub>xc</sub> ≤ 2.3\u202f×\u202f10<sup>−7</sup>');
    expect(notation('2^(1/3) <b>').html).toBe('2<sup>1/3</sup> &lt;b&gt;');
  });
});
