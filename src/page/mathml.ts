import type { Expression } from '../expression/expression.ts';
import type { Rational } from '../number/rational.ts';
import { decimalText } from './decimal-text.ts';
import { escaped } from './markup.ts';
import { symbolMathml } from './mathml-symbol.ts';

/* MathML Core for the expressions of sheets; browsers set it without a library or a font of their own. */

/** How tightly a form binds; what binds less than its surroundings is put in parentheses. */
const binding = { conditional: 0, sum: 1, product: 2, sign: 2, power: 4, atom: 5 } as const;

interface Piece {
  readonly mathml: string;
  readonly binds: number;
}

const operator = (text: string, attributes = ''): string => `<mo${attributes}>${text}</mo>`;
const row = (...parts: readonly string[]): string => `<mrow>${parts.join('')}</mrow>`;
/** Parentheses grow only around what is higher than a line. */
const fenced = (inner: string): string => {
  const attributes = /<(mfrac|msqrt|mroot|munder|mtable)/.test(inner) ? '' : ' stretchy="false"';
  return row(operator('(', `${attributes} form="prefix"`), inner, operator(')', `${attributes} form="postfix"`));
};

/** One expression as the content of a `math` element. */
export function expressionMathml(expression: Expression): string {
  return piece(expression).mathml;
}

/** The terms of a sum, each with its sign, so that a line can be broken between them. */
export function termsMathml(expression: Expression): string[] {
  const [only, ...more] = terms(expression, '+');
  if (only?.sign === '+' && more.length === 0) return [expressionMathml(only.term)];
  return terms(expression, '+').map(({ sign, term }, index) => {
    const inner = within(term, binding.product);
    if (index === 0) return sign === '+' ? inner : row(operator('−'), inner);
    return row(operator(sign === '+' ? '+' : '−', ' form="infix" lspace="0"'), inner);
  });
}

type Sign = '+' | '-';

function terms(expression: Expression, sign: Sign): { sign: Sign; term: Expression }[] {
  const flipped = (other: Sign): Sign => (other === sign ? '+' : '-');
  if (expression.kind === 'arithmetic' && (expression.op === '+' || expression.op === '-')) {
    const right = flipped(expression.op === '+' ? '+' : '-');
    // Under a minus the right side of a sum is one term.
    const last =
      expression.op === '+' && sign === '+' ? terms(expression.right, '+') : [{ sign: right, term: expression.right }];
    return [...terms(expression.left, sign), ...last];
  }
  if (expression.kind === 'negation' && sign === '+') return [{ sign: '-', term: expression.operand }];
  return [{ sign, term: expression }];
}

function within(expression: Expression, least: number): string {
  const { mathml, binds } = piece(expression);
  return binds < least ? fenced(mathml) : mathml;
}

function piece(expression: Expression): Piece {
  switch (expression.kind) {
    case 'number':
      return numberPiece(expression.value);
    case 'name':
      return { mathml: symbolMathml(expression.name), binds: binding.atom };
    case 'member':
      return { mathml: memberMathml(expression.object, expression.name), binds: binding.atom };
    case 'call':
      return callPiece(expression.name, expression.args);
    case 'member-call':
      return {
        mathml: row(
          memberMathml(expression.object, expression.name),
          operator('&#x2061;'),
          argumentsMathml(expression.args),
        ),
        binds: binding.atom,
      };
    case 'negation':
      return {
        mathml: row(operator('−', ' form="prefix"'), within(expression.operand, binding.product)),
        binds: binding.sum,
      };
    case 'arithmetic':
      return arithmeticPiece(expression);
    case 'conditional':
      return conditionalPiece(expression);
  }
}

function arithmeticPiece(expression: Extract<Expression, { kind: 'arithmetic' }>): Piece {
  const { op, left, right } = expression;
  switch (op) {
    case '+':
      return { mathml: row(within(left, binding.sum), operator('+'), within(right, binding.sum)), binds: binding.sum };
    case '-':
      return {
        mathml: row(within(left, binding.sum), operator('−'), within(right, binding.product)),
        binds: binding.sum,
      };
    case '*': {
      // −a b needs no parentheses around its sign.
      if (left.kind === 'negation') {
        const positive = arithmeticPiece({ ...expression, left: left.operand });
        return { mathml: row(operator('−', ' form="prefix"'), positive.mathml), binds: binding.sum };
      }
      // Two numbers side by side would read as one.
      const apart = isWord(leafAt(left, 'right')) || isWord(leafAt(right, 'left')) ? '<mspace width="0.18em"/>' : '';
      const between = startsWithDigit(right) ? operator('×') : operator('&#x2062;') + apart;
      return {
        mathml: row(within(left, binding.product), between, within(right, binding.product)),
        binds: binding.product,
      };
    }
    case '/':
      return {
        mathml: `<mfrac>${row(expressionMathml(left))}${row(expressionMathml(right))}</mfrac>`,
        binds: binding.product,
      };
    case '^':
      return powerPiece(left, right);
  }
}

