import { Decimal, decimalContext } from '../number/decimal.ts';
import { allFinite, type DecimalFunction, doubling, pointNear, type Target, type Term, termsOf } from './sequence.ts';
import { shanks } from './shanks.ts';

/** f ~ C x^power (ln x)^logPower near the target; x is the distance where the target is finite. */
export type GrowthResult = { readonly terms: readonly Term[] } & (
  | {
      readonly kind: 'power';
      readonly power: Decimal;
      readonly logPower: Decimal;
      readonly error: Decimal;
      readonly logError: Decimal;
      readonly second: Decimal;
    }
  /** The function vanishes faster than any power. */
  | { readonly kind: 'vanishing' }
  | { readonly kind: 'unknown'; readonly reason: string }
);

const workingDigits = 60;
/** Where the function loses the ordinary digits so far out, as 1 − exp(−1/x) does. */
const moreDigits = 220;
const count = 8;

/**
 * The order of growth of f for x → target. At points x_k = b^(2^k) the logarithm u_k = ln|f(x_k)| is
 * p ln b 2^k + q (k ln 2 + ln ln b) + ln C, and second differences v_k = u_(k+1) − 2u_k leave
 * v_(k+1) − v_k = −q ln 2: powers and logarithmic factors are told apart exactly. What is left of corrections, which
 * run in powers of 2^(−k) for 1/ln x, is extrapolated. A second base b checks the first.
 */
export function growthOf(f: DecimalFunction, target: Target): GrowthResult {
  const digits = enoughDigits(f, target);
  const terms = termsOf(f, target, doubling('0.1', count, digits), digits);
  if (!allFinite(terms))
    return { kind: 'unknown', terms, reason: 'the function has no finite value close to the limit' };
  const last = terms.slice(-3);
  if (last.some(({ value }) => value.isZero())) return { kind: 'vanishing', terms };
  if (fallsExponentially(terms)) return { kind: 'vanishing', terms };
  const check = termsOf(f, target, doubling('0.05', count, digits), digits);
  if (!allFinite(check) || [...terms, ...check].some(({ value }) => value.isZero())) {
    return { kind: 'unknown', terms, reason: 'the function has zeros close to the limit' };
  }
  const first = exponents(terms, '0.1', target);
  const second = exponents(check, '0.05', target);
  const error = Decimal.max(first.power.minus(second.power).abs(), '1e-40');
  const logError = Decimal.max(first.logPower.minus(second.logPower).abs(), '1e-40');
  if (!error.lessThan('1e-3') || !logError.lessThan('0.2')) {
    return {
      kind: 'unknown',
      terms,
      reason: `two sequences give the powers ${short(first.power)} and ${short(second.power)}`,
    };
  }
  return { kind: 'power', ...first, error, logError, second: second.power, terms };
}

function enoughDigits(f: DecimalFunction, target: Target): number {
  const x = pointNear(target, decimalContext(workingDigits).from('1e-128'), workingDigits);
  const [coarse, fine] = [f(x, workingDigits), f(x, moreDigits)];
  return coarse.minus(fine).abs().lessThanOrEqualTo(fine.abs().times('1e-30')) ? workingDigits : moreDigits;
}

function exponents(terms: readonly Term[], base: string, target: Target): { power: Decimal; logPower: Decimal } {
  const { from, log } = decimalContext(workingDigits);
  const u = terms.map(({ value }) => log(value.abs()));
  const v = pairs(u, (a, b) => b.minus(a.times(2)));
  const noise = from('1e-45');
  const logPowers = pairs(v, (a, b) => a.minus(b).div(log(from(2))));
  const logPower = shanks(logPowers.slice(2), noise).value;
  // ln x doubles from term to term, starting from that of the base; x = 1/h where the target is infinity.
  const start = log(from(base)).times(target.kind === 'infinity' ? -1 : 1);
  const powers = pairs(u, (a, b, k) =>
    b
      .minus(a)
      .minus(logPower.times(log(from(2))))
      .div(start.times(2 ** k)),
  );
  return { power: shanks(powers.slice(2), noise).value, logPower };
}

/** ln|f| that at least squares from term to term, as −x does, is beyond every power. */
function fallsExponentially(terms: readonly Term[]): boolean {
  const { log } = decimalContext(workingDigits);
  const [a, b] = terms.slice(-2).map(({ value }) => log(value.abs())) as [Decimal, Decimal];
  return b.isNegative() && a.isNegative() && b.div(a).greaterThan(4);
}

function pairs(values: readonly Decimal[], make: (a: Decimal, b: Decimal, index: number) => Decimal): Decimal[] {
  return values.slice(1).map((value, index) => make(values[index] as Decimal, value, index));
}

function short(value: Decimal): string {
  return value.toSignificantDigits(4).toString();
}
