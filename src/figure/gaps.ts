/** Single cells without a value (a limit that depends on the direction) are not worth a mark in a picture. */
const tooFew = 5;

/** Whether a panel has places without a value that a picture should show. */
export function hasGaps(margins: readonly (number | null)[]): boolean {
  return margins.filter((margin) => margin === null).length >= tooFew;
}

/** The margins with those of the next cell in the row where there is none, so that contours have something to run on. */
export function bridged(margins: readonly (number | null)[], width: number): number[] {
  const finite = (cell: number | undefined, row: number) =>
    cell !== undefined && Math.floor(cell / width) === row ? margins[cell] : undefined;
  return margins.map((margin, cell) => {
    if (margin !== null) return margin;
    const row = Math.floor(cell / width);
    for (let step = 1; step < width; step++) {
      const found = finite(cell - step, row) ?? finite(cell + step, row);
      if (found !== undefined && found !== null) return found;
    }
    return 0;
  });
}