function powerPiece(base: Expression, exponent: Expression): Piece {
  // tanh²x, not tanh x²; of a call the parentheses tell.
  const raised = within(base, binding.atom);
  return { mathml: `<msup>${row(raised)}${row(flatMathml(exponent))}</msup>`, binds: binding.power };
}

/** An exponent, with a slash in the place of a fraction. */
function flatMathml(expression: Expression): string {
  if (expression.kind === 'negation') return row(operator('−', ' form="prefix"'), flatMathml(expression.operand));
  if (expression.kind === 'arithmetic' && expression.op === '/') {
    const { left } = expression;
    const top =
      left.kind === 'negation'
        ? row(operator('−', ' form="prefix"'), within(left.operand, binding.power))
        : within(left, binding.power);
    return row(top, operator('/'), within(expression.right, binding.power));
  }
  return expressionMathml(expression);
}

/** What stands at the end of a product, where no parenthesis or fraction does. */
function leafAt(expression: Expression, side: 'left' | 'right'): Expression | undefined {
  if (expression.kind !== 'arithmetic') return expression;
  if (expression.op === '*') return leafAt(expression[side], side);
  return expression.op === '^' && side === 'left' ? leafAt(expression.left, side) : undefined;
}

/** Whether it is set as a word, which would run into its neighbour. */
function isWord(leaf: Expression | undefined): boolean {
  if (leaf?.kind === 'name') return /<mi mathvariant="normal">[^<]{2}/.test(symbolMathml(leaf.name));
  return leaf?.kind === 'call' && !['sqrt', 'cbrt', 'abs'].includes(leaf.name);
}

function startsWithDigit(expression: Expression): boolean {
  if (expression.kind === 'number') return true;
  if (expression.kind !== 'arithmetic') return false;
  if (expression.op === '/') return expression.left.kind === 'number' && expression.right.kind === 'number';
  return (expression.op === '*' || expression.op === '^') && startsWithDigit(expression.left);
}

const functionNames: Readonly<Record<string, string>> = {
  log: 'ln',
  log1p: 'ln',
  atan: 'arctan',
  asinh: 'arsinh',
  lambertw: 'W',
};

function callPiece(name: string, args: readonly Expression[]): Piece {
  const [first] = args as [Expression];
  const atom = (mathml: string): Piece => ({ mathml, binds: binding.atom });
  switch (name) {
    case 'sqrt':
      return atom(`<msqrt>${expressionMathml(first)}</msqrt>`);
    case 'cbrt':
      return atom(`<mroot>${row(expressionMathml(first))}<mn>3</mn></mroot>`);
    case 'abs':
      return atom(row(operator('|', ' form="prefix"'), expressionMathml(first), operator('|', ' form="postfix"')));
    case 'exp':
      return isLow(first)
        ? { mathml: `<msup><mi mathvariant="normal">e</mi>${row(flatMathml(first))}</msup>`, binds: binding.power }
        : atom(applied('exp', expressionMathml(first)));
    case 'expm1':
      return { mathml: row(applied('exp', expressionMathml(first)), operator('−'), '<mn>1</mn>'), binds: binding.sum };
    case 'log1p':
      return atom(applied('ln', row('<mn>1</mn>', operator('+'), within(first, binding.sum))));
    case 'spinsum':
      return {
        mathml: row('<munder><mo movablelimits="false">∑</mo><mi>σ</mi></munder>', within(first, binding.product)),
        binds: binding.product,
      };
    case 'd': {
      const along = args[1];
      const bottom = row(operator('∂'), along === undefined ? '' : expressionMathml(along));
      return {
        mathml: row(`<mfrac>${operator('∂')}${bottom}</mfrac>`, within(first, binding.power)),
        binds: binding.product,
      };
    }
    default: {
      const isKnown = /^(log|sin|cos|sinh|cosh|tanh|asinh|atan|erf|min|max|lambertw)$/.test(name);
      const head = isKnown ? `<mi>${functionNames[name] ?? name}</mi>` : symbolMathml(name);
      return atom(row(head, operator('&#x2061;'), argumentsMathml(args)));
    }
  }
}

