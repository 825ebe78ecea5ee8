import type { FunctionalDefinition } from '../definition/functional.ts';
import type { Problem } from '../errors/problem.ts';
import { builtins } from '../expression/builtins.ts';
import { childrenOf, type Expression } from '../expression/expression.ts';
import { placedProblem } from '../expression/parse.ts';
import { checkReading } from './check-reading.ts';
import { type DefinitionKey, expansionOf, findCircle, keyOfSite, namedDefinitions } from './dependencies.ts';
import type { Functional } from './functional.ts';
import { isAbove, quantityOf } from './quantities.ts';
import type { Reading, Site } from './reading.ts';

/** A formula that expands to more calls than this is refused before it is built. */
const largestExpansion = 100_000;

/**
 * Every fault in the names of a sheet: unknown or misspelt names, wrong numbers of arguments, circles,
 * variables above the declared rung, channel names outside a sum over spin, parameters and steps that
 * nothing uses. `complete` says that every expression of the sheet could be read; only then is a
 * definition called unused.
 */
export function checkNames(functional: Functional, readings: readonly Reading[], complete: boolean): Problem[] {
  const { definition } = functional;
  const problems: Problem[] = reservedNames(definition);
  const defined = new Set<DefinitionKey>(definedKeys(definition));
  const edges = new Map<DefinitionKey, Map<DefinitionKey, number>>();
  const used = new Set<DefinitionKey>();
  for (const { expression, site } of readings) {
    const named = namedDefinitions(expression, site, defined);
    const key = keyOfSite(site);
    if (key !== undefined) edges.set(key, named);
    for (const name of named.keys()) if (name !== key) used.add(name);
  }
  const circle = findCircle(new Map([...edges].map(([key, named]) => [key, named.keys()])));
  if (circle !== undefined) problems.push(circleProblem(circle, readings));

  const perChannel = circle === undefined ? channelSteps(readings, defined) : new Set<DefinitionKey>();
  for (const reading of readings) problems.push(...checkReading(functional, reading, defined, perChannel));
  if (circle === undefined) problems.push(...expansionProblems(readings, defined));
  problems.push(...fromProblems(functional));
  if (complete) problems.push(...unusedProblems(definition, used));
  return problems;
}

function definedKeys(definition: FunctionalDefinition): DefinitionKey[] {
  return [
    ...definition.parameters.map(({ name }): DefinitionKey => `parameter ${name}`),
    ...definition.functions.map(({ name }): DefinitionKey => `function ${name}`),
    ...definition.where.map(({ name }): DefinitionKey => `step  ${name}`),
    ...definition.parts.flatMap((part) => part.where.map(({ name }): DefinitionKey => `step ${part.name} ${name}`)),
  ];
}

function reservedNames(definition: FunctionalDefinition): Problem[] {
  const named = [
    ...definition.parameters,
    ...definition.functions,
    ...definition.where,
    ...definition.parts.flatMap((part) => part.where),
    ...definition.uses.map((used) => ({ name: used.alias, place: used.place })),
  ];
  return named.flatMap(({ name, place }): Problem[] => {
    const meaning = reservedMeaning(name);
    if (meaning === undefined) return [];
    return [
      { code: 'reserved-name', message: `${name} already means ${meaning}`, remedy: 'Choose another name.', ...place },
    ];
  });
}

function reservedMeaning(name: string): string | undefined {
  if (quantityOf(name) !== undefined) return 'a quantity of the density';
  if (builtins.has(name) || name === 'spinsum') return 'a function';
  if (name === 'pi') return 'the constant π';
  return undefined;
}

function circleProblem(circle: readonly DefinitionKey[], readings: readonly Reading[]): Problem {
  const names = circle.map((key) => key.split(' ').at(-1));
  const reading = readings.find(({ site }) => keyOfSite(site) === circle[0]) as Reading;
  return placedProblem(reading.source, {
    code: 'cyclic-definition',
    message: `${names[0]} is defined by itself: ${[...names, names[0]].join(' → ')}`,
    remedy: 'Break the circle; a definition can only use earlier results.',
    offset: 0,
  });
}

