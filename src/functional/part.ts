import type { Expression } from '../expression/expression.ts';
import { add, choice, constant, div, mul, neg, power, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { rational } from '../number/rational.ts';
import type { Frame, Instance, PartEnergy } from './frame.ts';
import type { Form, Part } from './functional.ts';
import { type Place, slicePlace } from './place.ts';
import type { Channel } from './quantities.ts';
import { quotientByUnit } from './quotient.ts';

/** The energy of a part in any of its forms. */
export function partEnergy(instance: Instance, part: Part, place: Place): PartEnergy {
  const { graph } = instance;
  const frame: Frame = { place, part };
  const { form } = part;
  switch (form.kind) {
    case 'enhancement': {
      const enhancement = spinScaled(instance, part, form.value, place);
      return {
        enhancement,
        // Made only when asked for: an imported enhancement factor is evaluated without r_s.
        get perParticle() {
          return neg(graph, mul(graph, place.unit, enhancement));
        },
      };
    }
    case 'per-particle':
      return fromPerParticle(graph, place, instance.interpretAt(form.value, frame));
    case 'per-volume':
      return fromPerParticle(graph, place, div(graph, instance.interpretAt(form.value, frame), place.total('n')));
    case 'pairs':
      return fromPerParticle(graph, place, div(graph, pairsPerVolume(instance, form, frame), place.total('n')));
    case 'from': {
      const energy = instance.imported(form.alias).part(part.name, place);
      if (energy === undefined) throw new RangeError(`${form.alias} has no ${part.name}`);
      return energy;
    }
  }
}

/** A sum over the spin channels; an empty channel contributes nothing, whatever its reduced quantities are. */
export function spinSum(graph: Graph, place: Place, term: (channel: Channel) => NodeId): NodeId {
  const zero = constant(graph, 0);
  const occupiedTerm = (channel: Channel) =>
    choice(graph, 'ifLess', zero, place.occupied(channel), term(channel), zero);
  return add(graph, occupiedTerm('up'), occupiedTerm('dn'));
}

/**
 * F_x(n↑, n↓) = Σ_σ ½ (2n_σ/n)^(4/3) F_x(2n_σ), exact spin scaling of an unpolarised enhancement factor.
 * Source: G. L. Oliver and J. P. Perdew, Phys. Rev. A 20, 397 (1979).
 */
function spinScaled(instance: Instance, part: Part, value: Expression, place: Place): NodeId {
  const { graph } = instance;
  return spinSum(graph, place, (channel) => {
    const factor = instance.interpretAt(value, { place: unpolarisedChannel(graph, place, channel), part });
    const weight = mul(
      graph,
      constant(graph, rational(1, 2)),
      power(graph, polarisedShare(graph, place, channel), rational(4, 3)),
    );
    return mul(graph, weight, factor);
  });
}

/** The unpolarised density 2n_σ; its coordinates are made only when the formula asks for them. */
function unpolarisedChannel(graph: Graph, place: Place, channel: Channel): Place {
  return slicePlace(graph, {
    zeta: constant(graph, 0),
    // r_s of 2n_σ is 2^(−1/3) times that of n_σ.
    get rs() {
      return mul(graph, power(graph, constant(graph, 2), rational(-1, 3)), place.channel('rs', channel));
    },
    get s() {
      return place.channel('s', channel);
    },
    get alpha() {
      return place.channel('alpha', channel);
    },
    get q() {
      return place.channel('q', channel);
    },
  });
}

/** 2n_σ/n */
function polarisedShare(graph: Graph, place: Place, channel: Channel): NodeId {
  const one = constant(graph, 1);
  const zeta = place.total('zeta');
  return channel === 'up' ? add(graph, one, zeta) : sub(graph, one, zeta);
}

/**
 * Σ_σ e_σσ g_σσ + e_↑↓ g_↑↓ with e_σσ = n_σ ε_c(r_sσ, 1) and e_↑↓ = n ε_c(r_s, ζ) − Σ_σ e_σσ.
 * Source: H. Stoll, C. M. E. Pavlidou, H. Preuss, Theor. Chim. Acta 49, 143 (1978); A. D. Becke, J. Chem. Phys. 107, 8554 (1997).
 */
function pairsPerVolume(instance: Instance, form: Extract<Form, { kind: 'pairs' }>, frame: Frame): NodeId {
  const { graph } = instance;
  const { place } = frame;
  const gas = instance.imported(form.partition);
  const zero = constant(graph, 0);
  const gasPerParticle = (rs: NodeId, zeta: NodeId) => {
    const energy = gas.part('correlation', slicePlace(graph, { rs, zeta }));
    if (energy === undefined) throw new RangeError(`${form.partition} has no correlation`);
    return energy.perParticle;
  };
  const gasSameSpin = (channel: Channel) =>
    mul(graph, place.channel('n', channel), gasPerParticle(place.channel('rs', channel), constant(graph, 1)));
  const sameSpin = spinSum(graph, place, (channel) =>
    mul(graph, gasSameSpin(channel), instance.interpretAt(form.sameSpin, { ...frame, channel })),
  );
  const total = mul(graph, place.total('n'), gasPerParticle(place.total('rs'), place.total('zeta')));
  const gasOpposite = sub(graph, total, add(graph, gasSameSpin('up'), gasSameSpin('dn')));
  const opposite = mul(graph, gasOpposite, instance.interpretAt(form.oppositeSpin, frame));
  const bothOccupied = choice(
    graph,
    'ifLess',
    zero,
    place.occupied('up'),
    choice(graph, 'ifLess', zero, place.occupied('dn'), opposite, zero),
    zero,
  );
  return add(graph, sameSpin, bothOccupied);
}

function fromPerParticle(graph: Graph, place: Place, perParticle: NodeId): PartEnergy {
  return { perParticle, enhancement: neg(graph, quotientByUnit(graph, perParticle, place.unit)) };
}
