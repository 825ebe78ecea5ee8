import { differentiate } from '../derivative/differentiate.ts';
import type { Expression } from '../expression/expression.ts';
import { interpret, type Scope } from '../expression/interpret.ts';
import type { Instance } from '../functional/frame.ts';
import type { Functional } from '../functional/functional.ts';
import { exactExchangeShares, instantiate, isPartName, type PrintedParameter } from '../functional/instance.ts';
import { densityPlace, type Place, slicePlace } from '../functional/place.ts';
import { quantityOf } from '../functional/quantities.ts';
import { variableSlice } from '../functional/variable-place.ts';
import { add, choice, constant, div, mul, neg, power, sub, unary, variable } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { substitute, variablesOf } from '../graph/traverse.ts';
import { type Rational, rational } from '../number/rational.ts';
import { type Call, nameOf, separationName } from './calls.ts';
import { type Condition, type EnergyName, energyNames } from './condition.ts';
import { spinInputs, spinPlaceOf, swappedCoordinates } from './coordinates.ts';
import { coefficientOf, type Leaves, leafOf } from './leaves.ts';
import { type LimitSequence, limitAtLowDensity } from './limit.ts';

/** The margin of a condition for a functional: negative where the condition is violated. */
export interface Margin {
  readonly graph: Graph;
  readonly node: NodeId;
  /** The two sides of the comparison, for the report. */
  readonly left: NodeId;
  readonly right: NodeId;
  /** The coordinates that the margin depends on. */
  readonly variables: readonly string[];
  /** Fixed coordinates and their values. */
  readonly fixed: ReadonlyMap<string, NodeId>;
  /** Of a swept condition: the values at each of its points. */
  readonly points: readonly ReadonlyMap<string, NodeId>[];
}

export interface MarginOptions {
  readonly constants: ReadonlyMap<string, Rational>;
  readonly limit: LimitSequence;
  /** Of a swept condition: collects its limits and orders, and leaves the fixed coordinates variables. */
  readonly leaves?: Leaves;
  /** New values for parameters of the functional. */
  readonly parameters?: ReadonlyMap<string, Rational>;
  /** Nodes for parameters that are to stay symbols. */
  readonly symbols?: ReadonlyMap<string, NodeId>;
  /** Keeps parameters with printed digits as variables, noted here. */
  readonly printed?: Map<string, PrintedParameter>;
  /** Another form of each energy, equal to it, to be used in its place; applied before any derivative is taken. */
  readonly rewrite?: (graph: Graph, energy: NodeId) => NodeId;
}

/**
 * The margin as a node: left − right for `left >= right`, right − left for `left <= right`,
 * −|left − right| for `left == right` (over |right| where the condition is relative).
 */
export function buildMargin(
  graph: Graph,
  condition: Condition,
  functional: Functional,
  options: MarginOptions,
): Margin {
  const { definition, requirement } = condition;
  const instance = instantiate(graph, functional, {
    parameters: new Map([
      ...[...(options.parameters ?? [])].map(([name, value]) => [name, constant(graph, value)] as const),
      ...(options.symbols ?? []),
      ...(options.leaves === undefined ? [] : separationParameter(graph, functional)),
    ]),
    ...(options.printed && { printed: options.printed }),
  });
  const scope = requirementScope(graph, condition, instance, options);
  const fixed = new Map([...condition.at].map(([name, value]) => [name, interpret(graph, value, scope)]));
  const points = condition.points.map(
    (point) => new Map([...point].map(([name, value]) => [name, interpret(graph, value, scope)])),
  );
  const sides = [requirement.left, requirement.right].map((side) => interpret(graph, side, scope));
  const [left, right] = (options.leaves === undefined ? substitute(graph, sides, fixed) : sides) as [NodeId, NodeId];
  const difference = requirement.relation === '<=' ? sub(graph, right, left) : sub(graph, left, right);
  const distance = definition.relative ? div(graph, difference, unary(graph, 'abs', right)) : difference;
  const node = requirement.relation === '==' ? neg(graph, unary(graph, 'abs', distance)) : distance;
  const printed = new Set(options.printed?.keys());
  const variables = [...variablesOf(graph, [node])].filter((name) => !printed.has(name));
  return { graph, node, left, right, variables, fixed, points };
}

/** The parameter of the sheet that is ω, kept as the variable along which its limits are taken. */
function separationParameter(graph: Graph, { exactExchange }: Functional): [string, NodeId][] {
  if (exactExchange?.kind !== 'range-separated' || exactExchange.omega.kind !== 'name') return [];
  return [[exactExchange.omega.name, variable(graph, separationName)]];
}

