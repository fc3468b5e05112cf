import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Browser, chromium } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type ComparisonReport, comparisonPage, writeFiles } from '../../src/publish/index.js';
import { comparison, namedCourse, variantTimes, windTable } from '../../src/racecourse/index.js';
import { demoBoat } from '../support/demo.js';

const CHROMIUM = process.env.CHROMIUM ?? '/usr/bin/chromium';
const HOSTILE = `</style><script>window.broken=1</script><img src=x onerror="window.broken=1">'"&<b>`;
const course = namedCourse('triangle');
const wind = windTable(HOSTILE, [
  { tws: 3, share: 1 },
  { tws: 7, share: 1 },
]);
const known = variantTimes(demoBoat('single-hander'), course, wind);
const z = Array.from({ length: 40 }, (_, i) =>
  Float64Array.from({ length: 12 }, (_, j) => Math.sin(i * (j + 1.3))),
);
const drawn = (k: number) => z.map((v) => [1200 + 9 * v[0]! + k * (5 + v[1]!), 800 + k * (v[2]! - 4)]);
const report: ComparisonReport = {
  comparison: comparison(
    [0, 1, 2].map((k) => ({ name: k === 1 ? HOSTILE : `boat ${k}`, known, drawn: drawn(k) })),
    course,
    wind,
    { z, seed: 3 },
  ),
  boats: [0, 1, 2].map((k) => ({
    name: k === 1 ? HOSTILE : `boat ${k}`,
    differences: [{ key: HOSTILE, before: HOSTILE, after: HOSTILE }],
    warnings: [],
  })),
  polars: [known.polar, known.polar, known.polar],
};

let browser: Browser;
let folder = '';
beforeAll(async () => {
  if (!existsSync(CHROMIUM))
    throw new Error(`no browser at ${CHROMIUM}: install chromium or set CHROMIUM to its path`);
  folder = mkdtempSync(join(tmpdir(), 'polarwright-comparison-'));
  writeFiles(folder, [{ name: 'page.html', content: comparisonPage(report) }]);
  browser = await chromium.launch({ executablePath: CHROMIUM, args: ['--no-sandbox', '--disable-gpu'] });
});
afterAll(async () => {
  await browser?.close();
  if (folder !== '') rmSync(folder, { recursive: true, force: true });
});

describe('the page of a comparison', () => {
  it.each([
    [1200, 'light'],
    [390, 'dark'],
  ] as const)(
    'stands alone at %i px, %s: no request, no complaint, nothing cut off',
    async (width, theme) => {
      const context = await browser.newContext({ viewport: { width, height: 900 }, colorScheme: theme });
      const page = await context.newPage();
      const complaints: string[] = [];
      page.on('console', (m) => complaints.push(m.text()));
      page.on('pageerror', (e) => complaints.push(e.message));
      page.on('request', (r) => {
        if (!r.url().startsWith('file:') && !r.url().startsWith('data:')) complaints.push(r.url());
      });
      await page.goto(pathToFileURL(join(folder, 'page.html')).href);
      expect(complaints).toEqual([]);
      expect(await page.evaluate('window.broken')).toBeUndefined();
      expect(await page.evaluate('document.documentElement.scrollWidth - innerWidth')).toBeLessThanOrEqual(0);
      expect(await page.locator('#ranking tbody tr').count()).toBe(3);
      expect(await page.locator('#differences table').count()).toBe(2);
      expect(await page.locator('#polars svg[role=img]').count()).toBe(2);
      await context.close();
    },
  );

  it('keeps the figures of its heat map readable in both themes', async () => {
    for (const theme of ['light', 'dark'] as const) {
      const context = await browser.newContext({ colorScheme: theme });
      const page = await context.newPage();
      await page.goto(pathToFileURL(join(folder, 'page.html')).href);
      const worst = await page.evaluate(`(() => {
        const canvas = new OffscreenCanvas(1, 1).getContext('2d', { willReadFrequently: true });
        const light = (colour) => {
          canvas.clearRect(0, 0, 1, 1); canvas.fillStyle = colour; canvas.fillRect(0, 0, 1, 1);
          const [r, g, b] = [...canvas.getImageData(0, 0, 1, 1).data].map((v) => {
            const s = v / 255; return s <= 0.04045 ? s / 12.92 : ((s + 0.055) / 1.055) ** 2.4; });
          return 0.2126 * r + 0.7152 * g + 0.0722 * b;
        };
        return Math.min(...[...document.querySelectorAll('#differences td[style]')].map((cell) => {
          const style = getComputedStyle(cell);
          const [a, b] = [light(style.color), light(style.backgroundColor)];
          return (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05);
        }));
      })()`);
      expect(worst, theme).toBeGreaterThan(4.5);
      await context.close();
    }
  });

  it('gives no certainty where none was computed', () => {
    const bare = comparison(
      [
        { name: 'a', known, drawn: [] },
        { name: 'b', known, drawn: [] },
      ],
      course,
      wind,
      { z: [], seed: 1 },
    );
    const page = comparisonPage({ ...report, comparison: bare, boats: report.boats.slice(0, 2) });
    expect(page).not.toContain('id="certainty"');
    expect(page).not.toMatch(/NaN|undefined/);
    expect(readFileSync(join(folder, 'page.html'), 'utf8')).toContain('id="certainty"');
  });
});
