const coordinateSymbols: Readonly<Record<string, string>> = {
  rs: 'r_s',
  zeta: 'ζ',
  s: 's',
  alpha: 'α',
  q: 'q',
  omega: 'ω',
  s_up: 's↑',
  s_dn: 's↓',
  cosine: 'cos θ',
  alpha_up: 'α↑',
  alpha_dn: 'α↓',
  n_up: 'n↑',
  n_dn: 'n↓',
  sigma_uu: 'σ↑↑',
  sigma_ud: 'σ↑↓',
  sigma_dd: 'σ↓↓',
  tau_up: 'τ↑',
  tau_dn: 'τ↓',
  lapl_up: '∇²n↑',
  lapl_dn: '∇²n↓',
};

/** The field's symbol of a coordinate; the name itself where there is none. */
export function coordinateSymbol(name: string): string {
  return coordinateSymbols[name] ?? name;
}
