import { notApplicable } from '../constraint/applicable.ts';
import type { Condition } from '../constraint/condition.ts';
import { axesOf, type Domain } from '../constraint/domain.ts';
import { limitInFloat64 } from '../constraint/limit.ts';
import { buildMargin, type Margin } from '../constraint/margin.ts';
import { energiesAt } from '../evaluate/energies.ts';
import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import type { RegionTree } from '../finding/regions.ts';
import type { Functional } from '../functional/functional.ts';
import { instantiate } from '../functional/instance.ts';
import { variableSlice } from '../functional/variable-place.ts';
import { constant } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { variablesOf } from '../graph/traverse.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { generate } from '../kernel/generate.ts';
import { type AxisGroup, planKernel } from '../kernel/plan.ts';
import { marginUnit } from '../map/unit.ts';
import type { Rational } from '../number/rational.ts';
import { knownCoordinates } from '../report/words.ts';
import type {
  AxisRecord,
  BoundRecord,
  KernelRecord,
  MapPanelRecord,
  MapRecord,
  PageData,
  PageFunctional,
} from './page-data.ts';

export interface PageRequest {
  readonly functionals: readonly Functional[];
  /** How each of them is named on a command line: its id or its file. */
  readonly arguments: readonly string[];
  readonly conditions: readonly Condition[];
  readonly domain: Domain;
  readonly constants: ReadonlyMap<string, Rational>;
  readonly parameters: ReadonlyMap<string, Rational>;
  /** Of a condition's id and the index of a functional. */
  readonly regions?: (condition: string, functional: number) => RegionTree | undefined;
}

/** The page's data, and the bodies of the functions (values, out, tables, erf, lambertW) that its kernels refer to. */
export interface PageKernels {
  readonly data: PageData;
  readonly bodies: readonly string[];
}

/** Lengths to expect: two drawn coordinates and some at their worst. */
const expectedLengths = [24, 100, 100, 24, 8, 8, 8];

/** Generates the kernels of a page: one for each margin over the slice or the spin space, one for each functional's energies. */
export function pageKernels(request: PageRequest, findings: readonly FunctionalFindings[]): PageKernels {
  const { functionals, conditions, domain } = request;
  const bodies: string[] = [];
  const kernels: KernelRecord[] = [];
  const indices = new Map<string, number>();
  const add = (
    graph: Graph,
    outputs: readonly NodeId[],
    names: readonly string[],
    variables: readonly string[],
    together: boolean,
  ) => {
    // A kernel needs one variable at least; a constant output reads none.
    const inputs = variables.length === 0 ? ['unused'] : variables;
    const axes: AxisGroup[] = together ? [{ variables: inputs }] : inputs.map((name) => ({ variables: [name] }));
    const { source, tables } = generate(planKernel(graph, outputs, axes, expectedLengths.slice(0, axes.length)));
    const body = source.replace(/^ +/gm, '');
    const key = `${inputs.join(' ')}\n${together}\n${body}`;
    const known = indices.get(key);
    if (known !== undefined) return known;
    indices.set(key, kernels.length);
    bodies.push(body);
    kernels.push({
      variables: inputs,
      together,
      outputs: names,
      tables: tables.map(({ axes: tableAxes, width }) => ({ axes: tableAxes, width })),
    });
    return kernels.length - 1;
  };

  const pageFunctionals = functionals.map((functional, index): PageFunctional => {
    const { graph, nodes, names } = energyNodes(functional, request.parameters);
    const coordinates = knownCoordinates(findings[index] as FunctionalFindings);
    const variables = [...new Set([...coordinates, ...variablesOf(graph, nodes)])];
    return {
      id: functional.definition.id,
      name: functional.definition.name,
      argument: request.arguments[index] ?? functional.definition.id,
      coordinates: variables,
      energies: add(graph, nodes, names, variables, true),
    };
  });

  const maps: MapRecord[] = [];
  const bounds: BoundRecord[] = [];
  for (const condition of conditions) {
    if (condition.kind !== 'pointwise') continue;
    const { definition } = condition;
    const axes = axesOf(domain, definition.space).map(axisRecord);
    const order = axes.map(({ name }) => name);
    const panels = functionals.flatMap((functional, index): MapPanelRecord[] => {
      if (notApplicable(condition, functional) !== undefined) return [];
      const finding = findings[index]?.findings.find(({ constraint }) => constraint === definition.id);
      const margin = buildMargin(new Graph(), condition, functional, { ...request, limit: limitInFloat64 });
      const variables = order.filter((name) => margin.variables.includes(name));
      if (index === 0 || bounds.every(({ condition: id }) => id !== definition.id))
        bounds.push(...boundOf(condition, margin, functional));
      if (variables.length === 0) return [];
      const kernel = add(margin.graph, [margin.node], ['margin'], variables, false);
      const regions = request.regions?.(definition.id, index);
      return [
        {
          functional: index,
          kernel,
          variables,
          fixed: fixedValues(margin),
          ...worstOf(finding),
          ...(regions === undefined ? {} : { regions }),
        },
      ];
    });
    if (panels.length === 0) continue;
    maps.push({
      condition: definition.id,
      title: definition.title,
      space: definition.space,
      tolerance: toleranceOf(definition.id, findings) ?? definition.tolerance,
      unit: marginUnit(condition) ?? '',
      axes: axes.filter(({ name }) => panels.some(({ variables }) => variables.includes(name))),
      panels,
    });
  }
  const axes = axesOf(domain, 'slice').map(axisRecord);
  return { data: { kernels, functionals: pageFunctionals, axes, maps, bounds }, bodies };
}

