import { describe, expect, it } from 'vitest';
import { checkRegime, regimes } from './regimes.ts';

// A million arguments a regime take hours: RUNGCHECK_ENCLOSURES=1000000 npx vitest run tests/interval.
const count = Number(process.env.RUNGCHECK_ENCLOSURES ?? 270);

describe('enclosures of functions against 50 digits', () => {
  it.each(regimes)(
    '$name: the value is inside, and the enclosure no wider than its bound says',
    (regime) => {
      const widest = checkRegime(regime, count, 20);
      if (regime.width !== undefined) expect(widest).toBeLessThanOrEqual(regime.width);
    },
    0,
  );
});

describe('exact ends', () => {
  it.each([
    ['exp', 0, 1],
    ['expm1', 0, 0],
    ['log1p', 0, 0],
    ['sinh', 0, 0],
    ['cosh', 0, 1],
    ['erf', 0, 0],
    ['atan', 0, 0],
    ['lambertW', 0, 0],
  ] as const)('%s(%d) is %d without widening', async (name, x, value) => {
    const { smoothFunctions } = await import('../../src/interval/functions.ts');
    const out = new Float64Array(2);
    smoothFunctions[name].at(x, out);
    expect([...out].map((end) => end + 0)).toEqual([value, value]);
  });
});