/** The steps that speak of one channel (`x_sigma`) outside `spinsum`, themselves or through other steps. */
function channelSteps(readings: readonly Reading[], defined: ReadonlySet<DefinitionKey>): Set<DefinitionKey> {
  const perChannel = new Set<DefinitionKey>();
  const steps = readings.filter(({ site }) => site.kind === 'step');
  let size = -1;
  while (size !== perChannel.size) {
    size = perChannel.size;
    for (const { expression, site } of steps) {
      if (speaksOfChannel(expression, site)) perChannel.add(keyOfSite(site) as DefinitionKey);
    }
  }
  return perChannel;

  function speaksOfChannel(expression: Expression, site: Site): boolean {
    if (expression.kind === 'call' && expression.name === 'spinsum') return false;
    if (expression.kind === 'name') {
      const quantity = quantityOf(expression.name);
      if (quantity?.scope === 'channel') return quantity.suffix === 'sigma' || quantity.suffix === 'other';
      return [...namedDefinitions(expression, site, defined).keys()].some((key) => perChannel.has(key));
    }
    return childrenOf(expression).some((child) => speaksOfChannel(child, site));
  }
}

function expansionProblems(readings: readonly Reading[], defined: ReadonlySet<DefinitionKey>): Problem[] {
  const sizes = expansionOf(readings, defined);
  return readings.flatMap((reading) => {
    if (reading.site.kind !== 'function' || (sizes.get(reading.site.name) ?? 0) <= largestExpansion) return [];
    return [
      placedProblem(reading.source, {
        code: 'expression-size',
        message: `${reading.site.name} expands to more than ${largestExpansion} calls`,
        remedy: 'Name intermediate results as steps instead of calling functions within functions.',
        offset: 0,
      }),
    ];
  });
}

function fromProblems(functional: Functional): Problem[] {
  return functional.definition.parts.flatMap((part): Problem[] => {
    const alias =
      part.form.kind === 'from' ? part.form.alias : part.form.kind === 'pairs' ? part.form.partition : undefined;
    const imported = alias === undefined ? undefined : functional.imports.get(alias)?.functional;
    if (imported === undefined || !('place' in part.form)) return [];
    const { place } = part.form;
    const { id, rung } = imported.definition;
    const wanted = part.form.kind === 'pairs' ? 'correlation' : part.name;
    if (!imported.parts.has(wanted)) {
      return [
        {
          code: 'unknown-name',
          message: `${id} has no ${wanted}`,
          remedy: `It has ${[...imported.parts.keys()].join(' and ')}.`,
          ...place,
        },
      ];
    }
    if (part.form.kind === 'pairs' && rung !== 'lda') {
      return [
        {
          code: 'wrong-value',
          message: `the partition needs an lda sheet; ${id} is of the rung ${rung}`,
          remedy: 'Name a sheet of the uniform gas.',
          ...place,
        },
      ];
    }
    if (isAbove(rung, functional.definition.rung)) {
      return [
        {
          code: 'above-rung',
          message: `${id} is of the rung ${rung}, above the declared ${functional.definition.rung}`,
          remedy: `Declare rung: ${rung}.`,
          ...place,
        },
      ];
    }
    return [];
  });
}

function unusedProblems(definition: FunctionalDefinition, used: ReadonlySet<DefinitionKey>): Problem[] {
  const parameters = definition.parameters
    .filter(({ name }) => !used.has(`parameter ${name}`))
    .map(
      ({ name, place }): Problem => ({
        code: 'unused-parameter',
        message: `the parameter ${name} is never used`,
        remedy: 'Use it, or remove it: a parameter without effect misleads a reader.',
        ...place,
      }),
    );
  const steps = [
    ...definition.where.map((step) => ({ step, key: `step  ${step.name}` as DefinitionKey })),
    ...definition.parts.flatMap((part) =>
      part.where.map((step) => ({ step, key: `step ${part.name} ${step.name}` as DefinitionKey })),
    ),
  ]
    .filter(({ key }) => !used.has(key))
    .map(
      ({ step }): Problem => ({
        code: 'unused-definition',
        message: `the step ${step.name} is never used`,
        remedy: 'Use it, or remove it.',
        ...step.place,
      }),
    );
  return [...parameters, ...steps];
}
