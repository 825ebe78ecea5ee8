import { fileURLToPath } from 'node:url';
import type { Parameters } from './evaluate.ts';
import type { PartName } from './values.ts';

/** A published constant from which the reference library differs. */
export interface PublishedDifference {
  readonly functional: string;
  readonly part: PartName;
  readonly constant: string;
  /** The library's values of the sheet's parameters; with them every value must agree to the usual tolerance. */
  readonly library: Parameters;
  /** A sheet of the library's form, where parameters do not reach it. */
  readonly librarySheet?: string;
  /** The largest relative change of the energy per particle at the general points, to two digits. */
  readonly size: number;
}

const scanConstants = 'β(0) = 0.066725 and 2.3631 in G_c(ζ) as printed, against 0.06672455060314922 and 2.363';

/** The library derives χ∞ from the printed β(0) all the same. */
function scanLibrary(sheet: string): Parameters {
  return {
    [`${sheet}beta0`]: '0.06672455060314922',
    [`${sheet}gc`]: '2.363',
    [`${sheet}chi`]: '0.12802585262625815',
  };
}

export const publishedDifferences: readonly PublishedDifference[] = [
  {
    functional: 'chachiyo',
    part: 'correlation',
    constant: 'the closed forms of a, (log 2 − 1)/(2π²) and half of it, against eight and seven printed digits',
    library: { a0: '-0.01554535', a1: '-0.007772675' },
    size: 2.9e-7,
  },
  {
    functional: 'pw91',
    part: 'correlation',
    constant: 'the term 10⁴·7.389·10⁻⁶ r_s³ in the denominator of C_xc(r_s), as in P86, against none',
    library: { Cxc5: '0' },
    size: 8.2e-5,
  },
  {
    functional: 'q2d',
    part: 'correlation',
    constant: 'r_s of the two-dimensional gas 1.704 r_s √s, against 2^(−1/6) (4π/3)^(1/3) times as much',
    library: { r2d: '2.4471511475878263' },
    size: 8.3e-2,
  },
  {
    functional: 'scan',
    part: 'correlation',
    constant: scanConstants,
    library: scanLibrary(''),
    size: 3.8e-6,
  },
  {
    functional: 'r2scan',
    part: 'correlation',
    constant: scanConstants,
    library: scanLibrary('scan.'),
    size: 4.6e-6,
  },
  {
    functional: 'hse06',
    part: 'exchange-correlation',
    constant: 's rescaled beyond 8.3 alone, against s − log(1 + exp(s − 8.572844)), with a jump, from s = 1 on',
    library: {},
    librarySheet: fileURLToPath(new URL('sheets/hse06-library.yaml', import.meta.url)),
    size: 2.7e-4,
  },
  { functional: 'rscan', part: 'correlation', constant: scanConstants, library: scanLibrary('scan.'), size: 2.8e-5 },
  { functional: 'rppscan', part: 'correlation', constant: scanConstants, library: scanLibrary('scan.'), size: 4.6e-6 },
  {
    functional: 'revtpss',
    part: 'exchange',
    constant: 'c = 2.35204 and e = 2.1677 as printed, against nine digits',
    library: { c: '2.35203946', e: '2.16769874' },
    size: 7.4e-9,
  },
  {
    functional: 'regtpss',
    part: 'exchange',
    constant: 'c = 2.35204 and e = 2.1677 as printed for revTPSS, against nine digits',
    library: { 'revtpss.c': '2.35203946', 'revtpss.e': '2.16769874' },
    size: 7.4e-9,
  },
  {
    functional: 'revtpss',
    part: 'correlation',
    constant: 'β(0) = 0.066725 as printed, against 0.06672455060314922',
    library: { beta0: '0.06672455060314922' },
    size: 1.2e-5,
  },
  {
    functional: 'regtpss',
    part: 'correlation',
    constant: 'β(0) = 0.066725 as printed for revTPSS, against 0.06672455060314922',
    library: { 'revtpss.beta0': '0.06672455060314922' },
    size: 1.2e-5,
  },
];

/** Where the reference is the less exact side: its row is compared at α = 0 to this absolute size of F only. */
export interface CoarseReference {
  readonly functional: string;
  readonly part: PartName;
  readonly reason: string;
  readonly atAlphaZero: number;
}

export const coarseReferences: readonly CoarseReference[] = [
  {
    functional: 'pkzb',
    part: 'correlation',
    reason: 'exactly zero for one orbital; the library is left with the rounding of terms that cancel',
    atAlphaZero: 5e-12,
  },
  {
    functional: 'task',
    part: 'exchange',
    reason: 'the library keeps α ≥ 1e-10 τ/τ_unif, where F has a slope of −0.5',
    atAlphaZero: 1e-9,
  },
];
