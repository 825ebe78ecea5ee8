import type { Outcome } from '../../src/errors/problem.ts';

export const origin = { file: 'f.yaml', id: 'f' };

/** A sheet that uses every key of the form. */
export const wholeFunctional = `name: Whole
year: 2026
rung: meta-gga
summary: every key once
notes: invented for tests
citations:
  - nobody, nowhere (2026)
uses:
  gas: pw92
  base: { sheet: pbe, parameters: { mu: 10/81 } }
parameters:
  kappa: 0.8040
  mu: { value: 0.21951, digits: 5, source: "Eq. (12)", meaning: gradient coefficient }
functions:
  G(rs, A): -2*A*(1 + rs)
where:
  u: kappa*s^2
exact-exchange: { short-range: 0.19, long-range: 0.65, omega: 0.33 }
non-local: vv10
exchange:
  where:
    F: |
      s < 1
        ? kappa : mu
  enhancement: 1 + F
correlation:
  partition: gas
  same-spin: 1
  opposite-spin: u
`;

export const wholeConstraint = `title: Correlation energy under uniform coordinate scaling
statement: E_c[n_γ] ≥ γ E_c[n] for γ > 1
local-form: ∂F_c/∂r_s ≥ 0
derivation: r_s goes to r_s/γ
force: sufficient
status: theorem
gate: warn
gate-reason: a reason
sources: [ "Levy, Perdew, PRA 32, 2010 (1985)" ]
part: correlation
rungs: [lda, gga, meta-gga]
space: spin
at: { zeta: 1, s: 1/2 }
uses: { gas: pw92 }
constants: { C: lieb-oxford }
requirement: d(Fc, rs) >= 0
relative: true
tolerance: 1e-9
tolerance-reason: round-off
sweep: { rs: [1, 10] }
table: { columns: [s, value], rows: [[0, 1], [1, 1/2]] }
cannot-meet: [{ rungs: [lda, gga], with: correlation-uniform-gas, reason: known }]
holds: [pbe]
breaks: [{ id: lyp, where: "s > 1", source: somebody }]
traps: [one, two]
`;

/** Each problem as `line:column code message`. */
export function problemsOf(outcome: Outcome<unknown>): readonly string[] {
  if (outcome.ok) return [];
  return outcome.problems.map(({ line, column, code, message }) => `${line}:${column} ${code} ${message}`);
}

export function acceptedValue<Value>(outcome: Outcome<Value>): Value {
  if (!outcome.ok) throw new Error(problemsOf(outcome).join('\n'));
  return outcome.value;
}
