import type { PartName } from '../definition/functional.ts';
import type { Expression } from '../expression/expression.ts';
import { interpret, type Scope } from '../expression/interpret.ts';
import { constant, variable } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { Frame, Instance, PartEnergy } from './frame.ts';
import type { ExactExchange, Functional } from './functional.ts';
import { partEnergy, spinSum } from './part.ts';
import { type Place, slicePlace } from './place.ts';
import { type Channel, quantityOf } from './quantities.ts';

/** A parameter kept as a variable because its printed digits leave it uncertain. */
export interface PrintedParameter {
  readonly variable: string;
  readonly sheet: string;
  readonly name: string;
  readonly value: NodeId;
  readonly digits: number;
}

export interface InstanceOptions {
  /** New values for parameters of the sheet itself. */
  readonly parameters?: ReadonlyMap<string, NodeId>;
  /** Keep every parameter that states its printed digits as a variable, and note it here. */
  readonly printed?: Map<string, PrintedParameter>;
}

/** Joins a functional to a graph. Same graph, same options: same nodes. */
export function instantiate(graph: Graph, functional: Functional, options: InstanceOptions = {}): Instance {
  const parameters = new Map<string, NodeId>();
  const imports = new Map<string, Instance>();
  const parts = new WeakMap<Place, Map<PartName, PartEnergy>>();
  const steps = new WeakMap<Place, Map<string, NodeId>>();

  const parameterScope: Scope = {
    name: (name) => parameter(name),
    member: (alias, name) => imported(alias).parameter(name),
    call: (name, args) =>
      callFunction(
        name,
        args.map((argument) => interpret(graph, argument, parameterScope)),
      ),
    memberCall: (alias, name, args) => imported(alias).callFunction(name, args),
  };

  function parameter(name: string): NodeId {
    const settled = parameters.get(name);
    if (settled !== undefined) return settled;
    const node = options.parameters?.get(name) ?? ownParameter(name);
    parameters.set(name, node);
    return node;
  }

  function ownParameter(name: string): NodeId {
    const found = functional.parameters.get(name);
    if (found === undefined) throw new RangeError(`${functional.definition.id} has no parameter ${name}`);
    const value = interpret(graph, found.value, parameterScope);
    const { digits } = found.definition;
    if (digits === undefined || options.printed === undefined) return value;
    const sheet = functional.definition.id;
    const symbol = `${sheet}.${name}`;
    options.printed.set(symbol, { variable: symbol, sheet, name, value, digits });
    return variable(graph, symbol);
  }

  function imported(alias: string): Instance {
    const known = imports.get(alias);
    if (known !== undefined) return known;
    const found = functional.imports.get(alias);
    if (found === undefined) throw new RangeError(`${functional.definition.id} imports no ${alias}`);
    const changed = [...found.parameters].map(
      ([name, value]) => [name, interpret(graph, value, parameterScope)] as const,
    );
    const made = instantiate(graph, found.functional, {
      parameters: new Map(changed),
      ...(options.printed && { printed: options.printed }),
    });
    imports.set(alias, made);
    return made;
  }

  function callFunction(name: string, args: readonly NodeId[]): NodeId {
    const found = functional.functions.get(name);
    if (found === undefined) throw new RangeError(`${functional.definition.id} has no function ${name}`);
    const bound = new Map(found.arguments.map((argument, index) => [argument, args[index] as NodeId]));
    const scope: Scope = { ...parameterScope, name: (inner) => bound.get(inner) ?? parameter(inner), call: callInner };
    function callInner(inner: string, innerArguments: readonly Expression[]): NodeId {
      return callFunction(
        inner,
        innerArguments.map((argument) => interpret(graph, argument, scope)),
      );
    }
    return interpret(graph, found.body, scope);
  }

  function part(name: PartName, place: Place): PartEnergy | undefined {
    const found = functional.parts.get(name);
    if (found === undefined) return undefined;
    const here = parts.get(place) ?? new Map<PartName, PartEnergy>();
    parts.set(place, here);
    const known = here.get(name) ?? partEnergy(instance, found, place);
    here.set(name, known);
    return known;
  }

  function step(name: string, frame: Frame): NodeId | undefined {
    const own = frame.part?.steps.get(name);
    const expression = own ?? functional.steps.get(name);
    if (expression === undefined) return undefined;
    const here = steps.get(frame.place) ?? new Map<string, NodeId>();
    steps.set(frame.place, here);
    const key = `${frame.part?.name ?? ''}/${frame.channel ?? ''}/${name}`;
    const node = here.get(key) ?? interpretAt(expression, frame);
    here.set(key, node);
    return node;
  }

  function interpretAt(expression: Expression, frame: Frame): NodeId {
    const scope: Scope = {
      name: (name) => step(name, frame) ?? quantity(name, frame) ?? parameter(name),
      member: (alias, name) => partNode(alias, name, frame.place) ?? imported(alias).parameter(name),
      call: (name, args) =>
        name === 'spinsum'
          ? spinSum(graph, frame.place, (channel) => interpretAt(args[0] as Expression, { ...frame, channel }))
          : callFunction(
              name,
              args.map((argument) => interpretAt(argument, frame)),
            ),
      memberCall: (alias, name, args) => partCall(alias, name, args) ?? imported(alias).callFunction(name, args),
    };
    return interpret(graph, expression, scope);
  }

  function partNode(alias: string, name: string, place: Place): NodeId | undefined {
    return isPartName(name) ? imported(alias).part(name, place)?.perParticle : undefined;
  }

  /** `alias.part(rs, zeta, s, alpha, q)` and `alias.enhancement(s, alpha, q)`, on the uniform-polarisation slice. */
  function partCall(alias: string, name: string, args: readonly NodeId[]): NodeId | undefined {
    const target = imported(alias);
    if (name === 'enhancement') {
      const [s, alpha, q] = args;
      const place = slicePlace(graph, { zeta: constant(graph, 0), ...present({ s, alpha, q }) });
      return target.part('exchange', place)?.enhancement;
    }
    if (!isPartName(name)) return undefined;
    const [rs, zeta, s, alpha, q] = args;
    const place = slicePlace(graph, { zeta: zeta as NodeId, ...present({ rs, s, alpha, q }) });
    return target.part(name, place)?.perParticle;
  }

  const instance: Instance = { functional, graph, parameter, callFunction, part, imported, interpretAt };
  return instance;
}

