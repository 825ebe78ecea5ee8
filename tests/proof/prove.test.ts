import { describe, expect, it } from 'vitest';
import type { Condition } from '../../src/constraint/condition.ts';
import { customDomain, standardDomain } from '../../src/constraint/domain.ts';
import { vetFunctional } from '../../src/constraint/vet.ts';
import { proveCondition, withProof } from '../../src/proof/prove.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';
import { sampledOutside } from './sampled-outside.ts';

const prove = (functional: string, condition: string, budget: number, settings = standardSettings) =>
  proveCondition(conditionOf(condition) as Condition, functionalOf(functional), settings, { budget });

/** A million points take a minute each: RUNGCHECK_SAMPLES=1000000 npx vitest run tests/proof. */
const sampleCount = Number(process.env.RUNGCHECK_SAMPLES ?? 20_000);

describe('known proofs on the standard domain', () => {
  // The bounds are those of the papers: F_x ≤ 1.804 (PBE), 1.174 (SCAN at ζ = 0); E_c ≤ 0; Lieb-Oxford.
  it.each([
    ['pbe', 'exchange-lieb-oxford', 1],
    ['pbe', 'correlation-non-positive', 5_000],
    ['pbe', 'lieb-oxford', 20_000],
    ['pbe', 'exchange-coordinate-scaling', 1],
    ['pbe', 'correlation-coordinate-scaling', 20_000],
    ['scan', 'exchange-hartree-fock-bound', 1_000],
    ['scan', 'correlation-non-positive', 5_000],
    ['scan', 'lieb-oxford', 5_000],
    ['r2scan', 'exchange-non-positive', 1_000],
    ['tpss', 'correlation-non-positive', 5_000],
    ['tpss', 'exchange-lieb-oxford', 20],
    ['pw92', 'correlation-non-positive', 1_000],
    ['pw92', 'correlation-coordinate-scaling', 10_000],
    ['pw92', 'correlation-kinetic-ceiling', 10_000],
  ])('%s holds %s', (functional, condition, budget) => {
    const { record } = prove(functional, condition, budget);
    expect(record).toMatchObject({ stop: 'decided', provedShare: 1, violatedShare: 0, undecidedShare: 0 });
    expect(sampledOutside(functional, condition, sampleCount)).toEqual([]);
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

describe('identities', () => {
  it.each([
    ['pbe', 'correlation-spin-symmetry'],
    ['scan', 'exchange-spin-scaling'],
  ])('%s holds %s by algebra: exact rewrites bring both sides to one expression', (functional, condition) => {
    const { record, claim } = prove(functional, condition, 1);
    expect(record).toMatchObject({ stop: 'decided', boxes: 1, provedShare: 1 });
    expect(record.reason).toContain('one constant');
    expect(claim?.variables).toEqual([]);
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
  it('on a plane at s = 0 nothing is taken to be positive there: TPSS has no value at s = α = 0, and all of it is open', () => {
    const domain = customDomain(
      new Map([
        ['s', [0, 0]],
        ['alpha', [0, 0]],
      ]),
    );
    const { record } = prove('tpss', 'exchange-lieb-oxford', 50, { ...standardSettings, domain });
    expect(record).toMatchObject({ provedShare: 0, undecidedShare: 1 });
  });

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
