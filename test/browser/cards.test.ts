import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Browser, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { predictPolar } from '../../src/polar/index.js';
import {
  CARD_PAPERS,
  type CardPaper,
  type TargetCard,
  targetCard,
  targetsCardPage,
  writeFiles,
} from '../../src/publish/index.js';
import { fromKnots, radians } from '../../src/units/index.js';
import { demoBoat } from '../support/demo.js';

const CHROMIUM = process.env.CHROMIUM ?? '/usr/bin/chromium';
const PAPERS = Object.keys(CARD_PAPERS) as CardPaper[];

const polar = predictPolar(demoBoat('trapeze-dinghy'), {
  tws: [4, 8, 14, 24].map(fromKnots),
  twa: [30, 45, 60, 75, 90, 105, 120, 135, 150, 165, 180].map(radians),
});
const card = targetCard(polar, {
  reachAngles: [60, 75, 90, 105, 120, 135].map(radians),
  shares: [
    { what: 'sea', share: 0.965 },
    { what: 'crew', share: 0.955 },
  ],
  label: 'first season, short steep chop by the bar',
});

const WIDE = 'W'.repeat(200);
/** As full as a card gets: nine winds a card, a sail set and a reason of its own each, everything too long. */
const crowded: TargetCard = {
  ...card,
  boatName: `<script>window.broken=1</script>${WIDE}`,
  label: WIDE,
  winds: Array.from({ length: 18 }, (_, i) => {
    const w = card.winds[i % 4]!;
    const renamed = w.up.ok ? { ...w.up, state: { ...w.up.state, sailSet: `${i} <b>${WIDE}` } } : w.up;
    const lost = { ok: false, twa: 1, why: 'rudder at its limit', reason: WIDE } as const;
    return {
      tws: fromKnots(i + 10),
      up: renamed,
      down: lost,
      reach: w.reach.map((c, k) => (k % 2 === 0 ? lost : c)),
    };
  }),
};

let browser: Browser;
let folder = '';

beforeAll(async () => {
  if (!existsSync(CHROMIUM))
    throw new Error(`no browser at ${CHROMIUM}: install chromium or set CHROMIUM to its path`);
  folder = mkdtempSync(join(tmpdir(), 'polarwright-cards-'));
  writeFiles(
    folder,
    PAPERS.flatMap((paper) => [
      { name: `${paper}.html`, content: targetsCardPage(card, 'kn', paper) },
      { name: `crowded-${paper}.html`, content: targetsCardPage(crowded, 'm/s', paper) },
    ]),
  );
  browser = await chromium.launch({ executablePath: CHROMIUM, args: ['--no-sandbox', '--disable-gpu'] });
});
afterAll(async () => {
  await browser?.close();
  if (folder !== '') rmSync(folder, { recursive: true, force: true });
});

async function open(name: string): Promise<{ page: Page; complaints: string[] }> {
  const page = await browser.newPage();
  const complaints: string[] = [];
  page.on('console', (m) => {
    if (m.type() === 'error' || m.type() === 'warning') complaints.push(m.text());
  });
  page.on('pageerror', (e) => complaints.push(e.message));
  page.on('request', (r) => {
    if (!/^(file|data):/.test(r.url())) complaints.push(`request ${r.url()}`);
  });
  await page.goto(pathToFileURL(join(folder, `${name}.html`)).href);
  return { page, complaints };
}

/** Cards whose content is taller than the card, or whose tables or feet reach out of it. */
const OVERFULL = `[...document.querySelectorAll('.card')].filter((c) => {
  const box = c.getBoundingClientRect();
  return c.scrollHeight > c.clientHeight || [...c.querySelectorAll('table, p, ul')].some((e) => {
    const b = e.getBoundingClientRect();
    return b.bottom > box.bottom || b.right > box.right + 0.5 || b.left < box.left;
  });
}).map((c) => c.querySelector('h1, h2').textContent)`;

/** Figures wider than their cells. */
const CUT = `[...document.querySelectorAll('td:not(.none), th')]
  .filter((t) => t.scrollWidth > t.clientWidth + 1).map((t) => t.textContent)`;

const COLOURS = `[...new Set([...document.querySelectorAll('.card, .card *')].flatMap((e) => {
  const s = getComputedStyle(e);
  return [s.color, s.backgroundColor, s.borderBottomColor];
}))].sort()`;

/** Height in mm of the main figures of a card. */
const TYPE_SIZE = `parseFloat(getComputedStyle(document.querySelector('.vmg td.main')).fontSize) * 25.4 / 96`;

/** Pages and their sizes in mm, as the PDF file declares them. */
function pdfPages(pdf: Buffer): { count: number; sizes: string[] } {
  const text = pdf.toString('latin1');
  const boxes = [...text.matchAll(/\/MediaBox\s*\[\s*0 0 ([\d.]+) ([\d.]+)\s*\]/g)];
  const mm = (points: string): number => Math.round((Number(points) * 25.4) / 72);
  return {
    count: [...text.matchAll(/\/Type\s*\/Page\b(?!s)/g)].length,
    sizes: [...new Set(boxes.map((b) => `${mm(b[1]!)} x ${mm(b[2]!)}`))],
  };
}

describe.each(PAPERS)('cards on %s', (paper) => {
  const [width, height] = CARD_PAPERS[paper];

  it.each([paper, `crowded-${paper}`])(
    '%s: one card a page, nothing cut, in black and white',
    async (name) => {
      const { page, complaints } = await open(name);
      await page.emulateMedia({ media: 'print' });
      const cards = await page.locator('.card').count();
      expect(cards).toBe(name === paper ? 6 : 10);
      expect(await page.evaluate(OVERFULL)).toEqual([]);
      expect(await page.evaluate(CUT)).toEqual([]);
      expect(await page.evaluate(COLOURS)).toEqual([
        'rgb(0, 0, 0)',
        'rgb(255, 255, 255)',
        'rgba(0, 0, 0, 0)',
      ]);
      const pdf = await page.pdf({ preferCSSPageSize: true, printBackground: true });
      expect(pdfPages(pdf)).toEqual({ count: cards, sizes: [`${width} x ${height}`] });
      expect(await page.evaluate('window.broken')).toBeUndefined();
      expect(complaints).toEqual([]);
      await page.close();
    },
  );

  it('is set in large type', async () => {
    const { page } = await open(paper);
    // 12 points on A6 (4.2 mm), more in proportion on A5.
    expect(await page.evaluate(TYPE_SIZE)).toBeGreaterThan(0.04 * width);
    await page.close();
  });

  it('carries target, derating, wind height and caution on every card of figures', async () => {
    const { page } = await open(paper);
    for (const text of await page.locator('.card').allTextContents()) {
      expect(text).toContain('92.2 % of prediction (sea 96.5 %, crew 95.5 %)');
      expect(text).toContain('Wind at 10 m');
      expect(text).toContain('no judgement of stability, strength or safety');
    }
    await page.close();
  });
});
