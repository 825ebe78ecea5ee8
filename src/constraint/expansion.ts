import { closeSequences, limitOf } from '../extrapolate/limit.ts';
import { Decimal, decimalContext } from '../number/decimal.ts';

type Place = readonly (readonly [name: string, value: Decimal])[];

/** Distance at which the neighbourhood of a point is looked at, and what may differ over it. */
const step = '1e-20';
/** Where the limit is taken instead: well inside the scale on which another variable may compress the function. */
const close = closeSequences(new Decimal('1e-16'));
const mayDiffer = '1e-6';

/** Coordinates with no values below the point of expansion. */
const oneSided = ['s', 's_up', 's_dn', 'rs', 'alpha_up', 'alpha_dn'];

/**
 * A derivative at a point where the formula may be 0/0 or switch branches. The value at the point itself stands when
 * points close by agree with it; otherwise it is the limit, along all expanded coordinates together, from each side.
 * NaN where the two sides differ: there is no such derivative.
 */
export function approach(f: (place: Place, digits: number) => Decimal, at: Place, digits: number): Decimal {
  const sides = at.some(([name, value]) => !oneSided.includes(name) && !value.isZero()) ? [1, -1] : [1];
  const near = (sign: number, h: Decimal, precision: number) =>
    f(
      at.map(([name, value]) => {
        const { from } = decimalContext(precision);
        return [name, from(value).plus(from(h).times(oneSided.includes(name) ? 1 : sign))] as const;
      }),
      precision,
    );
  const here = f(at, digits);
  const { from } = decimalContext(digits);
  if (here.isFinite() && sides.every((sign) => agrees(here, near(sign, from(step), digits)))) return here;
  const limits = sides.map((sign) =>
    limitOf((h, precision) => near(sign, h, precision), { kind: 'value', value: from(0), side: 'above' }, close),
  );
  const values = limits.map((limit) => (limit.kind === 'finite' ? limit.value : from(Number.NaN)));
  const [first, second = first] = values as [Decimal, Decimal?];
  return agrees(first, second) ? first : from(Number.NaN);
}

function agrees(a: Decimal, b: Decimal): boolean {
  return a.minus(b).abs().lessThanOrEqualTo(Decimal.max(1, a.abs()).times(mayDiffer));
}
