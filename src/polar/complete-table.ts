import type { SailingResult, SailingState } from '../equilibrium/index.js';
import {
  type Derating,
  FULL_SPEED,
  type SpeedPoint,
  type SpeedRow,
  type SpeedTable,
  shareAt,
} from './speed-table.js';
import type { Polar } from './types.js';

/** How the cells of a complete table are filled where no state balances. */
export interface Completion {
  /** Closer to the wind than the closest state that balances: no speed, or a straight line down to zero at 0 deg. */
  readonly noGo: 'zero' | 'fade';
  /** Up to this wind speed [m/s] rows are added above the highest computed one; left out: none. */
  readonly top?: number | undefined;
  /** Those rows: the speeds of the highest computed wind, or falling from them in a straight line to zero at `top`. */
  readonly above: 'hold' | 'fade';
  readonly derating: Derating;
}

export const PLAIN_COMPLETION: Completion = { noGo: 'zero', above: 'hold', derating: FULL_SPEED };

/** A cell without a balanced state of its own, outside the no-go zone. */
export interface FilledCell {
  readonly tws: number;
  readonly twa: number;
  /** Why nothing balances there. */
  readonly why: string;
  /** What stands there: zero, or a straight line between the neighbouring angles. */
  readonly filledWith: 'zero' | 'straight line';
}

export interface CompleteTable {
  readonly table: SpeedTable;
  /** Cells beyond the no-go zone that had to be filled. */
  readonly filled: readonly FilledCell[];
  /** For every computed wind: the closest angle [rad] to the wind that balances; undefined where none does. */
  readonly closest: readonly { readonly tws: number; readonly twa: number | undefined }[];
}

const balanced = (r: SailingResult | undefined): r is SailingState => r?.status === 'balanced';

/** Speed in the no-go zone on the line to zero at 0 deg, held below the best VMG so that no router sails there. */
function faded(twa: number, closest: SpeedPoint, bestVmg: number): number {
  const line = (closest.speed * twa) / closest.twa;
  return Math.cos(twa) > 0 ? Math.min(line, Math.max(0, bestVmg) / Math.cos(twa)) : line;
}

function completeRow(
  results: readonly SailingResult[],
  best: SailingResult,
  noGo: Completion['noGo'],
): { points: SpeedPoint[]; filled: FilledCell[]; closest: number | undefined } {
  const first = results.findIndex(balanced);
  const filled: FilledCell[] = [];
  const closest = first < 0 ? undefined : (results[first] as SailingState);
  const vmg = results.reduce(
    (most, r) => (balanced(r) ? Math.max(most, r.vmg) : most),
    balanced(best) ? best.vmg : 0,
  );
  const points = results.map((r, j): SpeedPoint => {
    if (balanced(r)) return { twa: r.twa, speed: r.speed };
    if (closest === undefined || j < first) {
      if (closest === undefined && r.twa > 0)
        filled.push({ tws: r.tws, twa: r.twa, why: r.why, filledWith: 'zero' });
      return { twa: r.twa, speed: closest && noGo === 'fade' ? faded(r.twa, closest, vmg) : 0 };
    }
    // A fault of the search, not of the boat: she sails at the angles on both sides.
    const a = results.slice(0, j).findLast(balanced)!;
    const b = results.slice(j + 1).find(balanced);
    if (r.why === 'not converged' && b !== undefined) {
      filled.push({ tws: r.tws, twa: r.twa, why: r.why, filledWith: 'straight line' });
      const t = (r.twa - a.twa) / (b.twa - a.twa);
      return { twa: r.twa, speed: a.speed + t * (b.speed - a.speed) };
    }
    filled.push({ tws: r.tws, twa: r.twa, why: r.why, filledWith: 'zero' });
    return { twa: r.twa, speed: 0 };
  });
  return { points, filled, closest: closest?.twa };
}

const scaled = (points: readonly SpeedPoint[], share: number): SpeedPoint[] =>
  points.map((p) => ({ twa: p.twa, speed: p.speed * share }));
const pointOf = (r: SailingResult): SpeedPoint | undefined =>
  balanced(r) ? { twa: r.twa, speed: r.speed } : undefined;

/**
 * The complete rectangle of a polar, without holes: angles from 0 to pi, wind speeds from 0 (at rest) up. Nothing is
 * interpolated where a state balances. Angles the polar lacks below its first one lie in the no-go zone.
 * @throws RangeError when the polar does not reach pi, or has no wind above 0
 */
export function completeTable(polar: Polar, completion: Completion = PLAIN_COMPLETION): CompleteTable {
  const { noGo, top, above, derating } = completion;
  const order = polar.twa.map((_, j) => j).sort((a, b) => polar.twa[a]! - polar.twa[b]!);
  const widest = polar.twa[order[order.length - 1] ?? 0] ?? 0;
  if (Math.abs(widest - Math.PI) > 1e-9)
    throw new RangeError('the polar of a complete table must reach 180 deg');
  const winds = polar.tws.map((_, i) => i).filter((i) => polar.tws[i]! > 0);
  if (winds.length === 0) throw new RangeError('a complete table needs a wind above 0');
  winds.sort((a, b) => polar.tws[a]! - polar.tws[b]!);
  const filled: FilledCell[] = [];
  const closest: { tws: number; twa: number | undefined }[] = [];
  const computed = winds.map((i): SpeedRow => {
    const tws = polar.tws[i]!;
    const head: SailingResult = {
      status: 'unbalanced',
      tws,
      twa: 0,
      why: 'no drive',
      reason: '',
      evaluations: 0,
    };
    const results = order.map((j) => polar.results[i]![j]!);
    const row = completeRow(results[0]!.twa > 0 ? [head, ...results] : results, polar.bestUp[i]!, noGo);
    filled.push(...row.filled);
    closest.push({ tws, twa: row.closest });
    return { tws, points: row.points, beat: pointOf(polar.bestUp[i]!), gybe: pointOf(polar.bestDown[i]!) };
  });
  const last = computed[computed.length - 1]!;
  const beyond = top !== undefined && top > last.tws ? [...derating.byWind.map((p) => p.tws), top] : [];
  const rows: SpeedRow[] = [
    { tws: 0, points: scaled(last.points, 0) },
    ...computed,
    ...[...new Set(beyond)]
      .filter((tws) => tws > last.tws && tws <= top!)
      .map((tws) => {
        const share = above === 'fade' ? (top! - tws) / (top! - last.tws) : 1;
        return { tws, points: scaled(last.points, share) };
      }),
  ];
  const derated = rows.map((r): SpeedRow => {
    const by = (points: readonly SpeedPoint[]) => scaled(points, shareAt(derating, r.tws));
    const [beat] = by(r.beat ? [r.beat] : []);
    const [gybe] = by(r.gybe ? [r.gybe] : []);
    return { tws: r.tws, points: by(r.points), beat, gybe };
  });
  return { table: { name: polar.boatName, windHeight: polar.windHeight, rows: derated }, filled, closest };
}
