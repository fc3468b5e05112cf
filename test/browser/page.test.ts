import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SailingResult } from '../../src/equilibrium/index.js';
import { polarPage, polarReport, writeFiles } from '../../src/publish/index.js';
import { demoBoat, demoPolar } from '../support/demo.js';

const CHROMIUM = process.env.CHROMIUM ?? '/usr/bin/chromium';

const HOSTILE = `</script><script>window.broken=1</script><img src=x onerror="window.broken=1">'"&<b>`;
const boat = demoBoat('keelboat');
const polar = demoPolar('keelboat');
const report = polarReport(boat, polar);
const spoil = (r: SailingResult): SailingResult =>
  r.status === 'balanced' ? { ...r, sailSet: HOSTILE } : { ...r, reason: HOSTILE };
const hostile = {
  boat: { ...report.boat, name: HOSTILE, note: HOSTILE },
  polar: {
    ...polar,
    results: polar.results.map((row) => row.map(spoil)),
    bestUp: polar.bestUp.map(spoil),
    bestDown: polar.bestDown.map(spoil),
    sets: polar.sets.map((s) => ({ ...s, name: HOSTILE })),
  },
  resistance: report.resistance,
  righting: report.righting,
  sails: {
    ...report.sails,
    boat: HOSTILE,
    sets: report.sails.sets.map((s) => ({
      ...s,
      name: HOSTILE,
      loadings: s.loadings.map((l) => ({ ...l, sails: l.sails.map((x) => ({ ...x, sail: HOSTILE })) })),
    })),
  },
  balances: report.balances.map((b) => ({ ...b, state: { ...b.state, sailSet: HOSTILE } })),
};

let browser: Browser;
let folder = '';

beforeAll(async () => {
  if (!existsSync(CHROMIUM))
    throw new Error(`no browser at ${CHROMIUM}: install chromium or set CHROMIUM to its path`);
  folder = mkdtempSync(join(tmpdir(), 'polarwright-page-'));
  writeFiles(folder, [
    { name: 'page.html', content: polarPage(report) },
    { name: 'hostile.html', content: polarPage(hostile) },
  ]);
  browser = await chromium.launch({
    executablePath: CHROMIUM,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
});
afterAll(async () => {
  await browser?.close();
  if (folder !== '') rmSync(folder, { recursive: true, force: true });
});

interface Visit {
  readonly page: Page;
  /** Everything the browser complained of, and every request that left the page. */
  readonly complaints: string[];
  close(): Promise<void>;
}

async function visit(name: string, options: BrowserContextOptions = {}): Promise<Visit> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 }, ...options });
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('console', (m) => {
    if (m.type() === 'error' || m.type() === 'warning') complaints.push(m.text());
  });
  page.on('pageerror', (e) => complaints.push(e.message));
  page.on('request', (r) => {
    if (!/^(file|data|blob):/.test(r.url())) complaints.push(`request ${r.url()}`);
  });
  await page.goto(pathToFileURL(join(folder, name)).href);
  await page.waitForSelector('#polar .scatterlayer .trace');
  return { page, complaints, close: () => context.close() };
}

// What runs in the page is given as text: the tests are typed without a browser's names.

/** Texts whose contrast with their ground, by WCAG 2, is below 4.5. */
const FAINT_TEXTS = `(() => {
  const parse = (c) => (c.match(/[\\d.]+/g) ?? []).map(Number);
  const linear = (v) => (v / 255 <= 0.04045 ? v / 255 / 12.92 : ((v / 255 + 0.055) / 1.055) ** 2.4);
  const luminance = ([r, g, b]) => 0.2126 * linear(r) + 0.7152 * linear(g) + 0.0722 * linear(b);
  const faint = new Set();
  let seen = 0;
  const walker = document.createTreeWalker(document.querySelector('.page'), NodeFilter.SHOW_TEXT);
  for (let node = walker.nextNode(); node !== null; node = walker.nextNode()) {
    const element = node.parentElement;
    if (node.textContent.trim() === '' || element.closest('#polar, noscript')) continue;
    seen++;
    let ground = element;
    while (ground.parentElement && (parse(getComputedStyle(ground).backgroundColor)[3] ?? 1) === 0)
      ground = ground.parentElement;
    const a = luminance(parse(getComputedStyle(element).color));
    const b = luminance(parse(getComputedStyle(ground).backgroundColor));
    const contrast = (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05);
    if (contrast < 4.5) faint.add(contrast.toFixed(2) + ' ' + node.textContent.slice(0, 40));
  }
  return { seen, faint: [...faint] };
})()`;

