import { expect, test } from 'vitest';
import { closedFormsWithin } from '../../src/closed-form/algebra.ts';
import { rationalForm } from '../../src/closed-form/rational-form.ts';
import { add, constant, div, mul, power, sqrt, variable } from '../../src/graph/build.ts';
import { Graph } from '../../src/graph/graph.ts';
import { rational } from '../../src/number/rational.ts';

test('a rational function is handed on in neutral names, anything else is not', () => {
  const graph = new Graph();
  const [s, mu] = [variable(graph, 's'), variable(graph, '$mu')];
  const form = div(graph, mul(graph, mu, power(graph, s, rational(2))), add(graph, constant(graph, 1), mu));
  const found = rationalForm(graph, form, 's');
  expect(found?.text).toMatch(/^[\dpx()+*/^ .-]+$/);
  expect([...(found?.names ?? [])]).toEqual([['p0', '$mu']]);
  expect(rationalForm(graph, sqrt(graph, form), 's')).toBeUndefined();
});

test('limits of rational functions are those of calculus', { timeout: 60_000 }, () => {
  const [atInfinity, atZero, alone] = closedFormsWithin(30_000)([
    { text: '1 + p0 - p0/(1 + p1*x^2/p0)', at: 'infinity' },
    { text: '1 + p0 - p0/(1 + p1*x^2/p0)', at: '0' },
    { text: '2*p1/2', at: undefined },
  ]);
  expect([atInfinity, atZero, alone]).toEqual(['1+p0', '1', 'p1']);
});

test('a process that does not answer in time is ended, and gives no closed form', () => {
  const started = performance.now();
  expect(closedFormsWithin(1)([{ text: 'x + 1', at: '0' }])).toEqual([undefined]);
  expect(performance.now() - started).toBeLessThan(5_000);
});
