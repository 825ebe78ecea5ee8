import { describe, expect, test } from 'vitest';
import { textWidth } from '../../src/report/layout.ts';
import { vetTable } from '../../src/report/vet-table.ts';
import { failing, findingsOf, functional, holding, notAsked, undecided, violated } from './made-up.ts';

const plain = { width: 100, colour: false };
const table = vetTable(findingsOf(functional), plain);
const withoutColour = (text: string) => text.replace(new RegExp(`${String.fromCharCode(27)}\\[\\d*m`, 'g'), '');

describe('the table of vet, from invented findings', () => {
  test('is the golden text at 100 columns', async () => {
    await expect(table).toMatchFileSnapshot('golden/vet-100.txt');
  });

  test('is the golden text at 140 columns, for two functionals and a trial parameter', async () => {
    const trial = { ...functional, id: 'invented-gga', name: 'INV-0', rung: 'gga', parameters: { kappa: '0.9' } };
    const hybrid = { ...trial, exactExchange: { shortRange: 0.25, longRange: 0.25, omega: null }, nonLocal: 'vv10' };
    const ownDomain = { ...holding.domain, coordinates: holding.domain.coordinates.slice(0, 3) };
    const two = findingsOf(functional, { ...hybrid, findings: [{ ...holding, domain: ownDomain }] });
    await expect(vetTable(two, { width: 140, colour: false })).toMatchFileSnapshot('golden/vet-140.txt');
  });

  test.each([60, 80, 100, 140])('keeps to %i columns', (width) => {
    const lines = vetTable(findingsOf(functional), { width, colour: false }).split('\n');
    const header = lines.findIndex((line) => line.includes('verdict'));
    const tableRows = new Set(lines.slice(header, header + 6));
    const tooWide = lines.filter((line) => textWidth(line) > width && !(width === 60 && tableRows.has(line)));
    expect(tooWide).toEqual([]);
  });

  test('says the same with colour as without', () => {
    const coloured = vetTable(findingsOf(functional), { width: 100, colour: true });
    expect(coloured).not.toBe(table);
    expect(withoutColour(coloured)).toBe(table);
  });

  test('puts what fails first, then warnings, undecided and what holds', () => {
    const order = ['invented-spot', 'invented-scaling', 'invented-doubt', 'invented-bound'];
    const places = order.map((id) => table.indexOf(id));
    expect(places).toEqual([...places].sort((a, b) => a - b));
  });

  test('gives the witness with all digits of its doubles', () => {
    expect(table).toContain('r_s = 0.5123456789012345, ζ = 1, s = 2.1234567890123457; any α');
  });

  test('calls a violation that is not confirmed by what it is', () => {
    const unconfirmed = { ...violated, confirmed: null, confirmedDigits: 0 };
    const text = vetTable(findingsOf({ ...functional, findings: [unconfirmed] }), plain);
    expect(text).toContain('-0.0023147709123456 (double precision, not confirmed)');
  });

  test('never calls a condition that holds proved, and says that it is no proof', () => {
    const text = vetTable(findingsOf({ ...functional, findings: [holding] }), plain);
    expect(text).not.toContain('proved');
    expect(text).toContain('not a proof');
  });

  test('shows a bound that is touched to round-off as ≈ 0', () => {
    const touched = { ...holding, margin: -2.2e-16 };
    expect(vetTable(findingsOf({ ...functional, findings: [touched] }), plain)).toContain('≈ 0');
  });

  test('names the coordinates of the rung only', () => {
    const withoutAlpha = { ...violated.domain, coordinates: violated.domain.coordinates.slice(0, 3) };
    const gga = { ...functional, rung: 'gga', findings: [{ ...violated, domain: withoutAlpha }] };
    expect(vetTable(findingsOf(gga), plain)).not.toContain('α');
  });

  test('counts points without a value', () => {
    const text = vetTable(findingsOf({ ...functional, findings: [{ ...holding, withoutValue: 1200 }] }), plain);
    expect(text.replace(/\s+/g, ' ')).toContain('points without a value: 1 200 in invented-bound');
  });

  test.each([
    ['fails', [failing], false, 'Exit status 1'],
    ['has warnings only', [violated, undecided], false, 'Exit status 0: nothing fails'],
    ['fails and is asked for status 0', [failing], true, 'Exit status 0, as asked, although a condition fails.'],
    ['is asked nothing', [notAsked], false, 'none of 0 conditions violated'],
  ])('a functional that %s ends with the words for it', (_case, findings, exitZero, words) => {
    const text = vetTable(findingsOf({ ...functional, findings }), { ...plain, exitZero });
    expect(text).toContain(words);
  });
});
