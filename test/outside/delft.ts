import { readFileSync } from 'node:fs';
import {
  DELFT_1998,
  DELFT_2008,
  DELFT_KEEL,
  type DelftHull,
  effectiveSpans,
  heelResiduary20,
  keelResiduary,
  residuaryDelft1998,
  residuaryDelft2008,
  wettedAreaDelft,
} from '../../src/hull/index.js';
import { weissinger } from '../../src/lifting-line/index.js';
import { pchip } from '../../src/numerics/index.js';
import { seeded } from '../support/random.js';
import { absolute, type OutsideCase, type OutsideCheck } from './check.js';

/** The hull the published tables are usually tried on. */
function standardHull(): DelftHull {
  const h = {
    lwl: 10,
    bwl: 3.17,
    canoeDraft: 0.794486215538847,
    volume: 9.15622,
    waterplane: 21.8096,
    lcbFromForward: 10 * (0.5 + 0.023),
    lcfFromForward: 10 * (0.5 + 0.033),
    cp: 0.568,
    cm: 0.640062,
  };
  return { ...h, wetted: wettedAreaDelft(h) };
}

const RR98 = [
  -0.00018, 0.00003, 0.0004, 0.00122, 0.003, 0.00685, 0.01931, 0.04452, 0.07994, 0.11012, 0.12618,
];
const RR08 = [
  0.00006, 0.00039, 0.00121, 0.00307, 0.0067, 0.019, 0.04385, 0.07986, 0.11187, 0.12842, 0.13549, 0.14435,
  0.12676,
];

/** Random hulls inside both editions' ranges. */
function randomHulls(count: number): DelftHull[] {
  const random = seeded(1998);
  const between = (a: number, b: number): number => a + (b - a) * random();
  const out: DelftHull[] = [];
  while (out.length < count) {
    const lwl = 10;
    const bwl = lwl / between(2.8, 5);
    const cp = between(0.52, 0.6);
    const cm = between(0.65, 0.78);
    const canoeDraft = bwl / between(2.5, 12);
    const volume = cp * cm * lwl * bwl * canoeDraft;
    const slender = lwl / Math.cbrt(volume);
    const cwp = between(0.65, 0.72);
    const waterplane = cwp * lwl * bwl;
    const load = waterplane / volume ** (2 / 3);
    if (slender < 4.34 || slender > 8.5 || load < 3.78 || load > 12.67) continue;
    const lcb = between(0, 0.06);
    const h = {
      lwl,
      bwl,
      canoeDraft,
      volume,
      waterplane,
      lcbFromForward: lwl * (0.5 + lcb),
      lcfFromForward: lwl * (0.5 + Math.max(0.018, lcb + between(0.005, 0.025))),
      cp,
      cm,
    };
    out.push({ ...h, wetted: wettedAreaDelft(h) });
  }
  return out;
}

export interface TankHull {
  readonly number: number;
  readonly hull: DelftHull;
  readonly fn: number[];
  readonly rr: number[];
}

/** The usable hulls of the tank data, scaled to Lwl 10; Cwp 0.688 and LCF = LCB - 1 % are assumed. */
export function tankHulls(): TankHull[] {
  const text = readFileSync(new URL('./data/tank-series-1.csv', import.meta.url), 'utf8');
  const byHull = new Map<number, TankHull>();
  for (const line of text.split('\n')) {
    if (line.startsWith('#') || line.startsWith('hull') || line.trim() === '') continue;
    const [n, lcb, cp, slender, bt, lb, fn, rr] = line.split(',').map(Number) as [
      number,
      number,
      number,
      number,
      number,
      number,
      number,
      number,
    ];
    if (n === 4 || n === 5) continue;
    let t = byHull.get(n);
    if (t === undefined) {
      const lwl = 10;
      const bwl = lwl / lb;
      const canoeDraft = bwl / bt;
      const volume = (lwl / slender) ** 3;
      const h = {
        lwl,
        bwl,
        canoeDraft,
        volume,
        waterplane: 0.688 * lwl * bwl,
        lcbFromForward: lwl * (0.5 - lcb / 100),
        lcfFromForward: lwl * (0.5 - lcb / 100 + 0.01),
        cp,
        cm: volume / (cp * lwl * bwl * canoeDraft),
      };
      t = { number: n, hull: { ...h, wetted: wettedAreaDelft(h) }, fn: [], rr: [] };
      byHull.set(n, t);
    }
    t.fn.push(fn);
    t.rr.push(rr / 1000);
  }
  return [...byHull.values()];
}

