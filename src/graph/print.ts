import { type Rational, rationalText } from '../number/rational.ts';
import { argumentsOf, type Graph, type Node, type NodeId } from './graph.ts';
import type { BinaryOperator, ChoiceOperator, UnaryOperator } from './operator.ts';
import { reachable } from './traverse.ts';

/** Binding strength; an argument that binds more loosely than its place allows is parenthesised. */
const strength = { choice: 0, sum: 1, product: 2, sign: 3, power: 4, atom: 5 } as const;
type Strength = (typeof strength)[keyof typeof strength];

interface Printed {
  readonly text: string;
  readonly strength: Strength;
}

/** How a unary operator is called; `neg` alone is written as a sign. */
const unaryNames: Record<UnaryOperator, string> = {
  neg: '-',
  abs: 'abs',
  exp: 'exp',
  expm1: 'expm1',
  log: 'log',
  log1p: 'log1p',
  sin: 'sin',
  cos: 'cos',
  sinh: 'sinh',
  cosh: 'cosh',
  tanh: 'tanh',
  asinh: 'asinh',
  atan: 'atan',
  erf: 'erf',
  lambertW: 'lambertw',
};

const binaryPrinters: Record<BinaryOperator, (a: Printed, b: Printed) => Printed> = {
  add: (a, b) => infix(a, ' + ', b, strength.sum, strength.sum),
  sub: (a, b) => infix(a, ' - ', b, strength.sum, strength.product),
  mul: (a, b) => infix(a, '*', b, strength.product, strength.product),
  div: (a, b) => infix(a, '/', b, strength.product, strength.sign),
  min: (a, b) => atom(`min(${a.text}, ${b.text})`),
  max: (a, b) => atom(`max(${a.text}, ${b.text})`),
};

const choiceSymbols: Record<ChoiceOperator, string> = { ifLess: '<', ifLessEqual: '<=' };

const defaultLimit = 2000;

/**
 * The node as infix text in the notation of the sheets. A subexpression longer than `limit` characters
 * is shown as `…`: a graph shares what its text would repeat, and the repetition can be exponential.
 */
export function printNode(graph: Graph, id: NodeId, limit: number = defaultLimit): string {
  const printed = new Map<NodeId, Printed>();
  for (const node of reachable(graph, [id])) {
    const own = printOne(graph.node(node), (argument) => printed.get(argument) as Printed);
    printed.set(node, own.text.length > limit ? atom('…') : own);
  }
  return (printed.get(id) as Printed).text;
}

function printOne(node: Node, printed: (argument: NodeId) => Printed): Printed {
  const [first, second, third, fourth] = argumentsOf(node).map(printed) as [Printed, Printed, Printed, Printed];
  switch (node.kind) {
    case 'rational':
      return printRational(node.value);
    case 'pi':
      return atom('pi');
    case 'variable':
      return atom(node.name);
    case 'unary':
      if (node.op !== 'neg') return atom(`${unaryNames[node.op]}(${first.text})`);
      return { text: `-${enclosed(first, strength.power)}`, strength: strength.sign };
    case 'binary':
      return binaryPrinters[node.op](first, second);
    case 'power':
      return printPower(first, node.exponent);
    case 'choice': {
      const condition = `${enclosed(first, strength.sum)} ${choiceSymbols[node.op]} ${enclosed(second, strength.sum)}`;
      const branches = `${enclosed(third, strength.sum)} : ${enclosed(fourth, strength.sum)}`;
      return { text: `${condition} ? ${branches}`, strength: strength.choice };
    }
  }
}

function printPower(base: Printed, exponent: Rational): Printed {
  const text = rationalText(exponent);
  if (text === '1/2') return atom(`sqrt(${base.text})`);
  if (text === '1/3') return atom(`cbrt(${base.text})`);
  const simple = exponent.d === 1n && exponent.s > 0n;
  return { text: `${enclosed(base, strength.atom)}^${simple ? text : `(${text})`}`, strength: strength.power };
}

function printRational(value: Rational): Printed {
  const text = decimalText(value) ?? rationalText(value);
  if (text.includes('/')) return { text, strength: strength.product };
  return text.startsWith('-') ? { text, strength: strength.sign } : atom(text);
}

/** More places than this read better as a fraction. */
const mostPlaces = 24;

/** The finite decimal expansion, if there is one of moderate length. */
function decimalText(value: Rational): string | undefined {
  for (let places = 1, scale = 10n; places <= mostPlaces; places++, scale *= 10n) {
    if (value.d === 1n || scale % value.d !== 0n) continue;
    const digits = (value.n * (scale / value.d)).toString().padStart(places + 1, '0');
    return `${value.s < 0n ? '-' : ''}${digits.slice(0, -places)}.${digits.slice(-places)}`;
  }
  return undefined;
}

function infix(a: Printed, symbol: string, b: Printed, own: Strength, right: Strength): Printed {
  return { text: `${enclosed(a, own)}${symbol}${enclosed(b, signed(b, right))}`, strength: own };
}

/** A sign directly after another operator is parenthesised for the reader's sake. */
function signed(operand: Printed, least: Strength): Strength {
  return operand.text.startsWith('-') ? strength.atom : least;
}

function enclosed(operand: Printed, least: Strength): string {
  return operand.strength >= least ? operand.text : `(${operand.text})`;
}

function atom(text: string): Printed {
  return { text, strength: strength.atom };
}