/** The share of exact exchange at short and at long range, as nodes; both zero for a semilocal functional. */
export function exactExchangeShares(instance: Instance): { shortRange: NodeId; longRange: NodeId; omega?: NodeId } {
  const exact: ExactExchange | undefined = instance.functional.exactExchange;
  const node = (expression: Expression) =>
    interpret(instance.graph, expression, {
      name: instance.parameter,
      member: (alias, name) => instance.imported(alias).parameter(name),
      call: (name) => {
        throw new RangeError(`${name} cannot be called in a share of exact exchange`);
      },
      memberCall: (alias, name, args) => instance.imported(alias).callFunction(name, args),
    });
  if (exact === undefined) {
    const none = constant(instance.graph, 0);
    return { shortRange: none, longRange: none };
  }
  if (exact.kind === 'global') {
    const fraction = node(exact.fraction);
    return { shortRange: fraction, longRange: fraction };
  }
  return { shortRange: node(exact.shortRange), longRange: node(exact.longRange), omega: node(exact.omega) };
}

export function isPartName(name: string): name is PartName {
  return name === 'exchange' || name === 'correlation' || name === 'exchange-correlation';
}

function quantity(name: string, frame: Frame): NodeId | undefined {
  const found = quantityOf(name);
  if (found === undefined) return undefined;
  if (found.scope === 'total') return frame.place.total(found.quantity);
  const channel = channelOf(found.suffix, frame.channel);
  return frame.place.channel(found.quantity, channel);
}

function channelOf(suffix: 'up' | 'dn' | 'sigma' | 'other', current: Channel | undefined): Channel {
  if (suffix === 'up' || suffix === 'dn') return suffix;
  if (current === undefined) throw new RangeError('a channel name outside a sum over spin');
  if (suffix === 'sigma') return current;
  return current === 'up' ? 'dn' : 'up';
}

function present(nodes: Record<string, NodeId | undefined>): Record<string, NodeId> {
  return Object.fromEntries(Object.entries(nodes).filter(([, node]) => node !== undefined)) as Record<string, NodeId>;
}