const TANK_FN = [0.15, 0.2, 0.25, 0.3, 0.35, 0.4, 0.45];
/** Largest rms x 1000 at each Froude number, from the prototype of this comparison. */
const TANK_RMS = [0.15, 0.15, 0.22, 0.38, 0.95, 2.4, 7.5];

/** Model minus tank at a Froude number for every hull: 1998 bare hull plus what keel and rudder add, 0.0098 Fn^2. */
export function tankDifferences(fn: number): { model: number; tank: number }[] {
  return tankHulls().map((t) => {
    const rr = residuaryDelft1998(t.hull);
    const model = rr[DELFT_1998.Fn.findIndex((f) => Math.abs(f - fn) < 1e-9)]! + 0.0098 * fn * fn;
    return { model, tank: pchip(t.fn, t.rr).value(fn) };
  });
}

/** The fin keel the tank's models carried is not in the data set; one like theirs is assumed, for Lwl 10 m. */
const TANK_KEEL = { volume: 0.26, depth: 0.55, span: 1.37 };

type Tank = { readonly edition: '1998' | '2008'; readonly offset: boolean; readonly keel: boolean };

/** Model minus tank over the 20 hulls, x 1000: bias or rms, at each Froude number. */
function tankCases(t: Tank, measure: 'bias' | 'rms'): OutsideCase[] {
  const hulls = tankHulls();
  return TANK_FN.map((fn) => {
    let sum = 0;
    let squares = 0;
    for (const h of hulls) {
      const table = t.edition === '1998' ? DELFT_1998 : DELFT_2008;
      const rr = t.edition === '1998' ? residuaryDelft1998(h.hull) : residuaryDelft2008(h.hull);
      let model = rr[table.Fn.findIndex((f) => Math.abs(f - fn) < 1e-9)]!;
      if (t.offset) model += 0.0098 * fn * fn;
      if (t.keel) {
        const k = {
          volume: TANK_KEEL.volume,
          centreDepth: h.hull.canoeDraft + TANK_KEEL.depth,
          draft: h.hull.canoeDraft + TANK_KEEL.span,
        };
        const row = DELFT_KEEL.Fn.findIndex((f) => Math.abs(f - fn) < 1e-9);
        if (row >= 0) model += (Math.max(0, keelResiduary(h.hull, k)[row]!) * k.volume) / h.hull.volume;
      }
      const d = 1000 * (model - pchip(h.fn, h.rr).value(fn));
      sum += d;
      squares += d * d;
    }
    const v = measure === 'bias' ? sum / hulls.length : Math.sqrt(squares / hulls.length);
    return { name: `${fn.toFixed(2)}: ${v.toFixed(2)}`, expected: 0, got: v, error: Math.abs(v) };
  });
}

const tankRows: readonly OutsideCheck[] = (['1998', '2008'] as const).flatMap((edition) =>
  (
    [
      [false, false, 'bare hull as printed'],
      [true, false, 'with 0.0098 Fn^2 for keel and rudder'],
      [true, true, 'with 0.0098 Fn^2 and a keel residuary (keel assumed)'],
    ] as const
  ).flatMap(([offset, keel, words]) =>
    (['bias', 'rms'] as const).map(
      (measure): OutsideCheck => ({
        source: 'towing tank: Delft series 1, 20 hulls (open data)',
        quantity: `${edition} edition, ${words}: ${measure} x 1000 at Fn`,
        showCases: true,
        tolerance: 0,
        errorUnit: '',
        printOnly: true,
        run: () => tankCases({ edition, offset, keel }, measure),
      }),
    ),
  ),
);

