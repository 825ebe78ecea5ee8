import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { findFunctional, loadConditions, openCatalogue } from '../../src/cli/engine.ts';
import { settle } from '../../src/cli/problems.ts';
import { constantValues } from '../../src/constraint/constants.ts';
import { limitInFloat64 } from '../../src/constraint/limit.ts';
import { buildMargin } from '../../src/constraint/margin.ts';
import { evaluatePoints } from '../../src/evaluate/points.ts';
import { Graph } from '../../src/graph/graph.ts';
import { compilePoint } from '../../src/kernel/float64.ts';
import { shortText } from '../../src/report/number-text.ts';
import { run } from '../cli/stand-in.ts';
import { type Browser, chromiumPath, openBrowser, visit } from './chromium.ts';

const only =
  'correlation-non-positive,correlation-coordinate-scaling,lieb-oxford,exchange-lieb-oxford,exchange-two-electron-bound';
const missing = 'Chromium is not installed: apt-get install chromium';

/** A sheet that tries to be more than text wherever it is shown. */
const hostile = `name: "</title><img src=x onerror=hit()><script>hit()</script>"
rung: gga
summary: "<svg onload=hit()> & \\"quoted\\" 'text'"
notes: "</details><iframe src=https://example.org></iframe> <!-- -->"
citations:
  - "</script><script>hit()</script> <a href=javascript:hit()>J. Chem. Phys.</a>"
parameters:
  mu: { value: 0.2, meaning: "<b onclick=hit()>m</b>", source: "\\" onmouseover=hit() x=\\"" }
exchange:
  enhancement: 1 + mu*s^2/(1 + mu*s^2) # </pre><script>hit()</script>
`;