function requirementScope(graph: Graph, condition: Condition, instance: Instance, options: MarginOptions): Scope {
  const { definition } = condition;
  const place = definition.space === 'slice' ? variableSlice(graph) : spinPlaceOf(graph);
  const imports = new Map<string, Instance>();
  const imported = (alias: string): Instance => {
    const known = imports.get(alias) ?? instantiate(graph, condition.imports.get(alias) as Functional);
    imports.set(alias, known);
    return known;
  };
  const scope: Scope = {
    name(name) {
      const chosen = definition.constants.find((candidate) => candidate.name === name);
      if (chosen !== undefined) return constant(graph, options.constants.get(chosen.constant) as Rational);
      if (name === 'exactExchange' || name === 'longRangeExchange') return exactExchangeShares(instance).longRange;
      if (name === 'shortRangeExchange') return exactExchangeShares(instance).shortRange;
      if (isEnergyName(name)) {
        const own = energy(instance, name, place);
        return options.rewrite === undefined ? own : options.rewrite(graph, own);
      }
      const quantity = quantityOf(name);
      if (quantity?.scope === 'total') return place.total(quantity.quantity);
      if (quantity?.suffix === 'up' || quantity?.suffix === 'dn') {
        return place.channel(quantity.quantity, quantity.suffix);
      }
      return variable(graph, name);
    },
    member: (alias, name) => partOf(imported(alias), name, place),
    memberCall(alias, name, args) {
      const [rs, zeta, s, alpha] = args;
      const at = slicePlace(graph, {
        zeta: zeta ?? constant(graph, 0),
        ...(rs !== undefined && { rs }),
        ...(s !== undefined && { s }),
        ...(alpha !== undefined && { alpha }),
      });
      return partOf(imported(alias), name, at);
    },
    call(name, args) {
      const value = () => interpret(graph, args[0] as Expression, scope);
      const { leaves } = options;
      const call: Call = { kind: 'call', name, args, offset: 0 };
      switch (name) {
        case 'd':
          return differentiate(graph, value(), nameOf(args[1]) as string);
        case 'at': {
          const elsewhere = new Map([[nameOf(args[1]) as string, interpret(graph, args[2] as Expression, scope)]]);
          return substitute(graph, [value()], elsewhere)[0] as NodeId;
        }
        case 'limit':
          return leaves === undefined
            ? limitAtLowDensity(graph, value(), options.limit)
            : leafOf(graph, leaves, call, value());
        case 'order':
        case 'logOrder':
        case 'coefficient':
          if (leaves === undefined) throw new RangeError(`${name} has no place in a pointwise margin`);
          return name === 'coefficient'
            ? coefficientOf(graph, leaves, call, value())
            : leafOf(graph, leaves, call, value());
        case 'spinscaled':
          return spinScaledExchange(graph, instance);
        case 'swapped':
          return swapped(graph, value());
        default:
          throw new RangeError(`${name} is no function of a requirement`);
      }
    },
  };
  return scope;
}

function isEnergyName(name: string): name is EnergyName {
  return (energyNames as readonly string[]).includes(name);
}

function partOf(instance: Instance, name: string, place: Place): NodeId {
  if (!isPartName(name)) throw new RangeError(`${name} is no part of a functional`);
  const part = instance.part(name, place);
  if (part === undefined) throw new RangeError(`${instance.functional.definition.id} has no ${name}`);
  return part.perParticle;
}

/** F or ε of a part, or of the sum of the parts; the functional must have them. */
export function energy(instance: Instance, name: EnergyName, place: Place): NodeId {
  const { graph } = instance;
  const kind = name.startsWith('F') ? 'enhancement' : 'perParticle';
  const part = (partName: 'exchange' | 'correlation' | 'exchange-correlation') =>
    instance.part(partName, place)?.[kind];
  const exchange = part('exchange');
  const correlation = part('correlation');
  const both = exchange === undefined || correlation === undefined ? undefined : add(graph, exchange, correlation);
  const found =
    name === 'Fx' || name === 'eps_x'
      ? exchange
      : name === 'Fc' || name === 'eps_c'
        ? correlation
        : (part('exchange-correlation') ?? both);
  if (found === undefined) throw new RangeError(`${instance.functional.definition.id} has no ${name}`);
  return found;
}

/** Σ_σ ½ (2n_σ/n)^(4/3) F_x(2n_σ, 4σ_σσ, 2τ_σ): what exact spin scaling makes of F_x. */
function spinScaledExchange(graph: Graph, instance: Instance): NodeId {
  const inputs = spinInputs(graph);
  const n = add(graph, inputs.n_up, inputs.n_dn);
  const zero = constant(graph, 0);
  const channels = [
    { density: inputs.n_up, gradient: inputs.sigma_uu, kinetic: inputs.tau_up },
    { density: inputs.n_dn, gradient: inputs.sigma_dd, kinetic: inputs.tau_dn },
  ];
  return channels
    .map(({ density, gradient, kinetic }) => {
      const doubled = densityPlace(graph, {
        n_up: density,
        n_dn: density,
        sigma_uu: gradient,
        sigma_ud: gradient,
        sigma_dd: gradient,
        tau_up: kinetic,
        tau_dn: kinetic,
      });
      const share = div(graph, mul(graph, constant(graph, 2), density), n);
      const weight = mul(graph, constant(graph, rational(1, 2)), power(graph, share, rational(4, 3)));
      const term = mul(graph, weight, energy(instance, 'Fx', doubled));
      return choice(graph, 'ifLess', zero, density, term, zero);
    })
    .reduce((sum, term) => add(graph, sum, term));
}

function swapped(graph: Graph, node: NodeId): NodeId {
  const bindings = new Map(
    Object.entries(swappedCoordinates).map(([name, { from, sign }]) => {
      const other = variable(graph, from);
      return [name, sign === 1 ? other : neg(graph, other)] as const;
    }),
  );
  return substitute(graph, [node], bindings)[0] as NodeId;
}
