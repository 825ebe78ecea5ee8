import type { Finding, Findings, FunctionalFindings } from '../../src/finding/finding.ts';

const domain: Finding['domain'] = {
  name: 'standard',
  space: 'slice',
  coordinates: [
    { name: 'rs', lower: 0.01, upper: 100, points: 49, scale: 'logarithmic' },
    { name: 'zeta', lower: 0, upper: 1, points: 25, scale: 'toward-upper' },
    { name: 's', lower: 0, upper: 5, points: 51, scale: 'linear' },
    { name: 'alpha', lower: 0, upper: 5, points: 51, scale: 'linear' },
  ],
  fixed: {},
};

/** A finding of an invented condition that holds; every number in it is made up. */
export const holding: Finding = {
  constraint: 'invented-bound',
  title: 'Invented bound',
  part: 'exchange',
  force: 'necessary-and-sufficient',
  status: 'theorem',
  verdict: 'holds',
  gate: 'pass',
  gateReason: 'no violation found; not a proof',
  requirement: 'F_x ≤ 1.804',
  margin: 0.0123456,
  confirmed: '0.0123456000000000001',
  confirmedDigits: 19,
  witness: { rs: 1, zeta: 0, s: 5, alpha: 0.625 },
  irrelevant: ['rs'],
  violatedShare: 0,
  regions: [],
  moreRegions: 0,
  through: [],
  cause: null,
  tolerance: 1e-9,
  relative: false,
  points: 62475,
  withoutValue: 0,
  domain,
  constants: { 'lieb-oxford': 1.679 },
  reason: 'no violation at 62475 points; not a proof',
};

export const violated: Finding = {
  ...holding,
  constraint: 'invented-scaling',
  title: 'Invented scaling',
  part: 'correlation',
  force: 'sufficient',
  verdict: 'violated',
  gate: 'warn',
  gateReason: 'a warning until an integral over a real density confirms or clears it',
  requirement: '∂F_c/∂r_s ≥ 0',
  margin: -0.0023147709123456,
  confirmed: '-0.00231477091234567890123456789012',
  confirmedDigits: 43,
  witness: { rs: 0.5123456789012345, zeta: 1, s: 2.1234567890123457, alpha: 1 },
  irrelevant: ['alpha'],
  violatedShare: 0.0423,
  regions: [
    { share: 0.04, bounds: [], words: 's ≥ 2.31, r_s ≤ 1.2, every ζ' },
    { share: 0.0023, bounds: [], words: '0.95 ≤ ζ ≤ 0.999, every r_s' },
  ],
  moreRegions: 2,
  through: [
    { coordinate: 'rs', lower: 0.3123456, upper: 0.9234567, lowerIsEdge: false, upperIsEdge: false },
    { coordinate: 'zeta', lower: 0, upper: 1, lowerIsEdge: true, upperIsEdge: true },
    { coordinate: 's', lower: 2.0123456, upper: 5, lowerIsEdge: false, upperIsEdge: true },
  ],
  constants: {},
  reason: 'confirmed to 43 digits at the witness',
};

export const failing: Finding = {
  ...violated,
  constraint: 'invented-spot',
  title: 'Invented spot',
  force: 'necessary-and-sufficient',
  gate: 'fail',
  gateReason: 'a theorem whose local form is necessary',
  cause: { kind: 'printed-digits', text: 'it lies within the rounding of the printed parameters' },
  domain: { ...domain, coordinates: domain.coordinates.slice(0, 3), fixed: { alpha: 0 } },
};

export const undecided: Finding = {
  ...holding,
  constraint: 'invented-doubt',
  verdict: 'undecided',
  gateReason: 'not decided; see the reason',
  margin: -1e-12,
  tolerance: 1e-13,
  reason: 'the margin at the lowest point could not be resolved',
};

export const notAsked: Finding = {
  ...holding,
  constraint: 'invented-other',
  verdict: 'not-applicable',
  gateReason: 'does not apply',
  margin: null,
  confirmed: null,
  confirmedDigits: 0,
  witness: null,
  violatedShare: null,
  points: 0,
  domain: { ...domain, coordinates: [] },
  reason: 'the functional has no correlation',
};

export const functional: FunctionalFindings = {
  id: 'invented-meta',
  name: 'INV-1',
  rung: 'meta-gga',
  exactExchange: null,
  nonLocal: null,
  parameters: {},
  sheetHash: '0'.repeat(64),
  domain,
  findings: [holding, notAsked, violated, undecided, failing],
};

export function findingsOf(...functionals: readonly FunctionalFindings[]): Findings {
  return {
    format: 'rungcheck findings',
    formatVersion: 1,
    engineVersion: '0.0.0',
    catalogueVersion: 'invented',
    functionals: [...functionals],
  };
}
