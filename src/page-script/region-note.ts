import type { RegionTree } from '../finding/regions.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { countText } from '../report/number-text.ts';
import { make, notationNodes } from './dom.ts';
import { numberNotation } from './number.ts';

/** The switch between the colours of the margin and the regions of the proof. */
export function regionSwitch(name: string, isOn: boolean, onChange: (isOn: boolean) => void): HTMLElement {
  const box = make('input', { type: 'checkbox', id: `${name}-proof` });
  box.checked = isOn;
  box.addEventListener('change', () => onChange(box.checked));
  return make('div', { class: 'control tick proof' }, box, make('label', { for: `${name}-proof` }, 'what is proved'));
}

/** What the regions mean on the plane, or along the one coordinate, that is shown. */
export function regionWords(
  tree: RegionTree,
  held: ReadonlyMap<string, number | 'worst'> | undefined,
  tolerance: number,
): HTMLElement {
  const others = [...(held ?? [])].filter(([name]) => tree.axes.some((axis) => axis.name === name));
  const over = others.filter(([, value]) => value === 'worst').map(([name]) => coordinateSymbol(name));
  const at = others.flatMap(([name, value]) =>
    value === 'worst' ? [] : [`${coordinateSymbol(name)} = ${numberNotation(value)}`],
  );
  const where = at.length === 0 ? '' : ` at ${at.join(', ')}`;
  const parts = [
    `Interval arithmetic rounded outward, ${held === undefined ? 'along this line' : `on this plane${where}`} alone, wherever the formula has a value; tolerance ${numberNotation(tolerance)}.`,
    over.length === 0 ? '' : `Over ${over.join(', ')}: holds for every value, violated at some value.`,
    `From ${countText(tree.boxes)} ${tree.boxes === 1 ? 'box' : 'boxes'} on the whole domain${tree.isCut ? '; the smallest are left out of this page and shown as undecided' : ''}.`,
    exampleWords(tree),
    held === undefined ? '' : 'Lines: the margin in double precision, dashed below zero; no proof.',
  ];
  return make('p', { class: 'note proof' }, ...notationNodes(parts.filter((part) => part !== '').join(' ')));
}

function exampleWords({ examples = [] }: RegionTree): string {
  return examples
    .map(({ held, tree: { boxes } }) => {
      const at = Object.entries(held).map(([name, value]) => `${coordinateSymbol(name)} = ${numberNotation(value)}`);
      return `Violated parts also from ${countText(boxes)} boxes at ${at.join(', ')}, as at the worst point.`;
    })
    .join(' ');
}
