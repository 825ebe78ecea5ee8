import { compareStates, usualTolerances } from '../../src/finding/compare.ts';
import type { Findings } from '../../src/finding/finding.ts';
import { stateOf } from '../../src/finding/state.ts';
import type { Explanation } from '../../src/report/explain.ts';
import type { RunReport } from '../../src/report/run-report.ts';
import { failing, findingsOf, functional, violated } from './made-up.ts';

export const condition: Explanation = {
  id: violated.constraint,
  title: violated.title,
  statement: 'E_c[n_γ] ≥ γ E_c[n], an invented statement with <angles> & "quotes"',
  localForm: '∂F_c/∂r_s ≥ 0',
  requirement: 'd(Fc, rs) >= 0',
  derivation: null,
  force: 'sufficient',
  status: 'theorem',
  gate: null,
  part: 'correlation',
  rungs: ['meta-gga'],
  domain: 'r_s 0.01 … 100',
  constants: [],
  tolerance: '1e-9',
  toleranceReason: null,
  conflicts: [],
  holds: [],
  breaks: [],
  traps: [],
  sources: ['An invented source'],
};

/** A functional in a file of the user, with its lines. */
export const placed = {
  ...functional,
  places: {
    file: 'sheets/invented meta.yaml',
    catalogue: false,
    parts: { exchange: { line: 12, column: 16 }, correlation: { line: 15, column: 17 } },
    parameters: { mu: { line: 7, column: 3 } },
  },
};

/** Findings with an accepted violation, remarks and a faulty sheet. */
export const findings: Findings = {
  ...findingsOf({
    ...placed,
    findings: [
      ...placed.findings,
      {
        ...failing,
        constraint: 'invented-digits',
        cause: { kind: 'printed-digits', text: 'rounding', parameter: { sheet: placed.id, name: 'mu' } },
      },
      { ...failing, constraint: 'invented-known', gate: 'accepted', gateReason: 'accepted by the project: old' },
    ],
  }),
  remarks: [
    {
      kind: 'acceptance-unused',
      constraint: 'invented-bound',
      functional: placed.id,
      text: 'the acceptance no longer applies',
      file: 'rungcheck.yaml',
      line: 9,
      column: 5,
    },
  ],
  faults: [
    {
      sheet: './broken.yaml',
      internal: false,
      problems: [
        {
          code: 'unknown-name',
          message: 'unknown name kapa',
          remedy: 'Did you mean kappa?',
          file: 'broken.yaml',
          line: 3,
          column: 9,
        },
      ],
    },
  ],
};

export const report: RunReport = { findings, comparison: null, conditions: new Map([[condition.id, condition]]) };

/** The same against a state in which the spot was not yet violated, and a functional was there that is gone. */
export const compared: RunReport = {
  ...report,
  comparison: compareStates(
    stateOf(
      findingsOf(
        {
          ...functional,
          findings: functional.findings.map((one) => (one === failing ? { ...one, verdict: 'holds' as const } : one)),
        },
        { ...functional, id: 'gone' },
      ),
    ),
    stateOf(findings),
    usualTolerances,
  ),
};
