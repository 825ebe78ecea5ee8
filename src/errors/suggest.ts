/**
 * The known word closest to a misspelt one, or undefined when none is close.
 * Distance is the number of insertions, deletions, substitutions and swaps of neighbours.
 */
export function closest(word: string, known: Iterable<string>): string | undefined {
  const limit = Math.max(1, Math.floor(word.length / 3));
  let best: string | undefined;
  let bestDistance = limit + 1;
  for (const candidate of known) {
    const distance = editDistance(word.toLowerCase(), candidate.toLowerCase(), bestDistance);
    if (distance < bestDistance) {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

/** "did you mean …?" for a misspelt word, or the given advice when no known word is close. */
export function suggestion(word: string, known: Iterable<string>, otherwise: string): string {
  const near = closest(word, known);
  return near === undefined ? otherwise : `Did you mean ${near}?`;
}

function editDistance(left: string, right: string, stopAt: number): number {
  if (Math.abs(left.length - right.length) >= stopAt) return stopAt;
  let beforePrevious: number[] = [];
  let previous = Array.from({ length: right.length + 1 }, (_, index) => index);
  for (let row = 1; row <= left.length; row++) {
    const current = [row];
    for (let column = 1; column <= right.length; column++) {
      const same = left[row - 1] === right[column - 1];
      let value = Math.min(
        (previous[column] as number) + 1,
        (current[column - 1] as number) + 1,
        (previous[column - 1] as number) + (same ? 0 : 1),
      );
      const swapped =
        row > 1 && column > 1 && left[row - 1] === right[column - 2] && left[row - 2] === right[column - 1];
      if (swapped) value = Math.min(value, (beforePrevious[column - 2] as number) + 1);
      current.push(value);
    }
    beforePrevious = previous;
    previous = current;
  }
  return previous[right.length] as number;
}
