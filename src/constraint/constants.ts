import { parseDecimal, type Rational } from '../number/rational.ts';

/** A constant that the user may choose; `published` names the values that the literature offers. */
export interface SelectableConstant {
  readonly name: string;
  readonly meaning: string;
  readonly default: string;
  readonly published: readonly { readonly value: string; readonly source: string }[];
}

export const selectableConstants: readonly SelectableConstant[] = [
  {
    name: 'lieb-oxford',
    meaning: 'C in E_xc ≥ −C ∫ n^(4/3)',
    default: '1.679',
    published: [
      { value: '1.679', source: 'E. H. Lieb, S. Oxford, Int. J. Quantum Chem. 19, 427 (1981)' },
      { value: '1.6358', source: 'G. K.-L. Chan, N. C. Handy, Phys. Rev. A 59, 3075 (1999)' },
      { value: '1.58', source: 'M. Lewin, E. H. Lieb, R. Seiringer, Lett. Math. Phys. 112, 92 (2022)' },
    ],
  },
  {
    name: 'hartree-fock',
    meaning: 'C in E_x ≥ −C ∫ n^(4/3), for exchange alone',
    default: '1.25',
    published: [{ value: '1.25', source: 'M. Lewin, E. H. Lieb, R. Seiringer, Lett. Math. Phys. 112, 92 (2022)' }],
  },
  {
    name: 'two-electron',
    meaning: 'largest F_x of a spin-unpolarised two-electron density',
    default: '1.174',
    published: [
      { value: '1.174', source: 'J. P. Perdew et al., J. Chem. Phys. 140, 18A533 (2014), rounded as published' },
      { value: '1.173334', source: 'C = 1.0918171858 over 2^(1/3) A_x; Lane–Emden profile, recomputed' },
    ],
  },
];

/** The value of each constant: the user's choice, else the default. */
export function constantValues(chosen: ReadonlyMap<string, Rational>): Map<string, Rational> {
  return new Map(
    selectableConstants.map((constant) => [
      constant.name,
      chosen.get(constant.name) ?? (parseDecimal(constant.default) as Rational),
    ]),
  );
}