describe.skipIf(chromiumPath === undefined)(`the report in a browser (${chromiumPath ?? missing})`, () => {
  let browser: Browser;
  let folder: string;
  const fileOf = (name: string) => join(folder, `${name}.html`);

  beforeAll(async () => {
    spawnSync(process.execPath, ['build.js', 'page'], { stdio: 'inherit' });
    folder = mkdtempSync(join(tmpdir(), 'rungcheck-report-'));
    writeFileSync(join(folder, 'hostile.yaml'), hostile);
    const write = async (name: string, sheets: readonly string[], ...more: string[]) => {
      const args = ['report', ...sheets, '--only', only, '--no-cache', '--no-project', ...more, '--out', fileOf(name)];
      expect(await run(args)).toMatchObject({ status: 0, err: '' });
    };
    await write('pbe', ['pbe']);
    await write('several', ['revpbe', 'pbe', 'spw92']);
    await write('proved', ['revpbe'], '--prove', '--boxes', '4000');
    await write('hostile', [join(folder, 'hostile.yaml')]);
    browser = await openBrowser();
  }, 120_000);
  afterAll(async () => {
    await browser?.close();
    rmSync(folder, { recursive: true, force: true });
  });

  const host = (page: Page, condition: string) => page.locator(`#c-${condition} .map`);
  const open = async (page: Page, condition: string) => {
    const details = page.locator(`#c-${condition}`);
    if ((await details.getAttribute('open')) === null) await details.locator('summary').first().click();
    await host(page, condition).locator('.figure[data-state=drawn]').waitFor();
  };
  /** What the readout shows: coordinates, margin and enhancement factors, as the texts of their numbers. */
  const reading = (page: Page, condition: string): Promise<Record<string, string>> =>
    host(page, condition)
      .locator('dd[data-name]')
      .evaluateAll((cells) =>
        Object.fromEntries(cells.map((cell) => [cell.getAttribute('data-name'), cell.getAttribute('data-value')])),
      );

  /** The same from the library, at the coordinates that the readout states. */
  function expected(condition: string, shown: Record<string, string>) {
    const shelf = openCatalogue([]);
    const pbe = settle(findFunctional(shelf, 'pbe'));
    const point = Object.fromEntries(['rs', 'zeta', 's'].map((name) => [name, shown[name] as string]));
    const { columns, rows } = evaluatePoints(pbe, { space: 'slice', points: [point], derivatives: false });
    const value = (name: string) => shortText(rows[0]?.[columns.indexOf(name)] as number, 6);
    const [read] = settle(loadConditions(shelf, [condition]));
    if (read === undefined) throw new Error(condition);
    const margin = buildMargin(new Graph(), read, pbe, { constants: constantValues(new Map()), limit: limitInFloat64 });
    const at = compilePoint(margin.graph, margin.node, margin.variables);
    const place = Float64Array.from(margin.variables, (name) => Number(shown[name]));
    return { Fx: value('Fx'), Fc: value('Fc'), Fxc: value('Fxc'), margin: shortText(at(place), 6) };
  }

  test('a page of one functional has less than 5 MB, opens without an error, and asks nothing of the network', async () => {
    const { page, complaints } = await visit(browser, fileOf('pbe'));
    expect(statSync(fileOf('pbe')).size).toBeLessThan(5e6);
    expect(await page.title()).toBe('PBE: exact conditions');
    expect(await page.locator('#summary .answer').textContent()).toMatch(/^PBE breaks/);
    await page.close();
    expect(complaints).toEqual([]);
  });

  test('the table is filtered and sorted, and tells how many rows are left', async () => {
    const { page, complaints } = await visit(browser, fileOf('pbe'));
    const rows = page.locator('#verdicts tbody tr:visible');
    expect(await rows.count()).toBe(5);
    await page.selectOption('#filter-part', 'correlation');
    expect(await rows.count()).toBe(2);
    expect(await page.locator('#verdicts .count').textContent()).toBe('2 of 5 conditions');
    await page.selectOption('#filter-part', '');
    await page.fill('#filter-text', 'lieb');
    expect(await rows.count()).toBe(2);
    await page.fill('#filter-text', '');
    await page.getByRole('button', { name: 'margin' }).click();
    const margins = await rows.evaluateAll((list) =>
      list.map((row) => Number(row.querySelector('td.number')?.getAttribute('data-key'))),
    );
    expect(margins).toEqual([...margins].sort((a, b) => a - b));
    expect(await page.locator('th[aria-sort=ascending]').textContent()).toBe('margin');
    await page.close();
    expect(complaints).toEqual([]);
  });

  test('what is read under the pointer is what the library computes at the point that is shown, to the digits shown', async () => {
    const { page, complaints } = await visit(browser, fileOf('pbe'));
    for (const condition of ['correlation-coordinate-scaling', 'lieb-oxford']) {
      await open(page, condition);
      const canvas = host(page, condition).locator('canvas');
      await canvas.scrollIntoViewIfNeeded();
      const box = await canvas.boundingBox();
      if (box === null) throw new Error('the map is not laid out');
      for (const [u, v] of [
        [0.31, 0.4],
        [0.77, 0.83],
        [0.02, 0.5],
      ] as const) {
        await page.mouse.move(box.x + u * box.width, box.y + v * box.height);
        const shown = await reading(page, condition);
        expect(shown).toMatchObject(expected(condition, shown));
        // ζ is not drawn: each point has its worst.
        expect(await host(page, condition).locator('dd[data-name=zeta] small').textContent()).toBe('at its worst');
      }
    }
    await page.close();
    expect(complaints).toEqual([]);
  });

  test('a slice is moved by the keyboard, and the point is read there', async () => {
    const { page, complaints } = await visit(browser, fileOf('pbe'));
    const condition = 'correlation-coordinate-scaling';
    await open(page, condition);
    const slider = host(page, condition).locator('input[type=range]');
    await slider.focus();
    await page.keyboard.press('Home');
    await host(page, condition).locator('.figure[data-state=drawn]').waitFor();
    await expect.poll(async () => (await reading(page, condition)).zeta).toBe('0');
    expect(await slider.getAttribute('aria-valuetext')).toBe('0');
    const stage = host(page, condition).locator('.stage');
    await stage.focus();
    const before = await reading(page, condition);
    await page.keyboard.press('Shift+ArrowLeft');
    await page.keyboard.press('ArrowDown');
    const after = await reading(page, condition);
    expect(Number(after.s)).toBeLessThan(Number(before.s));
    expect(after).toMatchObject(expected(condition, after));
    expect(await page.locator('#live').textContent()).toContain(`margin ${after.margin}`);
    await host(page, condition).locator('select').first().selectOption('zeta');
    await expect.poll(async () => host(page, condition).locator('dd[data-name=zeta] small').count()).toBe(0);
    await page.close();
    expect(complaints).toEqual([]);
  });

  test('the keyboard goes through the page in the order in which it is read', async () => {
    const { page } = await visit(browser, fileOf('pbe'));
    const order: string[] = [];
    for (let count = 0; count < 12; count++) {
      await page.keyboard.press('Tab');
      order.push(
        await page.evaluate(
          () => document.activeElement?.textContent?.trim().slice(0, 20) || (document.activeElement?.id ?? ''),
        ),
      );
    }
    expect(order.slice(0, 8)).toEqual([
      'To the summary',
      'Summary',
      'Verdicts',
      'Conditions',
      'Curves',
      'Formulas',
      'How it was asked',
      'References',
    ]);
    const positions = await page.evaluate(
      () =>
        [...document.querySelectorAll('[tabindex]')].filter((element) => Number(element.getAttribute('tabindex')) > 0)
          .length,
    );
    expect(positions).toBe(0);
    await page.close();
  });

  test('several functionals have a column each, with the differences in front, and a map of each', async () => {
    const { page, complaints } = await visit(browser, fileOf('several'));
    expect(await page.locator('.matrix thead th').allTextContents()).toEqual([
      'condition',
      'part',
      'revPBE',
      'PBE',
      'SPW92',
    ]);
    const differs = await page
      .locator('.matrix tbody tr')
      .evaluateAll((rows) => rows.map((row) => row.getAttribute('data-differs')));
    expect(differs).toEqual([...differs].sort().reverse());
    expect(differs).toContain('yes');
    await open(page, 'lieb-oxford');
    await host(page, 'lieb-oxford').locator('select').first().selectOption({ label: 'PBE' });
    await host(page, 'lieb-oxford').locator('.figure[data-state=drawn]').waitFor();
    const shown = await reading(page, 'lieb-oxford');
    expect(shown).toMatchObject(expected('lieb-oxford', shown));
    await page.close();
    expect(complaints).toEqual([]);
  });

  test('with --prove the maps show what is proved, and can show the margin instead', async () => {
    const { page, complaints } = await visit(browser, fileOf('proved'));
    await open(page, 'lieb-oxford');
    const map = host(page, 'lieb-oxford');
    const legend = () => map.locator('svg .legend text').allTextContents();
    const shares = async () => (await legend()).map((text) => Number(/([\d.]+) %$/.exec(text)?.[1]));
    expect(await legend()).toEqual([
      expect.stringMatching(/^proved to hold [\d.]+ %$/),
      expect.stringMatching(/^proved to violate [\d.]+ %$/),
      expect.stringMatching(/^undecided [\d.]+ %$/),
    ]);
    for (const state of ['proved', 'violated', 'undecided']) {
      // In the picture and in its legend.
      expect(await map.locator(`path.region-${state}`).count()).toBe(2);
    }
    expect(await map.locator('.note.proof').textContent()).toContain(
      'Over ζ: holds for every value, violated at some value.',
    );
    expect(await map.locator('.note.proof').textContent()).toMatch(/Violated parts also from [\d ]+ boxes at ζ = 1,/);
    // Every ζ must hold it over the plane; at ζ = 0 more of it does.
    const [overAll = 0] = await shares();
    await map.locator('input[type=range]').focus();
    await page.keyboard.press('Home');
    await expect.poll(() => map.locator('.note.proof').textContent()).toContain('on this plane at ζ = 0 alone');
    await expect.poll(async () => (await shares())[0]).toBeGreaterThan(overAll);
    await map.getByLabel('what is proved').uncheck();
    expect(await map.locator('path[class^=region-]').count()).toBe(0);
    expect((await legend()).join()).toMatch(/margin/);
    await page.close();
    expect(complaints).toEqual([]);
  });

  test('with --prove the words say what is proved, certified and undecided; without it that nothing is', async () => {
    const { page } = await visit(browser, fileOf('proved'));
    expect(await page.locator('#c-correlation-non-positive .facts').first().textContent()).toContain(
      'proved on the whole domain, wherever the formula has a value',
    );
    const violated = await page.locator('#c-exchange-lieb-oxford .facts').first().textContent();
    expect(violated).toMatch(
      /Of the domain proved to hold on 64\.4\s%, proved to violate on 35\.6\s% \(s ≥ 3\.22\) and undecided on <\s0\.01\s%.*certified/,
    );
    expect(await page.locator('#summary').textContent()).toContain('A double rung: proved on the whole domain');
    await page.close();
    const { page: other } = await visit(browser, fileOf('pbe'));
    expect(await other.locator('#asked').textContent()).toContain(
      'not asked for: “holds” means that no violation was found',
    );
    await other.close();
  });

  test('nothing of a sheet becomes markup or runs', async () => {
    const { page, complaints } = await visit(browser, fileOf('hostile'));
    expect(await page.locator('img, iframe, b[onclick], svg[onload], a[href^=javascript]').count()).toBe(0);
    expect(await page.locator('script').count()).toBe(3);
    expect(await page.locator('h1').textContent()).toBe('</title><img src=x onerror=hit()><script>hit()</script>');
    expect(await page.locator('#references li').first().textContent()).toContain('</script><script>hit()</script>');
    expect(await page.locator('pre').first().textContent()).toBe(hostile);
    await page.close();
    expect(complaints).toEqual([]);
  });

  test('the policy of the page lets no other script run', async () => {
    const { page, complaints } = await visit(browser, fileOf('pbe'));
    const ran = await page.evaluate(() => {
      const script = document.createElement('script');
      script.textContent = 'window.wasRun = true';
      document.body.append(script);
      return 'wasRun' in window;
    });
    expect(ran).toBe(false);
    expect(complaints.join()).toContain('Content Security Policy');
    expect(readFileSync(fileOf('pbe'), 'utf8')).toContain('default-src &#39;none&#39;');
    await page.close();
  });

  test.each([390, 820, 1440])(
    'at %i pixels only tables and formulas scroll sideways, never the page',
    async (width) => {
      for (const name of ['pbe', 'several', 'proved']) {
        const { page } = await visit(browser, fileOf(name));
        await page.setViewportSize({ width, height: 900 });
        await page.evaluate(() => {
          for (const details of document.querySelectorAll('details')) details.open = true;
        });
        expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(width);
        await page.fill('#filter-text', 'lieb');
        expect(await page.locator('#verdicts tbody tr:visible').count()).toBe(2);
        await page.close();
      }
    },
  );
});
