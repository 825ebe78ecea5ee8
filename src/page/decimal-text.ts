import type { Rational } from '../number/rational.ts';

/** A rational as a decimal where it has an end, otherwise as a fraction. */
export function decimalText(value: Rational): string {
  let rest = value.d;
  let [twos, fives] = [0, 0];
  for (; rest % 2n === 0n; rest /= 2n) twos++;
  for (; rest % 5n === 0n; rest /= 5n) fives++;
  const sign = value.s < 0n ? '-' : '';
  if (rest !== 1n) return `${sign}${value.n}/${value.d}`;
  const places = Math.max(twos, fives);
  const digits = String(value.n * 2n ** BigInt(places - twos) * 5n ** BigInt(places - fives)).padStart(places + 1, '0');
  const [whole, fraction] = [digits.slice(0, digits.length - places), digits.slice(digits.length - places)];
  const leading = whole === '0' ? (/^0*/.exec(fraction) as RegExpExecArray)[0].length : 0;
  if (leading > 4) {
    const significant = fraction.slice(leading);
    const mantissa = significant.length === 1 ? significant : `${significant[0]}.${significant.slice(1)}`;
    return `${sign}${mantissa}e-${leading + 1}`;
  }
  return `${sign}${whole}${fraction === '' ? '' : `.${fraction}`}`;
}
