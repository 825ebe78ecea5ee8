import type { PartName } from '../definition/functional.ts';
import { childrenOf, type Expression } from '../expression/expression.ts';
import type { Reading, Site } from './reading.ts';

/** A definition of the sheet that others can name; parts have their own steps. */
export type DefinitionKey = `parameter ${string}` | `function ${string}` | `step ${PartName | ''} ${string}`;

/** The definition that a site makes, or undefined for a form, an import or a share of exact exchange. */
export function keyOfSite(site: Site): DefinitionKey | undefined {
  switch (site.kind) {
    case 'parameter':
      return `parameter ${site.name}`;
    case 'function':
      return `function ${site.name}`;
    case 'step':
      return `step ${site.part ?? ''} ${site.name}`;
    default:
      return undefined;
  }
}

/** The definitions that an expression at a site names, with how often: its edges in the graph of definitions. */
export function namedDefinitions(
  expression: Expression,
  site: Site,
  defined: ReadonlySet<DefinitionKey>,
): Map<DefinitionKey, number> {
  const found = new Map<DefinitionKey, number>();
  visit(expression);
  return found;

  function visit(part: Expression): void {
    for (const key of candidates(part, site)) {
      if (!defined.has(key)) continue;
      found.set(key, (found.get(key) ?? 0) + 1);
      break;
    }
    childrenOf(part).forEach(visit);
  }
}

function candidates(part: Expression, site: Site): DefinitionKey[] {
  if (part.kind === 'call') return [`function ${part.name}`];
  if (part.kind !== 'name') return [];
  if (site.kind === 'function' && site.arguments.includes(part.name)) return [];
  const parameter: DefinitionKey = `parameter ${part.name}`;
  if (site.kind !== 'step' && site.kind !== 'form') return [parameter];
  const own: DefinitionKey[] = site.part === undefined ? [] : [`step ${site.part} ${part.name}`];
  return [...own, `step  ${part.name}`, parameter];
}

/** A circle of definitions, as the list of keys along it; undefined when there is none. */
export function findCircle(edges: ReadonlyMap<DefinitionKey, Iterable<DefinitionKey>>): DefinitionKey[] | undefined {
  const finished = new Set<DefinitionKey>();
  const path: DefinitionKey[] = [];
  const visit = (key: DefinitionKey): DefinitionKey[] | undefined => {
    if (finished.has(key)) return undefined;
    const start = path.indexOf(key);
    if (start >= 0) return path.slice(start);
    path.push(key);
    for (const next of edges.get(key) ?? []) {
      const circle = visit(next);
      if (circle !== undefined) return circle;
    }
    path.pop();
    finished.add(key);
    return undefined;
  };
  for (const key of edges.keys()) {
    const circle = visit(key);
    if (circle !== undefined) return circle;
  }
  return undefined;
}

/** How many terms a call of each function expands to; Infinity beyond any use. Edges must be free of circles. */
export function expansionOf(readings: readonly Reading[], defined: ReadonlySet<DefinitionKey>): Map<string, number> {
  const bodies = new Map(
    readings.flatMap((reading) => (reading.site.kind === 'function' ? [[reading.site.name, reading] as const] : [])),
  );
  const sizes = new Map<string, number>();
  const sizeOf = (name: string): number => {
    const known = sizes.get(name);
    if (known !== undefined) return known;
    const reading = bodies.get(name);
    let size = 1;
    if (reading !== undefined) {
      for (const [key, times] of namedDefinitions(reading.expression, reading.site, defined)) {
        if (key.startsWith('function ')) size += times * sizeOf(key.slice('function '.length));
      }
    }
    sizes.set(name, size);
    return size;
  };
  for (const name of bodies.keys()) sizeOf(name);
  return sizes;
}
