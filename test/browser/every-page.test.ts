import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Browser, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { forceBalance } from '../../src/equilibrium/index.js';
import { predictPolar } from '../../src/polar/index.js';
import {
  balancePage,
  boatFacts,
  hullPlanPage,
  polarPage,
  polarReport,
  sailPage,
  sailReport,
  targetCard,
  targetsCardPage,
  writeFiles,
} from '../../src/publish/index.js';
import { fromKnots, radians } from '../../src/units/index.js';
import { demoBoat } from '../support/demo.js';

const CHROMIUM = process.env.CHROMIUM ?? '/usr/bin/chromium';
const AXE = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

const boat = demoBoat('keelboat');
const polar = predictPolar(boat, {
  tws: [6, 10, 16, 22].map(fromKnots),
  twa: [30, 45, 60, 75, 90, 105, 120, 135, 150, 165, 180].map(radians),
});
const state = polar.bestUp[1]!;
if (state.status !== 'balanced') throw new Error('no state');
const pages: Record<string, string> = {
  polar: polarPage(polarReport(boat, polar)),
  hull: hullPlanPage(boat),
  sails: sailPage(sailReport(boat)),
  balance: balancePage(boatFacts(boat), forceBalance(boat, state)),
  card: targetsCardPage(
    targetCard(polar, { reachAngles: [60, 90, 120].map(radians), shares: [], label: '' }),
    'kn',
    'A5',
  ),
};
const names = Object.keys(pages);

let browser: Browser;
let folder = '';
beforeAll(async () => {
  if (!existsSync(CHROMIUM))
    throw new Error(`no browser at ${CHROMIUM}: install chromium or set CHROMIUM to its path`);
  folder = mkdtempSync(join(tmpdir(), 'polarwright-pages-'));
  writeFiles(
    folder,
    names.map((n) => ({ name: `${n}.html`, content: pages[n]! })),
  );
  browser = await chromium.launch({ executablePath: CHROMIUM, args: ['--no-sandbox', '--disable-gpu'] });
});
afterAll(async () => {
  await browser?.close();
  if (folder !== '') rmSync(folder, { recursive: true, force: true });
});

async function withPage<T>(
  name: string,
  options: { width: number; height?: number; theme?: 'light' | 'dark'; scale?: number },
  use: (page: Page, complaints: readonly string[]) => Promise<T>,
): Promise<T> {
  const context = await browser.newContext({
    viewport: { width: options.width, height: options.height ?? 900 },
    colorScheme: options.theme ?? 'light',
  });
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('console', (m) => {
    if (m.type() === 'error' || m.type() === 'warning') complaints.push(m.text());
  });
  page.on('pageerror', (e) => complaints.push(e.message));
  page.on('request', (r) => {
    if (!/^(file|data|blob):/.test(r.url())) complaints.push(`request ${r.url()}`);
  });
  await page.goto(pathToFileURL(join(folder, `${name}.html`)).href);
  if (name === 'polar') await page.waitForSelector('#polar .scatterlayer .trace');
  try {
    return await use(page, complaints);
  } finally {
    await context.close();
  }
}

const OPEN_ALL = `document.querySelectorAll('details').forEach((d) => { d.open = true; })`;

describe.each(names)('the %s page', (name) => {
  it.each(['light', 'dark'] as const)(
    'has no serious finding of the accessibility checker, %s',
    async (theme) => {
      await withPage(name, { width: 1200, theme }, async (page, complaints) => {
        await page.evaluate(OPEN_ALL);
        await page.evaluate(AXE);
        const found = (await page.evaluate(
          `axe.run(document, { resultTypes: ['violations'] }).then((r) => r.violations
          .filter((v) => v.impact === 'serious' || v.impact === 'critical')
          .map((v) => v.id + ': ' + v.nodes.slice(0, 3).map((n) => n.html.slice(0, 160)).join(' | ')))`,
        )) as string[];
        expect(found).toEqual([]);
        expect(complaints).toEqual([]);
      });
    },
  );

  it('can be used at 360 px, and at 400 % zoom of a laptop', async () => {
    // 400 % of 1280 px leaves 320 px to the layout.
    for (const width of [360, 320]) {
      await withPage(name, { width, height: 640 }, async (page) => {
        await page.evaluate(OPEN_ALL);
        // Cards are sheets of paper: they may be panned, pages may not need it.
        const wide = (await page.evaluate('document.documentElement.scrollWidth')) as number;
        if (name !== 'card') expect(wide).toBeLessThanOrEqual(width);
      });
    }
  });

  it('prints to PDF without cutting a row', async () => {
    await withPage(name, { width: 1200 }, async (page) => {
      const pdf = await page.pdf({ preferCSSPageSize: true, printBackground: true });
      const count = (pdf.toString('latin1').match(/\/Type\s*\/Page[^s]/g) ?? []).length;
      expect(count).toBeGreaterThan(0);
      expect(count).toBeLessThanOrEqual(name === 'polar' ? 40 : 16);
      await page.emulateMedia({ media: 'print' });
      const breaks = (await page.evaluate(
        `[...document.querySelectorAll('tr')].every((r) => getComputedStyle(r).breakInside === 'avoid' || r.closest('.card'))`,
      )) as boolean;
      expect(breaks).toBe(true);
    });
  });
});

describe('the polar page by keyboard', () => {
  it('reaches every link, table and fold in order, each with a visible focus', async () => {
    await withPage('polar', { width: 1200 }, async (page) => {
      const wanted = (await page.evaluate(
        `document.querySelectorAll('nav a, summary').length + document.querySelectorAll('.scroll[tabindex="0"]').length`,
      )) as number;
      expect(wanted).toBeGreaterThan(20);
      let seen = 0;
      let unmarked = 0;
      const links: string[] = [];
      for (let i = 0; i < 60; i++) {
        await page.keyboard.press('Tab');
        const at = (await page.evaluate(
          `(() => { const e = document.activeElement; if (!e || e === document.body) return null;
            const s = getComputedStyle(e); return { tag: e.tagName, href: e.getAttribute('href'), outline: s.outlineStyle !== 'none' || s.boxShadow !== 'none' }; })()`,
        )) as { tag: string; href: string | null; outline: boolean } | null;
        if (at === null) break;
        seen++;
        if (!at.outline) unmarked++;
        if (at.href) links.push(at.href);
      }
      expect(seen).toBeGreaterThan(20);
      expect(unmarked).toBe(0);
      for (const target of ['#diagram', '#targets', '#crossover', '#balance', '#resistance', '#trust'])
        expect(links).toContain(target);
    });
  });
});
