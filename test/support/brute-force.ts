import { type ForceModel, RES, X } from '../../src/equilibrium/index.js';

/** Gaussian elimination with pivoting, written out so that the check shares nothing with the solver. */
function eliminate(n: number, a: number[][]): number[] | undefined {
  for (let k = 0; k < n; k++) {
    let p = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(a[i]![k]!) > Math.abs(a[p]![k]!)) p = i;
    if (!(Math.abs(a[p]![k]!) > 1e-14)) return undefined;
    [a[k], a[p]] = [a[p]!, a[k]!];
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const f = a[i]![k]! / a[k]![k]!;
      for (let j = k; j <= n; j++) a[i]![j]! -= f * a[k]![j]!;
    }
  }
  return a.map((r, i) => r[n]! / r[i]!);
}

/** Newton on some balances by plain differences; the surge left over, or undefined when it fails. */
function balance(
  model: ForceModel,
  tws: number,
  twa: number,
  x: Float64Array,
  free: readonly number[],
  rows: readonly number[],
): number | undefined {
  const c = new Float64Array(RES.count);
  const c1 = new Float64Array(RES.count);
  for (let it = 0; it < 30; it++) {
    model.residualInto(tws, twa, x, c);
    if (rows.every((r) => Math.abs(c[r]!) < 1e-9)) return c[RES.surge]!;
    const a = rows.map((r) => [...free.map(() => 0), c[r]!]);
    free.forEach((j, col) => {
      const keep = x[j]!;
      x[j] = keep + 1e-6;
      model.residualInto(tws, twa, x, c1);
      x[j] = keep;
      rows.forEach((r, i) => {
        a[i]![col] = (c1[r]! - c[r]!) / 1e-6;
      });
    });
    const d = eliminate(free.length, a);
    if (d === undefined) return undefined;
    const most = Math.max(
      ...free.map((j, i) => Math.abs(d[i]!) / (j === X.speed ? 0.5 * x[X.speed]! : j === X.arm ? 5 : 0.2)),
    );
    const s = most > 1 ? 1 / most : 1;
    free.forEach((j, i) => {
      x[j]! -= s * d[i]!;
    });
    if (!(x[X.speed]! > 1e-3) || Math.abs(x[X.leeway]!) > 0.9) return undefined;
  }
  return undefined;
}

/**
 * The highest speed at which everything balances within the limits, by going through board, heel, depower and speed
 * on a grid: at each the side force, heel and helm are balanced, and where the surplus of drive falls through zero the
 * speed is solved for. Slow and plain. 0 when there is none.
 */
export function bruteForceSpeed(
  model: ForceModel,
  tws: number,
  twa: number,
  heels: number,
  depowers: number,
  speeds: number,
): number {
  model.prepare?.(tws, twa);
  const { lower, upper } = model.bounds;
  const side = new Float64Array(Math.max(1, model.sideConditions));
  let best = 0;
  const hoists =
    upper[X.hoist]! > lower[X.hoist]!
      ? Array.from({ length: 3 }, (_, i) => lower[X.hoist]! + ((upper[X.hoist]! - lower[X.hoist]!) * i) / 2)
      : [upper[X.hoist]!];
  for (const hoist of hoists)
    for (let h = 0; h <= heels; h++) {
      for (let t = 0; t <= depowers; t++) {
        const x = new Float64Array(X.count);
        x[X.heel] = lower[X.heel]! + ((upper[X.heel]! - lower[X.heel]!) * h) / heels;
        x[X.hoist] = hoist;
        x[X.depower] = 0.98 * (1 - (1 - t / depowers) ** 1.5);
        let before: number | undefined;
        for (let k = speeds; k >= 0; k--) {
          x[X.speed] = model.speedScale * 0.02 * 130 ** (k / speeds);
          const s = balance(model, tws, twa, x, [X.leeway, X.rudder, X.arm], [RES.sway, RES.yaw, RES.roll]);
          if (s === undefined) {
            before = undefined;
            x[X.leeway] = 0;
            x[X.rudder] = 0;
            continue;
          }
          if (s > 0 && before !== undefined && before <= 0) {
            const y = x.slice();
            const done = balance(
              model,
              tws,
              twa,
              y,
              [X.speed, X.leeway, X.rudder, X.arm],
              [RES.surge, RES.sway, RES.roll, RES.yaw],
            );
            if (done !== undefined && y[X.speed]! > best) {
              model.residualInto(tws, twa, y, new Float64Array(RES.count));
              if (model.sideConditions > 0) model.sideConditionsInto(side);
              const holds =
                y[X.arm]! <= upper[X.arm]! &&
                y[X.arm]! >= lower[X.arm]! &&
                Math.abs(y[X.rudder]!) <= upper[X.rudder]! &&
                Math.abs(y[X.leeway]!) < upper[X.leeway]! &&
                side.every((v) => v <= 0);
              if (holds) best = y[X.speed]!;
            }
          }
          before = s;
        }
      }
    }
  return best;
}