const OPEN_ALL = `document.querySelectorAll('details').forEach((d) => { d.open = true; })`;
const PAPER = `document.getElementById('polar').layout.paper_bgcolor`;
const GROUND = `getComputedStyle(document.body).backgroundColor`;

/** Points at the first best-VMG mark of the diagram and reads the label that appears. */
async function pointedAt(page: Page): Promise<string> {
  // Every curve is followed by its best-VMG marks.
  const marks = page.locator('#polar .scatterlayer .trace').nth(1).locator('.points path');
  await marks.first().scrollIntoViewIfNeeded();
  const mark = await marks.first().boundingBox();
  await page.mouse.move(mark!.x + mark!.width / 2, mark!.y + mark!.height / 2);
  const label = page.locator('#polar .hoverlayer .hovertext').first();
  await label.waitFor();
  return (await label.textContent())!;
}

async function expectReadable(page: Page): Promise<void> {
  await page.evaluate(OPEN_ALL);
  const texts = (await page.evaluate(FAINT_TEXTS)) as { seen: number; faint: string[] };
  expect(texts.seen).toBeGreaterThan(1000);
  expect(texts.faint).toEqual([]);
}

describe('the page in a browser', () => {
  let open: Visit;
  beforeAll(async () => {
    open = await visit('page.html');
  });
  afterAll(() => open?.close());

  it('draws a line and its best-VMG marks for every wind speed, without complaint or network', async () => {
    const { page, complaints } = open;
    const points = (await page.evaluate(
      `document.getElementById('polar').data.map((t) => t.r.filter((v) => v !== null).length)`,
    )) as number[];
    expect(points).toHaveLength(2 * polar.tws.length);
    expect(await page.locator('#polar .scatterlayer .trace').count()).toBe(2 * polar.tws.length);
    points.forEach((count, k) => {
      const balanced = polar.results[k >> 1]!.filter((r) => r.status === 'balanced').length;
      if (k % 2 === 0) expect(count).toBeGreaterThanOrEqual(balanced);
      else expect(count).toBe(2);
    });
    expect(complaints).toEqual([]);
  });

  it('has zero degrees at the top and ninety to the right', async () => {
    const place = async (text: RegExp): Promise<{ x: number; y: number }> => {
      const box = await open.page
        .locator('#polar .angularaxistick text', { hasText: text })
        .first()
        .boundingBox();
      return { x: box!.x + box!.width / 2, y: box!.y };
    };
    const [ahead, abeam, astern] = [await place(/^0°$/), await place(/^90°$/), await place(/^180°$/)];
    expect(ahead.y).toBeLessThan(abeam.y);
    expect(abeam.y).toBeLessThan(astern.y);
    expect(abeam.x).toBeGreaterThan(ahead.x + 100);
    expect(Math.abs(astern.x - ahead.x)).toBeLessThan(20);
  });

  it('holds the targets, every state, and the cause where nothing balances', async () => {
    const { page } = open;
    expect(await page.locator('table.targets tbody tr').count()).toBe(3 * polar.tws.length);
    expect(await page.locator('#states details').count()).toBe(polar.tws.length);
    const rows = await page.locator('table.states tbody tr:not(.best)').count();
    expect(rows).toBeGreaterThanOrEqual(polar.tws.length * (polar.twa.length - 2));
    const dead = polar.results.flat().filter((r) => r.status === 'unbalanced').length;
    expect(await page.locator('table.states td.none').count()).toBe(dead);
    expect(await page.locator('#quantities tbody tr').count()).toBe(report.boat.description.length);
    expect(await page.locator('#estimates tbody tr').count()).toBe(boat.estimates.length);
    expect(await page.locator('#cautions li').count()).toBe(3);
  });

  it('shows the state under the pointer', async () => {
    const text = await pointedAt(open.page);
    for (const word of ['kn wind', 'TWA', 'speed', 'VMG', 'AWA', 'heel', 'leeway', 'ease', 'crew', 'sails'])
      expect(text).toContain(word);
    expect(text).not.toContain('customdata');
    expect(open.complaints).toEqual([]);
  });

  it('opens every table for printing, on white, and closes them again', async () => {
    const { page } = open;
    await page.emulateMedia({ media: 'print', colorScheme: 'dark' });
    await page.evaluate(`window.dispatchEvent(new Event('beforeprint'))`);
    expect(await page.locator('details:not([open])').count()).toBe(0);
    expect(await page.evaluate(GROUND)).toBe('rgb(255, 255, 255)');
    expect(await page.evaluate(PAPER)).toBe('#ffffff');
    const frame = (await page.locator('#polar').boundingBox())!;
    const drawing = (await page.locator('#polar .main-svg').first().boundingBox())!;
    expect(drawing.height).toBeLessThanOrEqual(frame.height);
    await page.evaluate(`window.dispatchEvent(new Event('afterprint'))`);
    await page.emulateMedia({ media: 'screen', colorScheme: 'light' });
    expect(await page.locator('details[open]').count()).toBe(1);
  });

  it.each([
    ['dark', 'rgb(16, 22, 28)', '#161d25'],
    ['light', 'rgb(246, 245, 241)', '#ffffff'],
  ] as const)(
    'follows the %s theme, diagram too, and keeps every text readable',
    async (theme, ground, paper) => {
      const { page } = open;
      await page.emulateMedia({ colorScheme: theme });
      // The page's own policy forbids waiting for a condition inside it.
      await expect.poll(() => page.evaluate(PAPER), { timeout: 10_000 }).toBe(paper);
      expect(await page.evaluate(GROUND)).toBe(ground);
      await expectReadable(page);
    },
  );

  it('fits a phone without scrolling sideways', async () => {
    const { page } = open;
    await page.setViewportSize({ width: 360, height: 760 });
    await page.evaluate(OPEN_ALL);
    expect(await page.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(360);
    await expect
      .poll(() => page.evaluate(`document.querySelector('#polar .main-svg').clientWidth`))
      .toBeLessThanOrEqual(360);
    expect(open.complaints).toEqual([]);
  });

  it.each(['light', 'dark'] as const)(
    'draws its charts in lines that stand out from the %s sheet',
    async (colorScheme) => {
      const { page, complaints, close } = await visit('page.html', { colorScheme });
      const colours = (await page.evaluate(
        `[...document.querySelectorAll('#resistance .chart > svg .chart-line')].map((e) => getComputedStyle(e).stroke)
        .concat(getComputedStyle(document.querySelector('#resistance')).backgroundColor)`,
      )) as string[];
      const luminance = (css: string): number => {
        const [r, g, b] = css
          .match(/[\d.]+/g)!
          .slice(0, 3)
          .map((v) => {
            const c = Number(v) / 255;
            return c <= 0.03928 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
          }) as [number, number, number];
        return 0.2126 * r + 0.7152 * g + 0.0722 * b;
      };
      const sheet = luminance(colours.pop()!);
      expect(colours.length).toBeGreaterThan(8);
      for (const c of colours) {
        const l = luminance(c);
        const contrast = (Math.max(l, sheet) + 0.05) / (Math.min(l, sheet) + 0.05);
        expect(contrast, c).toBeGreaterThan(3);
      }
      expect(complaints).toEqual([]);
      await close();
    },
  );

  it('shows hostile names as text', async () => {
    const { page, complaints, close } = await visit('hostile.html');
    expect(await page.locator('h1').textContent()).toBe(HOSTILE);
    expect(await pointedAt(page)).toContain('<img src=x');
    expect(await page.evaluate('window.broken')).toBeUndefined();
    expect(await page.locator('img').count()).toBe(0);
    expect(complaints).toEqual([]);
    await close();
  });
});
