import type { ClosedFormFinder } from '../closed-form/algebra.ts';
import { type RationalForm, rationalForm } from '../closed-form/rational-form.ts';
import type { Expression } from '../expression/expression.ts';
import { interpret } from '../expression/interpret.ts';
import { parseExpression } from '../expression/parse.ts';
import { expressionText } from '../expression/print.ts';
import type { SequenceRecord } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { instantiate } from '../functional/instance.ts';
import { constant, variable } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { substitute } from '../graph/traverse.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { Decimal, decimalContext } from '../number/decimal.ts';
import { parseDecimal, type Rational } from '../number/rational.ts';
import type { Condition } from './condition.ts';
import type { Leaves } from './leaves.ts';
import { limitInFloat64 } from './limit.ts';
import { buildMargin } from './margin.ts';

const digits = 40;
/** Relative difference up to which a closed form agrees with the number found from the graph. */
const agreement = '1e-12';

interface Options {
  readonly constants: ReadonlyMap<string, Rational>;
  readonly parameters: ReadonlyMap<string, Rational>;
}

/**
 * The sequences with the closed form of each limit and coefficient that is a small rational function of the sheet's
 * parameters, as far as the finder knows one and it agrees with the number; all others as they are.
 */
export function withClosedForms(
  sequences: readonly SequenceRecord[],
  condition: Condition,
  functional: Functional,
  options: Options,
  find: ClosedFormFinder,
): SequenceRecord[] {
  const graph = new Graph();
  const leaves: Leaves = { found: [], coefficients: [], expanded: new Set() };
  const names = [...functional.parameters.keys()];
  const symbols = new Map(names.map((name) => [name, variable(graph, `$${name}`)]));
  buildMargin(graph, condition, functional, { ...options, limit: limitInFloat64, leaves, symbols });
  const forms = sequences.map((sequence) => formOf(graph, leaves, sequence));
  const requests = forms.flatMap((form, index) =>
    form === undefined ? [] : [{ text: form.text, at: targetOf(sequences[index] as SequenceRecord) }],
  );
  const answers = [...find(requests)];
  return sequences.map((sequence, index) => {
    const form = forms[index];
    const answer = form === undefined ? undefined : answers.shift();
    if (form === undefined || answer === undefined) return sequence;
    return { ...sequence, closedForm: checked(answer, form, sequence, functional, options) ?? null };
  });
}

function targetOf({ kind, toward }: SequenceRecord): string | undefined {
  if (kind === 'coefficient') return undefined;
  return toward === 'inf' ? 'infinity' : toward;
}

/** The function whose limit is taken, or the coefficient itself, with the other coordinates at their values. */
function formOf(graph: Graph, leaves: Leaves, { quantity, kind, along, at }: SequenceRecord): RationalForm | undefined {
  if (kind === 'order' || kind === 'logOrder') return undefined;
  const node =
    kind === 'coefficient'
      ? leaves.coefficients.find(({ text }) => text === quantity)?.node
      : leaves.found.find(({ text }) => text === quantity)?.of;
  if (node === undefined) return undefined;
  const values = Object.entries(at).flatMap(([name, value]): [string, NodeId][] => {
    const exact = parseDecimal(String(value));
    return exact === undefined ? [] : [[name, constant(graph, exact)]];
  });
  const [placed] = substitute(graph, [node], new Map(values)) as [NodeId];
  return rationalForm(graph, placed, kind === 'coefficient' ? undefined : along);
}

/** The answer in the sheet's names when it is more than a decimal and its value is the one found. */
function checked(
  answer: string,
  { names }: RationalForm,
  { value }: SequenceRecord,
  functional: Functional,
  { parameters }: Options,
): string | undefined {
  const text = answer.replace(/\bp\d+\b/g, (name) => names.get(name)?.replace('$', '') ?? name);
  const parsed = parseExpression({ text, placeAt: () => ({ file: '', line: 1, column: 1 }) });
  if (!parsed.ok || value === null) return undefined;
  const tidy = tidied(parsed.value);
  if (/^-?[\d.]*$/.test(tidy)) return undefined;
  const graph = new Graph();
  const changed = new Map([...parameters].map(([name, exact]) => [name, constant(graph, exact)]));
  const instance = instantiate(graph, functional, { parameters: changed });
  try {
    const node = interpret(graph, parsed.value, {
      name: (name) => instance.parameter(name),
      member: noSuchName,
      call: noSuchName,
      memberCall: noSuchName,
    });
    const [exact] = evaluateDecimal(graph, [node], new Map(), digits) as [Decimal];
    const found = decimalContext(digits).from(value);
    const allowed = Decimal.max(exact.abs(), '1e-6').times(agreement);
    return exact.minus(found).abs().lessThanOrEqualTo(allowed) ? tidy : undefined;
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

function noSuchName(name: string): never {
  throw new RangeError(`${name} is no parameter`);
}

/** Sums without parentheses of their own and x^(−1) as a quotient, as a person writes them. */
function tidied(expression: Expression): string {
  return expressionText(expression).replace(/\(([^()+-]*)\)\^-1\*/g, '1/($1)*');
}
