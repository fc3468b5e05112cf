import { describe, expect, it } from 'vitest';
import { predictPolar } from '../../src/polar/index.js';
import { polarPage, polarReport } from '../../src/publish/index.js';
import { speedBands } from '../../src/racecourse/index.js';
import { demoBoat } from '../support/demo.js';

const KNOT = 1852 / 3600;
const DEG = Math.PI / 180;

describe('error bands of a polar', () => {
  const boat = demoBoat('keelboat');
  const polar = predictPolar(boat, {
    tws: [8, 14].map((v) => v * KNOT),
    twa: [40, 60, 90, 120, 150, 180].map((a) => a * DEG),
  });
  const bands = speedBands(boat, polar, 24, 1, 1);

  it('hold the prediction itself, and are a few per cent wide', () => {
    expect(bands).toHaveLength(2);
    for (const row of bands) {
      expect(row.length).toBeGreaterThan(4);
      for (const b of row) {
        expect(b.low).toBeLessThan(1);
        expect(b.high).toBeGreaterThan(1);
        expect(b.high - b.low).toBeGreaterThan(0.01);
        expect(b.high - b.low).toBeLessThan(0.4);
      }
    }
  });

  it('are the same for the same seed, and drawn on the page when they are there', () => {
    expect(speedBands(boat, polar, 24, 1, 1)).toEqual(bands);
    const bare = polarPage(polarReport(boat, polar));
    const drawn = polarPage(polarReport(boat, polar, { draws: 24, winds: bands }));
    expect(bare).toContain('No bands were computed');
    expect(drawn).toContain('eight in ten of 24 predictions');
    expect(drawn).toMatch(/"band":\{"angle":\[40/);
  });
});
