import type { Unit } from './vetter.ts';

/**
 * Hands out units so that a worker stays with the sheet it has read: the next unit of its last sheet, else of a sheet
 * that nobody has begun, else of the one with the most left. Undefined when none is left.
 */
export function makeQueue(units: readonly Unit[]): (last: Unit | undefined) => Unit | undefined {
  const waiting = new Map<string, Unit[]>();
  for (const unit of [...units].reverse()) waiting.set(unit.sheet, [...(waiting.get(unit.sheet) ?? []), unit]);
  const order = [...new Set(units.map(({ sheet }) => sheet))];
  const begun = new Set<string>();
  return (last) => {
    const left = order.filter((sheet) => (waiting.get(sheet)?.length ?? 0) > 0);
    const own = left.find((sheet) => sheet === last?.sheet);
    const most = (best: string | undefined, sheet: string) =>
      best === undefined || lengthOf(sheet) > lengthOf(best) ? sheet : best;
    const sheet = own ?? left.find((name) => !begun.has(name)) ?? left.reduce<string | undefined>(most, undefined);
    if (sheet === undefined) return undefined;
    begun.add(sheet);
    return waiting.get(sheet)?.pop();
  };

  function lengthOf(sheet: string): number {
    return waiting.get(sheet)?.length ?? 0;
  }
}
