const lowest = -1074;
const table = new Float64Array(2098);
// Doubling is exact; 2 ** k need not be.
for (let k = 0, value = 1; k <= 1023; k++, value *= 2) table[k - lowest] = value;
for (let k = 0, value = 1; k >= lowest; k--, value /= 2) table[k - lowest] = value;

/** Exactly 2^k for an integer k from −1074 to 1023. */
export function powerOfTwo(k: number): number {
  return table[k - lowest] as number;
}

const double = new Float64Array(1);
const words = new Uint32Array(double.buffer);
double[0] = 1;
const high = words[1] === 0 ? 0 : 1;

/** The exponent e of a positive normal x = m·2^e with 1 ≤ m < 2. */
export function exponentOf(x: number): number {
  double[0] = x;
  return ((words[high] as number) >>> 20) - 1023;
}
