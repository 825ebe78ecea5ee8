import { describe, expect, it } from 'vitest';
import type { Condition } from '../../src/constraint/condition.ts';
import { customDomain, standardDomain } from '../../src/constraint/domain.ts';
import { limitInFloat64 } from '../../src/constraint/limit.ts';
import { buildMargin } from '../../src/constraint/margin.ts';
import { vetFunctional } from '../../src/constraint/vet.ts';
import { Graph } from '../../src/graph/graph.ts';
import { compilePoint } from '../../src/kernel/float64.ts';
import { proveCondition, withProof } from '../../src/proof/prove.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';

const prove = (functional: string, condition: string, budget: number, settings = standardSettings) =>
  proveCondition(conditionOf(condition) as Condition, functionalOf(functional), settings, { budget });

describe('known proofs on the standard domain', () => {
  // The bounds are those of the papers: F_x ≤ 1.804 (PBE), 1.174 (SCAN at ζ = 0); E_c ≤ 0; Lieb-Oxford.
  it.each([
    ['pbe', 'exchange-lieb-oxford', 1],
    ['pbe', 'correlation-non-positive', 5_000],
    ['pbe', 'lieb-oxford', 20_000],
    ['pbe', 'exchange-coordinate-scaling', 1],
    ['scan', 'exchange-hartree-fock-bound', 20_000],
    ['pw92', 'correlation-non-positive', 1_000],
    ['pw92', 'correlation-coordinate-scaling', 10_000],
    ['pw92', 'correlation-kinetic-ceiling', 10_000],
  ])('%s holds %s', (functional, condition, budget) => {
    const { record } = prove(functional, condition, budget);
    expect(record).toMatchObject({ stop: 'decided', provedShare: 1, violatedShare: 0, undecidedShare: 0 });
    expect(sampledOutside(functional, condition)).toEqual([]);
  });

  it('PBE holds the Lieb-Oxford bound on exchange for every s, by a box without end', () => {
    const axes = {
      ...standardDomain.axes,
      s: { name: 's', lower: 0, upper: Number.POSITIVE_INFINITY, scale: 'compact' as const },
    };
    const { record } = prove('pbe', 'exchange-lieb-oxford', 10, {
      ...standardSettings,
      domain: { name: 'custom', axes },
    });
    expect(record.provedShare).toBe(1);
  });
});

describe('known refutations', () => {
  it("PBE's F_x exceeds 1.174 for s > 1.006: proved to be violated on 80 % of s, and certified at the witness", () => {
    const condition = conditionOf('exchange-two-electron-bound') as Condition;
    const functional = functionalOf('pbe');
    const [finding] = vetFunctional(functional, [condition], standardSettings).findings;
    const found = withProof(finding as NonNullable<typeof finding>, condition, functional, standardSettings, {
      budget: 500,
    });
    expect(found.verdict).toBe('violated');
    expect(found.proof).toMatchObject({ certifiedAtWitness: true, violatedWords: 's ≥ 1.01' });
    expect(found.proof?.violatedShare).toBeCloseTo(0.799, 2);
  });

  it("B88's F_x grows without bound: boxes at large s are proved to violate the Lieb-Oxford bound", () => {
    const settings = { ...standardSettings, domain: customDomain(new Map([['s', [0, 100]]])) };
    const { record } = prove('b88', 'exchange-lieb-oxford', 500, settings);
    expect(record.violatedShare).toBeGreaterThan(0.5);
    expect(record.provedShare).toBeGreaterThan(0.01);
  });
});

describe('what is not proved', () => {
  it('a budget that ends gives no proof, and the verdict stays holds', () => {
    const condition = conditionOf('lieb-oxford') as Condition;
    const functional = functionalOf('pbe');
    const settings = { ...standardSettings, domain: customDomain(new Map([['s', [0, 4]]])) };
    const [finding] = vetFunctional(functional, [condition], settings).findings;
    const found = withProof(finding as NonNullable<typeof finding>, condition, functional, settings, { budget: 20 });
    expect(found.verdict).toBe('holds');
    expect(found.proof).toMatchObject({ stop: 'budget', boxes: 20 });
    expect(found.proof?.undecidedWords).not.toBe('');
  });

  it('a condition with a limit is no claim about boxes', () => {
    const { record, claim } = prove('pbe', 'correlation-kinetic-bound', 10);
    expect(record.stop).toBe('not-provable');
    expect(record.reason).toContain('limit');
    expect(claim).toBeUndefined();
  });
});

/** A million points take a minute each: RUNGCHECK_SAMPLES=1000000 npx vitest run tests/proof. */
const sampleCount = Number(process.env.RUNGCHECK_SAMPLES ?? 20_000);

/** Sampled points of the domain at which the margin in double precision lies below minus the tolerance and round-off. */
function sampledOutside(functional: string, id: string): number[][] {
  const graph = new Graph();
  const condition = conditionOf(id) as Condition;
  const margin = buildMargin(graph, condition, functionalOf(functional), {
    ...standardSettings,
    limit: limitInFloat64,
  });
  const at = compilePoint(graph, margin.node, margin.variables);
  const outside: number[][] = [];
  let state = 5;
  const next = () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state + 0.5) / 2 ** 32;
  };
  for (let count = 0; count < sampleCount; count++) {
    const point = margin.variables.map((name) => {
      const { lower, upper, scale } = standardDomain.axes[name as keyof typeof standardDomain.axes];
      return scale === 'logarithmic' ? lower * (upper / lower) ** next() : lower + (upper - lower) * next();
    });
    if (at(Float64Array.from(point)) < -condition.definition.tolerance - 1e-10) outside.push(point);
  }
  return outside;
}
