import type { Condition } from '../constraint/condition.ts';
import type { Finding, Findings } from '../finding/finding.ts';
import type { RegionExample, RegionTree } from '../finding/regions.ts';
import type { Functional } from '../functional/functional.ts';
import { inDrawnOrder } from '../page/first-plane.ts';
import { conditionAt, decideRegions, everywhereProved, shortened } from '../proof/regions.ts';
import { isProved } from '../report/proof-text.ts';
import { type RunSettings, settingsOf } from '../run/settings.ts';
import { progressLine } from './progress.ts';
import type { Terminal } from './terminal.ts';

/** Letters of a tree of boxes that the page keeps for each map. */
const mostLetters = 12_000;
/** Boxes at most for the plane of one map, where pixels are coarser than boxes. */
const mostPlaneBoxes = 50_000;

/** What the maps of the page show as proved: the search of each proof again, which the findings do not keep. */
export async function provedRegions(
  settings: RunSettings,
  findings: Findings,
  functionals: readonly Functional[],
  conditions: readonly Condition[],
  terminal: Terminal,
): Promise<(condition: string, functional: number) => RegionTree | undefined> {
  const trees = new Map<string, RegionTree>();
  const { proofBoxes } = settings;
  const progress = progressLine(terminal, Date.now, 'boxes');
  for (const [index, functional] of functionals.entries()) {
    for (const condition of conditions) {
      const { definition } = condition;
      const found = findings.functionals[index]?.findings.find(({ constraint }) => constraint === definition.id);
      const proof = found?.proof;
      if (found === undefined || proof === undefined || proofBoxes === undefined || condition.kind !== 'pointwise')
        continue;
      const key = `${index} ${definition.id}`;
      if (isProved(proof)) {
        trees.set(key, everywhereProved(proof));
        continue;
      }
      const asked = { ...condition, definition: { ...definition, tolerance: found.tolerance } };
      const tree = await decideRegions(asked, functional, settingsOf(settings), {
        budget: proofBoxes,
        onBoxes: (boxes) => progress.report(definition.id, boxes),
      });
      if (typeof tree === 'string') continue;
      const examples = await worstPlane(asked, functional, settingsOf(settings), found, tree, proofBoxes);
      trees.set(key, { ...shortened(tree, mostLetters), ...(examples.length === 0 ? {} : { examples }) });
    }
  }
  progress.end();
  return (condition, functional) => trees.get(`${functional} ${condition}`);
}

/** Of a violation: the plane that the page shows first, through the worst point. */
async function worstPlane(
  condition: Condition,
  functional: Functional,
  settings: ReturnType<typeof settingsOf>,
  { verdict, witness }: Finding,
  { axes }: RegionTree,
  proofBoxes: number,
): Promise<RegionExample[]> {
  const [, , ...rest] = inDrawnOrder(axes.map(({ name }) => name));
  const place: Readonly<Record<string, number | undefined>> = witness ?? {};
  const held = rest.flatMap((name): [string, number][] => {
    const value = place[name];
    return value === undefined ? [] : [[name, value]];
  });
  if (verdict !== 'violated' || rest.length === 0 || held.length < rest.length) return [];
  const budget = Math.min(proofBoxes, mostPlaneBoxes);
  const tree = await decideRegions(conditionAt(condition, new Map(held)), functional, settings, { budget });
  return typeof tree === 'string' ? [] : [{ held: Object.fromEntries(held), tree: shortened(tree, mostLetters) }];
}
