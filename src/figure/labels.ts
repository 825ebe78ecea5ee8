/**
 * Heights for labels that want to stand at given ones: at least `distance` apart, within the limits, in the order of
 * what they want, and as close to it as that allows.
 */
export function placeLabels(wanted: readonly number[], distance: number, lowest: number, highest: number): number[] {
  const order = [...wanted.keys()].sort((a, b) => (wanted[a] as number) - (wanted[b] as number));
  const step = Math.min(distance, order.length > 1 ? (highest - lowest) / (order.length - 1) : distance);
  // Groups of touching labels, each centred on the mean of what its labels want.
  let groups = order.map((index) => ({ members: [index], centre: clamp(wanted[index] as number, lowest, highest) }));
  for (let merged = true; merged; ) {
    merged = false;
    const next: typeof groups = [];
    for (const group of groups) {
      const last = next.at(-1);
      if (last !== undefined && top(last, step) + step > bottom(group, step) + 1e-9) {
        const members = [...last.members, ...group.members];
        const mean = members.reduce((sum, index) => sum + (wanted[index] as number), 0) / members.length;
        const half = ((members.length - 1) * step) / 2;
        next[next.length - 1] = { members, centre: clamp(mean, lowest + half, highest - half) };
        merged = true;
      } else next.push(group);
    }
    groups = next;
  }
  const placed = new Array<number>(wanted.length).fill(0);
  for (const group of groups) {
    group.members.forEach((index, k) => {
      placed[index] = bottom(group, step) + k * step;
    });
  }
  return placed;
}

interface Group {
  readonly members: readonly number[];
  readonly centre: number;
}

function bottom({ members, centre }: Group, step: number): number {
  return centre - ((members.length - 1) * step) / 2;
}

function top({ members, centre }: Group, step: number): number {
  return centre + ((members.length - 1) * step) / 2;
}

function clamp(value: number, lowest: number, highest: number): number {
  return Math.max(lowest, Math.min(Math.max(lowest, highest), value));
}
