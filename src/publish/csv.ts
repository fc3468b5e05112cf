import type { SailingResult } from '../equilibrium/index.js';
import { type Decimals, decimalsFor, fixed } from './numbers.js';
import { figures, type PolarReport } from './report.js';

/** Headers of the polar's table, in order. */
export const POLAR_COLUMNS = [
  'row',
  'tws_kn',
  'twa_deg',
  'twa_from_heading_deg',
  'boat_speed_kn',
  'vmg_kn',
  'aws_kn',
  'awa_deg',
  'heel_deg',
  'leeway_deg',
  'rudder_deg',
  'ease',
  'crew_share',
  'board_down',
  'sails',
  'regime',
  'status',
  'reason',
] as const;

/**
 * A cell of free text. A spreadsheet would run a text that begins like a formula: such texts get an apostrophe in
 * front. Quoted where RFC 4180 asks for it.
 */
export function csvText(text: string): string {
  const risky = /^\s*[=+\-@|\uff1d\uff0b\uff0d\uff20]|^[\t\r\n]/.test(text);
  return quoted(risky ? `'${text}` : text);
}

function quoted(cell: string): string {
  return /[",\r\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}

function polarRow(row: string, result: SailingResult, d: Decimals): string {
  const f = figures(result);
  const head = [row, fixed(f.twsKn, d.speed), fixed(f.twaDeg, d.angle)];
  if (f.status === 'unbalanced')
    return [...head, ...new Array<string>(13).fill(''), f.why, csvText(f.reason)].join(',');
  return [
    ...head,
    fixed(f.twaHeadingDeg, d.angle),
    fixed(f.speedKn, d.speed),
    fixed(f.vmgKn, d.speed),
    fixed(f.awsKn, d.speed),
    fixed(f.awaDeg, d.angle),
    fixed(f.heelDeg, d.angle),
    fixed(f.leewayDeg, d.angle),
    fixed(f.rudderDeg, d.angle),
    fixed(f.ease, d.share + 1),
    fixed(f.crewShare, d.share + 1),
    fixed(f.boardDown, d.share + 1),
    csvText(f.sailSet),
    csvText(f.regime),
    f.status,
    csvText(f.notes.join('; ')),
  ].join(',');
}

/**
 * The polar as comma-separated values (RFC 4180, CRLF): every state of the grid, then the best-VMG states. A state
 * that does not balance has empty figures, its kind under `status` and its cause under `reason`.
 * @param decimals of speeds; angles carry one less
 */
export function polarCsv(report: PolarReport, decimals = 3): string {
  const d = decimalsFor(decimals);
  const { polar } = report;
  const lines: string[] = [POLAR_COLUMNS.join(',')];
  polar.results.forEach((row, i) => {
    for (const state of row) lines.push(polarRow('grid', state, d));
    lines.push(polarRow('best VMG up', polar.bestUp[i]!, d));
    lines.push(polarRow('best VMG down', polar.bestDown[i]!, d));
    lines.push(polarRow('fastest', polar.fastest[i]!, d));
  });
  return `${lines.join('\r\n')}\r\n`;
}