const applied = (name: string, inner: string): string => row(`<mi>${name}</mi>`, operator('&#x2061;'), fenced(inner));

/** Whether an exponent stays small: no fraction in it but of numbers, and no call. */
function isLow(expression: Expression): boolean {
  switch (expression.kind) {
    case 'number':
    case 'name':
      return true;
    case 'negation':
      return isLow(expression.operand);
    case 'arithmetic':
      return expression.op !== '/' && isLow(expression.left) && isLow(expression.right) && nodes(expression) <= 7;
    default:
      return false;
  }
}

function nodes(expression: Expression): number {
  if (expression.kind === 'negation') return nodes(expression.operand);
  return expression.kind === 'arithmetic' ? 1 + nodes(expression.left) + nodes(expression.right) : 1;
}

function argumentsMathml(args: readonly Expression[]): string {
  return fenced(args.map(expressionMathml).join(operator(',', ' separator="true"')));
}

function conditionalPiece(expression: Extract<Expression, { kind: 'conditional' }>): Piece {
  const { left, right, comparison, whenTrue } = expression;
  const symbols = { '<': '&lt;', '<=': '≤', '>': '&gt;', '>=': '≥' } as const;
  const rows = [
    `<mtr><mtd>${expressionMathml(whenTrue)}</mtd><mtd>${row('<mtext>if&#xa0;</mtext>', within(left, binding.sum), operator(symbols[comparison]), within(right, binding.sum))}</mtd></mtr>`,
  ];
  let rest = expression.whenFalse;
  while (rest.kind === 'conditional') {
    const test = row(
      '<mtext>if&#xa0;</mtext>',
      within(rest.left, binding.sum),
      operator(symbols[rest.comparison]),
      within(rest.right, binding.sum),
    );
    rows.push(`<mtr><mtd>${expressionMathml(rest.whenTrue)}</mtd><mtd>${test}</mtd></mtr>`);
    rest = rest.whenFalse;
  }
  rows.push(`<mtr><mtd>${expressionMathml(rest)}</mtd><mtd><mtext>otherwise</mtext></mtd></mtr>`);
  return {
    mathml: row(operator('{', ' form="prefix" stretchy="true"'), `<mtable class="cases">${rows.join('')}</mtable>`),
    binds: binding.conditional,
  };
}

const partSymbols: Readonly<Record<string, readonly [base: string, index: string]>> = {
  exchange: ['ε', 'x'],
  correlation: ['ε', 'c'],
  'exchange-correlation': ['ε', 'xc'],
  enhancement: ['F', 'x'],
};

/** A thing of another sheet carries the alias of the sheet as its upper index. */
function memberMathml(object: string, name: string): string {
  const alias = `<mtext>${escaped(object)}</mtext>`;
  const part = partSymbols[name];
  if (part === undefined) return `<msup>${row(symbolMathml(name))}${alias}</msup>`;
  return `<msubsup><mi>${part[0]}</mi><mi mathvariant="normal">${part[1]}</mi>${alias}</msubsup>`;
}

function numberPiece(value: Rational): Piece {
  const text = decimalText(value);
  const match = /^(-?)([\d.]+)(?:e(-?\d+))?$/.exec(text);
  if (match === null) {
    const [top = '', bottom = ''] = text.split('/');
    return { mathml: `<mfrac><mn>${top}</mn><mn>${bottom}</mn></mfrac>`, binds: binding.product };
  }
  const [, sign, digits, power] = match;
  const number = `<mn>${digits}</mn>`;
  const whole =
    power === undefined ? number : row(number, operator('×'), `<msup><mn>10</mn>${row(signedNumber(power))}</msup>`);
  if (sign === '-') return { mathml: row(operator('−', ' form="prefix"'), whole), binds: binding.sum };
  return { mathml: whole, binds: power === undefined ? binding.atom : binding.product };
}

const signedNumber = (text: string): string =>
  text.startsWith('-') ? `${operator('−', ' form="prefix"')}<mn>${text.slice(1)}</mn>` : `<mn>${text}</mn>`;
