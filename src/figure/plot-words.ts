import type { Curve, CurveSet } from '../finding/curves.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { answerSymbol } from '../report/symbols.ts';
import { drawnBounds } from './plot-range.ts';
import { numberRuns } from './scale.ts';
import { listed, noBreak, parameterSymbol, setTo } from './symbols.ts';
import type { Run } from './typeface.ts';
import { formula, words } from './typeset.ts';

/** What tells a curve from the others: its functional, and trial parameters and slice where they differ. */
export function curveLabel(curve: Curve, all: readonly Curve[]): Run[] {
  const { functional, parameters, fixed } = curve;
  const several = all.some((other) => other.functional.id !== functional.id);
  const own = all.filter((other) => other.functional.id === functional.id);
  const items = [
    ...Object.entries(parameters)
      .filter(([name, value]) => own.some((other) => other.parameters[name] !== value))
      .map(([name, value]) => noBreak([...parameterSymbol(name), ...words(` = ${value}`)])),
    ...Object.entries(fixed)
      .filter(([name, value]) => own.some((other) => other.fixed[name] !== value))
      .map(([name, value]) => setTo(name, value)),
  ];
  if (items.length === 0) return words(functional.name);
  return several ? [...words(`${functional.name}, `), ...listed(items)] : listed(items);
}

/** `F_x`, with its unit. */
export function quantityTitle(quantity: string): Run[] {
  const unit = quantity.startsWith('eps')
    ? 'hartree'
    : quantity.startsWith('d2')
      ? 'bohr^-2'
      : quantity.startsWith('d')
        ? 'bohr^-1'
        : '';
  return [
    ...formula(answerSymbol(quantity)),
    ...(unit === '' ? [] : [...words(' ('), ...formula(unit), ...words(')')]),
  ];
}

/** What the figure shows, for below it. */
export function plotCaption({ panels, along }: CurveSet): Run[] {
  const curves = panels[0]?.curves ?? [];
  const names = [...new Set(curves.map(({ functional }) => functional.name))];
  const shared = Object.entries(Object.assign({}, ...curves.map(({ fixed }) => fixed)) as Curve['fixed']).filter(
    ([name, value]) => curves.every(({ fixed }) => fixed[name] === undefined || fixed[name] === value),
  );
  const trial = Object.entries(curves[0]?.parameters ?? {}).filter(([name, value]) =>
    curves.every(({ parameters }) => parameters[name] === value),
  );
  const bounds = [
    ...new Map(panels.flatMap((panel) => drawnBounds(panel).map((bound) => [bound.condition, bound]))).values(),
  ];
  return [
    ...listed(panels.map(({ quantity }) => formula(answerSymbol(quantity)))),
    ...words(` of ${names.join(', ')} along `),
    ...formula(coordinateSymbol(along.name)),
    ...(shared.length === 0 ? [] : [...words(' at '), ...listed(shared.map(([name, value]) => setTo(name, value)))]),
    ...(trial.length === 0
      ? []
      : [
          ...words(', trial values '),
          ...listed(trial.map(([name, value]) => [...parameterSymbol(name), ...words(` = ${value}`)])),
        ]),
    ...words('.'),
    ...(bounds.length === 0
      ? []
      : [
          ...words(' Bounds: '),
          ...listed(
            bounds.map(({ title, relation, value, force }) => [
              ...words(`${title} `),
              ...noBreak([...words(relation === '<=' ? '≤ ' : '≥ '), ...numberRuns(value, 4)]),
              ...words(force === 'sufficient' ? ' (sufficient only)' : ''),
            ]),
            '; ',
          ),
          ...words('.'),
        ]),
  ];
}
