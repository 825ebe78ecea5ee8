import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { shelf } from '../constraint/catalogue.ts';
import { tableFile, tableHead, verdictLines } from './shelf.ts';

const [head, ...committed] = readFileSync(tableFile, 'utf8').trimEnd().split('\n');

/**
 * Holds one part of the shelf against the committed table (`npm run verdicts` writes it anew). Verdict and gate must be
 * the same; a margin may move by a thousandth and a share by a twentieth, which is what another machine's rounding and
 * the resolution of a region's share can do.
 */
export function compareShelf(part: number, parts: number): void {
  describe(`verdicts of the shelf, part ${part + 1} of ${parts}, against the committed table`, () => {
    test('the table has the expected columns', () => expect(head).toBe(tableHead));
    const ids = shelf.functionalIds().filter((_, index) => index % parts === part);
    test.each(ids)('%s', (id) => {
      const expected = committed.filter((line) => line.startsWith(`${id},`));
      const found = verdictLines(id);
      expect(found.map(judgement)).toEqual(expected.map(judgement));
      found.forEach((line, index) => {
        const [margin, share] = numbers(line);
        const [oldMargin, oldShare] = numbers(expected[index] as string);
        expect(Math.abs(margin - oldMargin), line).toBeLessThanOrEqual(1e-3 * Math.abs(oldMargin) + 1e-9);
        expect(Math.abs(share - oldShare), line).toBeLessThanOrEqual(0.05 * oldShare + 1e-5);
      });
    });
  });
}

function judgement(line: string): string {
  return line.split(',').slice(0, 4).join(' ');
}

function numbers(line: string): [number, number] {
  const [margin, share] = line.split(',').slice(4).map(Number);
  return [margin as number, share as number];
}
