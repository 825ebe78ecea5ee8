import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type Change, compareStates, isWorse, usualTolerances } from '../../src/finding/compare.ts';
import { type State, type StateLine, stateOf, stateSchema } from '../../src/finding/state.ts';
import { stateText } from '../../src/report/state-text.ts';
import { findingsOf, functional } from '../report/made-up.ts';

const line: StateLine = {
  functional: 'f',
  constraint: 'c',
  verdict: 'violated',
  gate: 'warn',
  margin: -0.01,
  share: 0.1,
  tolerance: 1e-9,
};

const state = (findings: readonly StateLine[], changed: Partial<State> = {}): State => ({
  format: 'rungcheck state',
  formatVersion: 1,
  engineVersion: '1.0.0',
  catalogueVersion: 'a',
  domain: 'rs=0.01:100',
  constants: {},
  parameters: {},
  findings: [...findings],
  ...changed,
});

const told = ({ kind, direction }: Change) => `${direction} ${kind}`;
const between = (before: Partial<StateLine>, after: Partial<StateLine>) =>
  compareStates(state([{ ...line, ...before }]), state([{ ...line, ...after }]), usualTolerances).changes.map(told);

describe('two states compared', () => {
  test.each<[string, Partial<StateLine>, Partial<StateLine>, string[]]>([
    ['a new violation', { verdict: 'holds', gate: 'pass', margin: 0.1, share: 0 }, {}, ['worse new-violation']],
    ['a violation that is gone', {}, { verdict: 'holds', gate: 'pass', margin: 0.1 }, ['better violation-gone']],
    ['a weaker verdict', { verdict: 'proved', gate: 'pass' }, { verdict: 'holds', gate: 'pass' }, ['worse verdict']],
    ['holds, now undecided', { verdict: 'holds' }, { verdict: 'undecided' }, ['worse verdict']],
    ['violated, now undecided', {}, { verdict: 'undecided' }, ['better verdict']],
    ['a lower margin', {}, { margin: -0.0101 }, ['worse margin']],
    ['a higher margin', {}, { margin: -0.0099 }, ['better margin']],
    ['a margin within 0.1 %', {}, { margin: -0.0100099 }, []],
    ['a margin within the tolerance of its condition', { tolerance: 0.02 }, { margin: -0.02 }, []],
    ['a margin that is lost', {}, { margin: null }, ['worse margin']],
    [
      'a lower margin of a condition that holds',
      { verdict: 'holds', margin: 1 },
      { verdict: 'holds', margin: 0.5 },
      ['worse margin'],
    ],
    ['a larger share', {}, { share: 0.2 }, ['worse share']],
    ['a smaller share', {}, { share: 0.05 }, ['better share']],
    ['a share within 0.001', {}, { share: 0.1009 }, []],
    ['what counts for more', {}, { gate: 'fail' }, ['worse gate']],
    ['what is accepted now', {}, { gate: 'accepted' }, ['better gate']],
    [
      'a new violation that is accepted',
      { verdict: 'holds', gate: 'pass' },
      { gate: 'accepted' },
      ['other new-violation'],
    ],
    ['a condition that is not asked any more', {}, { verdict: 'not-applicable' }, ['worse condition-gone']],
    ['a condition that is asked now', { verdict: 'not-applicable' }, { verdict: 'holds' }, ['other condition-new']],
  ])('%s', (_title, before, after, changes) => {
    expect(between(before, after)).toEqual(changes);
  });

  test('a functional or condition that is gone is worse; a new one only where it fails', () => {
    const two = state([line, { ...line, functional: 'g' }]);
    expect(compareStates(two, state([line]), usualTolerances).changes.map(told)).toEqual(['worse functional-gone']);
    expect(compareStates(state([line]), two, usualTolerances).changes.map(told)).toEqual(['other functional-new']);
    const failing = state([line, { ...line, functional: 'g', gate: 'fail' }]);
    expect(compareStates(state([line]), failing, usualTolerances).changes.map(told)).toEqual([
      'worse new-violation',
      'other functional-new',
    ]);
    const more = state([line, { ...line, constraint: 'd' }]);
    expect(compareStates(more, state([line]), usualTolerances).changes.map(told)).toEqual(['worse condition-gone']);
    expect(compareStates(state([line]), more, usualTolerances).changes.map(told)).toEqual(['other condition-new']);
  });

  test('other circumstances are said', () => {
    const other = state([line], {
      engineVersion: '1.1.0',
      catalogueVersion: 'b',
      domain: 'rs=1:2',
      constants: { c: 1 },
    });
    const { circumstances, changes } = compareStates(state([line]), other, usualTolerances);
    expect(circumstances.map(({ what }) => what)).toEqual([
      'engine version',
      'catalogue version',
      'domain',
      'constants',
    ]);
    expect(changes).toEqual([]);
  });

  test('a state is never worse than itself, and what is worse one way is better the other (seed 7)', () => {
    const number = fc.double({ min: -1, max: 1, noNaN: true });
    const anyLine = fc.record({
      functional: fc.constantFrom('f', 'g'),
      constraint: fc.constantFrom('c', 'd', 'e'),
      verdict: fc.constantFrom('holds' as const, 'violated' as const, 'undecided' as const),
      gate: fc.constantFrom('warn' as const, 'fail' as const, 'pass' as const),
      margin: number,
      share: number,
      tolerance: fc.constant(1e-9),
    });
    const lines = fc.uniqueArray(anyLine, { selector: (one) => `${one.functional} ${one.constraint}`, maxLength: 6 });
    fc.assert(
      fc.property(lines, lines, (a, b) => {
        const exact = { margin: 0, share: 0 };
        const forth = compareStates(state(a), state(b), exact).changes;
        const back = compareStates(state(b), state(a), exact).changes;
        const own = compareStates(state(a), state(a), exact);
        // Of findings that both have: a step is worse in one direction exactly when it is better in the other.
        const steps = (changes: readonly Change[], direction: string) =>
          changes.filter((change) => change.before !== null && change.after !== null && change.direction === direction);
        const places = (changes: readonly Change[]) => changes.map((c) => `${c.functional} ${c.constraint}`).sort();
        expect(isWorse(own) || own.changes.length > 0).toBe(false);
        expect(places(steps(forth, 'worse'))).toEqual(places(steps(back, 'better')));
      }),
      { seed: 7, numRuns: 300 },
    );
  });
});

describe('the state of findings', () => {
  const findings = findingsOf({ ...functional, id: 'zz' }, functional);

  test('is sorted, and its file has one line a finding and reads back', () => {
    const text = stateText(stateOf(findings));
    const lines = text.split('\n').filter((entry) => entry.includes('"functional"'));
    expect(lines).toHaveLength(2 * functional.findings.length);
    expect(lines).toEqual([...lines].sort());
    expect(stateSchema.parse(JSON.parse(text))).toEqual(stateOf(findings));
  });

  test('does not depend on the order of the run', () => {
    expect(stateText(stateOf(findingsOf(functional, { ...functional, id: 'zz' })))).toBe(stateText(stateOf(findings)));
  });

  test('without findings is a file that reads back', () => {
    const empty = stateOf(findingsOf());
    expect(JSON.parse(stateText(empty))).toEqual(empty);
  });
});
