import type { Rung } from './functional-definition.ts';

/**
 * A commented sheet to start from. Its forms are published ones that stand in for the writer's own, and say so.
 * It parses, and every parameter in it is used. The id (see `idPattern`) becomes the display name.
 */
export function newSheet(id: string, rung: Rung): string {
  return `${heading(id, rung)}\n${bodies[rung]}`;
}

function heading(id: string, rung: Rung): string {
  return `# A functional sheet, in Hartree atomic units. The file name without .yaml is the id: ${id}.
# PLACEHOLDER: the forms below are published ones, here only to be replaced by yours, with their citations.

name: ${id}
rung: ${rung}  # lda: rs, zeta, n … | gga: also s, p, t … | meta-gga: also tau, alpha, q …
summary: placeholder forms, to be replaced
`;
}

const parameterHelp = `# A value is an exact decimal or an expression of other parameters. digits: significant digits as printed.`;

const lda = `citations:
  - P. A. M. Dirac, Proc. Cambridge Philos. Soc. 26, 376 (1930)  # exchange
  - E. P. Wigner, Trans. Faraday Soc. 34, 678 (1938)  # correlation

${parameterHelp}
parameters:
  a: { value: 0.44, digits: 2, meaning: low-density strength of correlation }
  b: { value: 7.8, digits: 2, meaning: radius at which correlation levels off }

# Enhancement factor of the unpolarised density over uniform-gas exchange; exact spin scaling is applied.
exchange:
  enhancement: 1

# Energy per particle; or per-volume: n times as much.
correlation:
  per-particle: -a / (rs + b)
`;

const gga = `citations:
  - J. P. Perdew, K. Burke, M. Ernzerhof, Phys. Rev. Lett. 77, 3865 (1996)

# Other sheets that this one builds on, each under an alias.
uses:
  gas: pw92-full-digits

${parameterHelp}
parameters:
  kappa: { value: 0.804, digits: 3, source: below Eq. (14), meaning: largest enhancement above 1 }
  beta: { value: 0.066725, digits: 5, source: below Eq. (4), meaning: gradient coefficient of correlation }
  gamma: (1 - log(2)) / pi^2
  mu: beta * pi^2 / 3

# Enhancement factor of the unpolarised density over uniform-gas exchange; exact spin scaling is applied.
exchange:
  enhancement: 1 + kappa - kappa / (1 + mu * s^2 / kappa)

# Energy per particle (or per-volume: n times as much); where names the steps towards it.
correlation:
  where:
    ec: gas.correlation(rs, zeta)
    A: beta / gamma / (exp(-ec / (gamma * phi^3)) - 1)
    y: A * t^2
  per-particle: ec + gamma * phi^3 * log(1 + beta / gamma * t^2 * (1 + y) / (1 + y + y^2))
`;

const metaGga = `citations:
  - J. Sun, B. Xiao, A. Ruzsinszky, J. Chem. Phys. 137, 051101 (2012)  # exchange
  - J. P. Perdew, K. Burke, M. Ernzerhof, Phys. Rev. Lett. 77, 3865 (1996)  # correlation

# Other sheets that this one builds on, each under an alias.
uses:
  base: pbe

${parameterHelp}
parameters:
  mu: { value: 10/81, meaning: second-order gradient coefficient }
  kappa: { value: 0.29, digits: 2, meaning: largest enhancement above 1 at alpha = 1 }
  c: { value: 0.28771, digits: 5, meaning: fixed by the exchange energy of the hydrogen atom }
  b: { value: 1, meaning: strength of the fall at large alpha }

# Enhancement factor of the unpolarised density over uniform-gas exchange; exact spin scaling is applied.
# s, p = s^2 and alpha are those of that density. A conditional is written (x < y ? v : w), quoted: 'F: …'.
exchange:
  where:
    F1: 1 + kappa - kappa / (1 + mu * p / kappa)
    F0: 1 + kappa - kappa / (1 + (mu * p + c) / kappa)
    f: (1 - alpha^2)^3 / (1 + alpha^3 + b * alpha^6)
  enhancement: F1 + f * (F0 - F1)

# The correlation of another sheet, taken whole; replace it by where and per-particle: expression.
correlation: { from: base }
`;

const bodies: Readonly<Record<Rung, string>> = { lda, gga, 'meta-gga': metaGga };
