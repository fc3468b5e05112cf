/** A point of a speed table: true wind angle [rad] and boat speed [m/s]. */
export interface SpeedPoint {
  readonly twa: number;
  readonly speed: number;
}

/** One true wind speed of a speed table. */
export interface SpeedRow {
  /** True wind speed [m/s]. */
  readonly tws: number;
  /** By rising angle, 0 to pi. */
  readonly points: readonly SpeedPoint[];
  /** Where best VMG is, up and down, if it is known. */
  readonly beat?: SpeedPoint | undefined;
  readonly gybe?: SpeedPoint | undefined;
}

/** Boat speeds over wind speed and angle, as routers and instruments hold them: nothing but speeds. SI and rad. */
export interface SpeedTable {
  readonly name: string;
  /** Height [m] at which the wind is quoted; undefined where a table does not say. */
  readonly windHeight: number | undefined;
  /** By rising wind speed. */
  readonly rows: readonly SpeedRow[];
}

/** The angles [rad] of a table whose rows all have the same ones; undefined where they differ. */
export function commonAngles(table: SpeedTable): readonly number[] | undefined {
  const first = table.rows[0]?.points.map((p) => p.twa) ?? [];
  const same = table.rows.every(
    (r) => r.points.length === first.length && r.points.every((p, j) => p.twa === first[j]),
  );
  return same ? first : undefined;
}

/** Speeds taken as a share of the predicted ones: `share` in every wind, times a share by wind speed. */
export interface Derating {
  readonly share: number;
  /** Rising wind speeds [m/s], each with its share; straight lines between, held beyond both ends. */
  readonly byWind: readonly { readonly tws: number; readonly share: number }[];
}

/** Nothing taken off. */
export const FULL_SPEED: Derating = { share: 1, byWind: [] };

/** The share of the predicted speed that is left in a wind of `tws` m/s. */
export function shareAt(derating: Derating, tws: number): number {
  const { share, byWind } = derating;
  if (byWind.length === 0) return share;
  const k = byWind.findIndex((p) => p.tws >= tws);
  if (k < 0) return share * byWind[byWind.length - 1]!.share;
  const b = byWind[k]!;
  if (k === 0) return share * b.share;
  const a = byWind[k - 1]!;
  const t = (tws - a.tws) / (b.tws - a.tws);
  return share * (a.share + t * (b.share - a.share));
}
