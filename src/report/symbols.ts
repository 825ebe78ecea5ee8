import { coordinateSymbol } from '../finding/symbols.ts';

const answerSymbols: Readonly<Record<string, string>> = {
  eps_x: 'ε_x',
  eps_c: 'ε_c',
  eps_xc: 'ε_xc',
  Fx: 'F_x',
  Fc: 'F_c',
  Fxc: 'F_xc',
  dFx_drs: '∂F_x/∂r_s',
  dFc_drs: '∂F_c/∂r_s',
  d2Fc_drs2: '∂²F_c/∂r_s²',
  dFxc_drs: '∂F_xc/∂r_s',
};

/** The field's symbol of an answer of `at`: ε_x, F_c, ∂F_c/∂r_s, ∂e_x/∂n↑ (e: energy per volume) …. */
export function answerSymbol(name: string): string {
  const derivative = /^d_(.+?)(?:_(x|c))?$/.exec(name);
  if (derivative === null) return answerSymbols[name] ?? name;
  const [, input = '', part = 'xc'] = derivative;
  return `∂e_${part}/∂${coordinateSymbol(input)}`;
}

/** Greek letters by the names that parameters have. */
export const greekLetters: Readonly<Record<string, string>> = {
  alpha: 'α',
  beta: 'β',
  gamma: 'γ',
  delta: 'δ',
  epsilon: 'ε',
  zeta: 'ζ',
  eta: 'η',
  theta: 'θ',
  kappa: 'κ',
  lambda: 'λ',
  mu: 'μ',
  nu: 'ν',
  xi: 'ξ',
  rho: 'ρ',
  sigma: 'σ',
  tau: 'τ',
  phi: 'φ',
  chi: 'χ',
  psi: 'ψ',
  omega: 'ω',
};