/** A static script that keeps the functions under one name. Their bodies hold only what the generator prints. */
export function kernelScript(bodies: readonly string[]): string {
  const functions = bodies.map((body) => `function(values,out,tables,erf,lambertW){${body}\n}`);
  return `self.rungcheckKernels=[\n${functions.join(',\n')}\n];\n`;
}

function energyNodes(functional: Functional, parameters: ReadonlyMap<string, Rational>) {
  const graph = new Graph();
  const instance = instantiate(graph, functional, {
    parameters: new Map([...parameters].map(([name, value]) => [name, constant(graph, value)])),
  });
  const place = variableSlice(graph);
  const perParticle = energiesAt(instance, place, 'perParticle');
  const enhancement = energiesAt(instance, place, 'enhancement');
  const all: readonly (readonly [string, NodeId | undefined])[] = [
    ['eps_x', perParticle.x],
    ['eps_c', perParticle.c],
    ['eps_xc', perParticle.xc],
    ['Fx', enhancement.x],
    ['Fc', enhancement.c],
    ['Fxc', enhancement.xc],
  ];
  const given = all.filter((entry): entry is [string, NodeId] => entry[1] !== undefined);
  return { graph, nodes: given.map(([, node]) => node), names: given.map(([name]) => name) };
}

function axisRecord({ name, lower, upper, scale }: ReturnType<typeof axesOf>[number]): AxisRecord {
  return { name, lower, upper: Number.isFinite(upper) ? upper : null, scale };
}

function worstOf(finding: Finding | undefined): Pick<MapPanelRecord, 'witness' | 'margin'> {
  const witness = finding?.witness ?? null;
  const entries = Object.entries(witness ?? {}).filter((entry): entry is [string, number] => entry[1] !== undefined);
  return { witness: witness === null ? null : Object.fromEntries(entries), margin: finding?.margin ?? null };
}

/** The one that the verdict was found with, which a project may have chosen. */
function toleranceOf(id: string, findings: readonly FunctionalFindings[]): number | undefined {
  return findings.flatMap((one) => one.findings).find(({ constraint }) => constraint === id)?.tolerance;
}

function fixedValues({ graph, fixed }: Margin): Record<string, number> {
  const values = evaluateDecimal(graph, [...fixed.values()], new Map(), 30);
  return Object.fromEntries([...fixed.keys()].map((name, index) => [name, values[index]?.toNumber() as number]));
}

/** A requirement of the form F ≤ number, with no exact exchange in the number. */
function boundOf({ requirement, definition }: Condition, margin: Margin, functional: Functional): BoundRecord[] {
  const { left, relation } = requirement;
  if (left.kind !== 'name' || !/^F(x|c|xc)$/.test(left.name) || relation === '==' || definition.space !== 'slice')
    return [];
  if (variablesOf(margin.graph, [margin.right]).size > 0 || functional.exactExchange !== undefined) return [];
  const [value] = evaluateDecimal(margin.graph, [margin.right], new Map(), 30);
  return [
    {
      quantity: left.name,
      condition: definition.id,
      title: definition.title,
      relation,
      value: value?.toNumber() as number,
      fixed: fixedValues(margin),
      force: definition.force,
    },
  ];
}
