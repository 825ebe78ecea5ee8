import type { DensityName } from '../functional/variable-place.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import { pathDigits } from './approach.ts';
import type { Edge } from './edges.ts';

/** How a density is made: r = n↓/n↑ with parallel gradients, and what is added to τ_Wσ in units of n_σ^(5/3). */
interface Recipe {
  readonly n: string;
  /** |∇n↑| in units of n↑^(4/3). */
  readonly x: string;
  readonly beyondWeizsacker: string;
}

const ratio = '0.5';

/** The density of a recipe, with x, what is beyond τ_W, and the smaller channel multiplied by factors. */
function densityOf(recipe: Recipe, factors: { x?: Decimal; tau?: Decimal; minority?: Decimal }): Map<string, Decimal> {
  const context = decimalContext(pathDigits);
  const from = (text: string) => context.from(text);
  const scale = (value: Decimal, factor: Decimal | undefined) => (factor === undefined ? value : value.times(factor));
  const up = from(recipe.n);
  const dn = scale(up.times(ratio), factors.minority);
  const share = dn.div(up);
  const gradient = scale(from(recipe.x), factors.x).times(up.pow(from('4').div(3)));
  const uu = gradient.times(gradient);
  const kinetic = (density: Decimal, square: Decimal) => {
    const excess = scale(from(recipe.beyondWeizsacker), factors.tau).times(density.pow(from('5').div(3)));
    return density.isZero() ? from('0') : square.div(density.times(8)).plus(excess);
  };
  const dd = uu.times(share).times(share);
  return new Map<DensityName, Decimal>([
    ['n_up', up],
    ['n_dn', dn],
    ['sigma_uu', uu],
    ['sigma_ud', uu.times(share)],
    ['sigma_dd', dd],
    ['tau_up', kinetic(up, uu)],
    ['tau_dn', kinetic(dn, dd)],
    ['lapl_up', from('0.1').times(up)],
    ['lapl_dn', from('0.1').times(dn)],
  ]);
}

const plain: Recipe = { n: '0.2', x: '2', beyondWeizsacker: '3' };
const zero = decimalContext(pathDigits).from('0');

const inputsOfEmptyChannel: readonly string[] = ['n_dn', 'sigma_dd', 'sigma_ud', 'tau_dn', 'lapl_dn'];

/**
 * Edges of the space of spin densities: no gradient, τ = τ_W, both at once, an empty channel, densities down to
 * 10⁻³⁰ bohr⁻³, and rapid variation. Where a channel is empty, derivatives by its own inputs are not asked for.
 */
export function densityEdges(variables: readonly string[]): Edge[] {
  const hasGradient = variables.some((name) => name.startsWith('sigma'));
  const hasKinetic = variables.some((name) => name.startsWith('tau'));
  const edge = (
    words: string,
    at: Map<string, Decimal>,
    paths: Edge['paths'],
    isExempt: Edge['isExempt'] = () => false,
  ): Edge => {
    const point = Object.fromEntries([...at].map(([name, value]) => [name, value.toNumber()]));
    return { words, point, slice: sliceOf(point), paths, isExempt };
  };
  const made = (factors: Parameters<typeof densityOf>[1]) => densityOf(plain, factors);
  // |∇n| goes as the root of the distance, so that σ goes as the distance itself.
  const flatter = (distance: Decimal) => distance.sqrt();
  const flat = edge('∇n = 0', made({ x: zero }), [(d) => made({ x: flatter(d) })]);
  const oneOrbital = edge('τ = τ_W', made({ tau: zero }), [(d) => made({ tau: d })]);
  const both = edge('∇n = 0 and τ = 0', made({ x: zero, tau: zero }), [
    (d) => made({ x: flatter(d), tau: d.times(d) }),
    (d) => made({ x: flatter(d), tau: d }),
    (d) => made({ x: d, tau: d }),
  ]);
  const oneChannel = edge('n↓ = 0', made({ minority: zero }), [(d) => made({ minority: d })], (by) =>
    by.some((name) => inputsOfEmptyChannel.includes(name)),
  );
  const dilute = ['1e-10', '1e-20', '1e-30'].map((n) => edge(`n↑ = ${n}`, densityOf({ ...plain, n }, {}), []));
  const steep = ['0.2', '1e-20'].map((n) =>
    edge(`n↑ = ${n}, |∇n↑| = 10⁴ n↑^(4/3)`, densityOf({ ...plain, n, x: '1e4' }, {}), []),
  );
  return [
    oneChannel,
    ...dilute,
    ...(hasGradient ? [flat, ...steep] : []),
    ...(hasKinetic ? [oneOrbital] : []),
    ...(hasGradient && hasKinetic ? [both] : []),
  ];
}

function sliceOf(point: Readonly<Record<string, number>>): Edge['slice'] {
  const value = (name: DensityName) => point[name] as number;
  const n = value('n_up') + value('n_dn');
  const kF = Math.cbrt(3 * Math.PI ** 2 * n);
  const sigma = value('sigma_uu') + 2 * value('sigma_ud') + value('sigma_dd');
  const zeta = (value('n_up') - value('n_dn')) / n;
  const spread = ((1 + zeta) ** (5 / 3) + (1 - zeta) ** (5 / 3)) / 2;
  const uniform = (3 / 10) * kF ** 2 * n * spread;
  return {
    rs: Math.cbrt(3 / (4 * Math.PI * n)),
    zeta,
    s: Math.sqrt(sigma) / (2 * kF * n),
    alpha: Math.max(0, value('tau_up') + value('tau_dn') - sigma / (8 * n)) / uniform,
  };
}
