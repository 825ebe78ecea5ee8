/** The shortest text that reads back as the same double. */
export function roundTripText(value: number): string {
  return Object.is(value, -0) ? '-0' : String(value);
}

/**
 * A number rounded to some significant digits, without trailing zeros: `0.0512`, `-2.3e-7`, `1.2e+6`.
 * Values from 0.001 to 99 999 in size are written without an exponent.
 */
export function shortText(value: number, digits = 3): string {
  if (value === 0) return '0';
  if (!Number.isFinite(value)) return Number.isNaN(value) ? 'no value' : value > 0 ? '∞' : '-∞';
  const rounded = Number(value.toPrecision(digits));
  const size = Math.abs(rounded);
  if (size >= 1e-3 && size < 1e5) return String(rounded);
  const [mantissa = '', exponent = ''] = rounded.toExponential().split('e');
  return `${mantissa}e${exponent}`;
}

/** As `shortText`, with a sign on positive values too. */
export function signedText(value: number, digits = 3): string {
  return value > 0 ? `+${shortText(value, digits)}` : shortText(value, digits);
}

/** A share of one in per cent: `4.2 %`, `< 0.01 %`, `100 %`; never 0 % for a share that is not zero, nor 100 % for less than all. */
export function percentText(share: number): string {
  const percent = share * 100;
  if (percent === 0) return '0 %';
  if (percent < 0.01) return '< 0.01 %';
  if (percent > 99.9 && percent < 100) return '> 99.9 %';
  return `${shortText(percent, percent < 10 ? 2 : 3)} %`;
}

/** A count with its thousands set apart: `62 475`. */
export function countText(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, ' ');
}

/** Decimal text cut to some significant digits, with `…` where digits are left out. */
export function leadingDigits(decimal: string, digits: number): string {
  const match = /^([+-]?)(\d+)(?:\.(\d+))?(e[+-]?\d+)?$/i.exec(decimal);
  if (match === null) return decimal;
  const [, sign = '', whole = '', fraction = '', exponent = ''] = match;
  const leadingZeros = (/^0*/.exec(whole + fraction) as RegExpExecArray)[0].length;
  const kept = Math.max(leadingZeros + digits, whole.length);
  if (whole.length + fraction.length <= kept) return decimal;
  const point = kept > whole.length ? '.' : '';
  return `${sign}${whole}${point}${fraction.slice(0, kept - whole.length)}…${exponent}`;
}