export const checks: readonly OutsideCheck[] = [
  {
    source: 'Keuning & Sonnenberg 1998, independent evaluation',
    quantity: 'residuary resistance over weight, standard hull',
    tolerance: 1e-5,
    errorUnit: '',
    note: 'checks the code, not the world',
    run: () =>
      residuaryDelft1998(standardHull()).map((v, i) => absolute(`Fn ${DELFT_1998.Fn[i]}`, RR98[i]!, v)),
  },
  {
    source: 'Keuning & Katgert 2008, independent evaluation',
    quantity: 'residuary resistance over weight, standard hull',
    tolerance: 1e-5,
    errorUnit: '',
    note: 'checks the code, not the world',
    run: () =>
      residuaryDelft2008(standardHull()).map((v, i) => absolute(`Fn ${DELFT_2008.Fn[i]}`, RR08[i]!, v)),
  },
  {
    source: 'Keuning & Sonnenberg 1998, independent evaluation',
    quantity: 'increase with heel at 20 deg, standard hull (x 1000)',
    tolerance: 0.01,
    errorUnit: '',
    note: 'printed to 0.01',
    run: () =>
      heelResiduary20(standardHull()).map((v, i) =>
        absolute(`row ${i}`, [-0.02, 0.19, 0.61, 0.94, 1.05, 0.52, 1.47][i]!, 1000 * v),
      ),
  },
  {
    source: 'two independent fits to one towing-tank series (1998, 2008)',
    quantity: 'bias between the editions, median over 1000 random hulls',
    tolerance: 0.05,
    errorUnit: 'relative',
    run: () => editions((d) => Math.abs(median(d))),
  },
  {
    source: 'two independent fits to one towing-tank series (1998, 2008)',
    quantity: 'difference of the editions, rms over 1000 random hulls',
    tolerance: 0.1,
    errorUnit: 'relative',
    run: () => editions((d) => Math.sqrt(d.reduce((s, v) => s + v * v, 0) / d.length)),
  },
  ...TANK_FN.map(
    (fn, i): OutsideCheck => ({
      source: 'towing tank: Delft series 1, 20 hulls (Gerritsma, Onnink & Versluis 1981, open data)',
      quantity: `residuary resistance over weight x 1000 at Fn ${fn.toFixed(2)}, rms`,
      tolerance: TANK_RMS[i]!,
      errorUnit: '',
      note: 'the models carried keel and rudder: 0.0098 Fn^2 is added to the bare hull',
      run: () => {
        const d = tankDifferences(fn);
        const rms = Math.sqrt(d.reduce((s, v) => s + (v.model - v.tank) ** 2, 0) / d.length);
        return [{ name: `${d.length} hulls`, expected: 0, got: 1000 * rms, error: 1000 * rms }];
      },
    }),
  ),
  ...tankRows,
  {
    source: 'towing tank: Delft series 1, 20 hulls (open data)',
    quantity: 'shape after the best scale and offset per Fn, rms over mean',
    tolerance: 0.1,
    errorUnit: 'relative',
    run: () =>
      [0.3, 0.35, 0.4, 0.45].map((fn): OutsideCase => {
        const d = tankDifferences(fn);
        const n = d.length;
        const mx = d.reduce((s, v) => s + v.model, 0) / n;
        const my = d.reduce((s, v) => s + v.tank, 0) / n;
        const sxx = d.reduce((s, v) => s + (v.model - mx) ** 2, 0);
        const sxy = d.reduce((s, v) => s + (v.model - mx) * (v.tank - my), 0);
        const slope = sxy / sxx;
        const rms =
          Math.sqrt(d.reduce((s, v) => s + (my + slope * (v.model - mx) - v.tank) ** 2, 0) / n) / my;
        return { name: `Fn ${fn}`, expected: 0, got: rms, error: rms };
      }),
  },
  {
    source: 'Keuning & Sonnenberg 1998, effective span, against the lifting line used here',
    quantity: 'induced drag of a fin keel upright, Fn 0.35',
    tolerance: 0.17,
    errorUnit: 'relative',
    note: 'a 7 m keelboat; here the whole side force is carried on the keel span with the hull as mirror',
    run: () => {
      const [draft, tc, bwl] = [1.4, 0.335, 1.95];
      const te = effectiveSpans(draft, tc, bwl, 0.733, 0.35)[0]! * draft;
      const keel = weissinger({
        span: draft - tc,
        chordAt: (s) => 0.75 - 0.2 * s,
        sweep: 0.14,
        mirrored: true,
      });
      const ours = 1 / (2 * (draft - tc) ** 2 * keel.efficiency);
      const delft = 1 / (te * te);
      return [{ name: 'drag ratio', expected: delft, got: ours, error: Math.abs(ours / delft - 1) }];
    },
  },
];

function median(d: number[]): number {
  const s = [...d].sort((a, b) => a - b);
  return s[s.length >> 1]!;
}

function editions(measure: (d: number[]) => number): OutsideCase[] {
  const hulls = randomHulls(1000);
  return DELFT_2008.Fn.filter((f) => f <= 0.6 + 1e-9).map((fn) => {
    const i = DELFT_1998.Fn.findIndex((f) => Math.abs(f - fn) < 1e-9);
    const j = DELFT_2008.Fn.findIndex((f) => Math.abs(f - fn) < 1e-9);
    const d = hulls.map((h) => {
      const a = residuaryDelft1998(h)[i]!;
      const b = residuaryDelft2008(h)[j]!;
      return (a - b) / Math.max(0.5 * (a + b), 0.002);
    });
    const v = measure(d);
    return { name: `Fn ${fn.toFixed(2)}`, expected: 0, got: v, error: v };
  });
}
