/** Coordinates in the order in which a map of the page takes them: the first across, the second up. */
const preference = ['s', 's_up', 'rs', 'alpha', 'zeta', 's_dn', 'q', 'alpha_up', 'alpha_dn', 'cosine'];

/** The coordinates that there are, in that order. */
export function inDrawnOrder(names: readonly string[]): string[] {
  return preference.filter((name) => names.includes(name));
}
