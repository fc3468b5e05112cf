import { degrees } from '../units/index.js';
import { CAUTIONS } from './cautions.js';
import { csvText } from './csv.js';
import { decimalsFor, fixed, rounded, significant } from './numbers.js';
import { oneLine, shortened, wrapped } from './plain-text.js';
import { type SpeedUnit, speedIn, unitSuffix } from './table-format.js';
import { type PercentTable, percentOf, percentTable, type TargetCard, type TargetCell } from './targets.js';
import { type Column, TEXT_WIDTH, textTable } from './text-table.js';

/** How a card's figures are written. */
export interface TargetStyle {
  readonly unit: SpeedUnit;
  /** Decimals of speeds; angles carry one less. */
  readonly decimals: number;
}

/** A share as percent, without needless decimals: 0.912 is "91.2 %". */
export const percent = (share: number): string => `${Number((100 * share).toFixed(1))} %`;

/** What has been taken off: "91.2 % of the predicted speed: sea 96 %, crew 95 %". */
export function sharesText(card: TargetCard): string {
  if (card.shares.length === 0) return 'full predicted speed, nothing taken off';
  const parts = card.shares.map((s) => `${s.what} ${percent(s.share)}`).join(', ');
  return `${percent(card.share)} of the predicted speed: ${parts}`;
}

/** Rows of the card in the order they are read: every wind's targets up, down and reaching. */
function rowsOf(card: TargetCard): { course: string; tws: number; cell: TargetCell }[] {
  return card.winds.flatMap(({ tws, up, down, reach }) => [
    { course: 'up', tws, cell: up },
    { course: 'down', tws, cell: down },
    ...reach.map((cell) => ({ course: 'reach', tws, cell })),
  ]);
}

const usesBoard = (card: TargetCard): boolean =>
  rowsOf(card).some(({ cell }) => cell.ok && cell.state.boardDown < 0.995);

/** Room left for the names of sail sets. */
const SAILS_WIDTH = 14;

function targetRows(card: TargetCard, { unit, decimals }: TargetStyle): string {
  const d = decimalsFor(decimals);
  const board = usesBoard(card);
  const columns: Column[] = [
    { head: 'TWS', unit },
    { head: '', unit: '', left: true },
    { head: 'TWA', unit: 'deg' },
    { head: 'speed', unit },
    { head: 'VMG', unit },
    { head: 'AWA', unit: 'deg' },
    { head: 'AWS', unit },
    { head: 'heel', unit: 'deg' },
    { head: 'leeway', unit: 'deg' },
    { head: 'ease', unit: '' },
    { head: 'crew', unit: '' },
    ...(board ? [{ head: 'board', unit: '' }] : []),
    { head: 'sails', unit: '', left: true },
  ];
  const speed = (v: number): string => fixed(speedIn(unit, v), d.speed);
  const angle = (v: number): string => fixed(degrees(v), d.angle);
  const row = (tws: string, course: string, cell: TargetCell): string[] => {
    if (!cell.ok) return [tws, course, '', '', '', '', '', '', '', '', '', ...(board ? [''] : []), cell.why];
    const s = cell.state;
    return [
      tws,
      course,
      angle(s.twa),
      speed(cell.speed),
      speed(Math.abs(cell.vmg)),
      angle(cell.awa),
      speed(cell.aws),
      angle(s.heel),
      angle(s.leeway),
      fixed(s.ease, d.share),
      fixed(s.crewShare, d.share),
      ...(board ? [fixed(s.boardDown, d.share)] : []),
      shortened(oneLine(s.sailSet), SAILS_WIDTH),
    ];
  };
  return textTable(
    columns,
    card.winds.flatMap((w) => [row(fixed(speedIn(unit, w.tws), 1), 'up', w.up), row('', 'down', w.down)]),
  );
}

function reachRows(card: TargetCard, { unit, decimals }: TargetStyle): string {
  const columns: Column[] = [
    { head: 'TWS', unit },
    ...card.reachAngles.map((a) => ({ head: `${significant(degrees(a), 4)} deg`, unit })),
  ];
  return textTable(
    columns,
    card.winds.map((w) => [
      fixed(speedIn(unit, w.tws), 1),
      ...w.reach.map((c) => (c.ok ? fixed(speedIn(unit, c.speed), decimals) : c.why)),
    ]),
  );
}

/** Three figures: enough for two percent of any speed. */
export const threeFigures = (v: number): string => fixed(v, v < 9.995 ? 2 : 1);

/** A helper table as text: find the boat's speed below the wind, read the percent at the left. */
function percentRows(t: PercentTable, { unit }: TargetStyle): string {
  return textTable(
    [{ head: 'percent', unit: '%' }, ...t.tws.map((v) => ({ head: `${fixed(speedIn(unit, v), 1)}`, unit }))],
    t.rows.map((r) => [fixed(r.percent, 0), ...r.speeds.map((v) => threeFigures(speedIn(unit, v)))]),
  );
}

/** A boat speed [m/s] in percent of every target. */
function percentOfRows(card: TargetCard, speed: number, { unit }: TargetStyle): string {
  const cell = (p: number | undefined): string => (p === undefined ? '-' : fixed(p, 0));
  return textTable(
    [
      { head: 'TWS', unit },
      { head: 'up', unit: '%' },
      { head: 'down', unit: '%' },
      ...card.reachAngles.map((a) => ({ head: `${significant(degrees(a), 4)} deg`, unit: '%' })),
    ],
    percentOf(card, speed).map((r) => [
      fixed(speedIn(unit, r.tws), 1),
      ...[r.up, r.down, ...r.reach].map(cell),
    ]),
  );
}

/** What is printed beside the targets. */
export interface TargetExtras {
  /** The helper tables. */
  readonly percents: boolean;
  /** A boat speed [m/s] to be shown in percent of every target. */
  readonly boatSpeed?: number | undefined;
}

/** The card for a terminal: targets, reaches, and when asked for the percent of target. */
export function targetsText(card: TargetCard, style: TargetStyle, extras: TargetExtras): string {
  const name = shortened(oneLine(card.boatName), 60);
  const head = `${name}: targets, wind at ${significant(card.windHeight, 3)} m, ${style.unit}`;
  const reasons = rowsOf(card).flatMap(({ course, tws, cell }) => {
    if (cell.ok) return [];
    const place = course === 'reach' ? `${significant(degrees(cell.twa), 4)} deg` : course;
    const wind = `${fixed(speedIn(style.unit, tws), 1)} ${style.unit}`;
    return [wrapped(`${wind} ${place}: ${cell.why}. ${oneLine(cell.reason)}`, TEXT_WIDTH, '  ')];
  });
  const percents = (['up', 'down'] as const)
    .map((course) => percentTable(card, course))
    .filter((t) => t.tws.length > 0);
  return [
    head,
    wrapped(`Speeds: ${sharesText(card)}.`, TEXT_WIDTH),
    ...(card.label === '' ? [] : [shortened(oneLine(card.label), TEXT_WIDTH)]),
    '',
    'Best VMG',
    targetRows(card, style),
    ...(card.reachAngles.length > 0
      ? ['', 'Boat speed at reaching angles (TWA)', reachRows(card, style)]
      : []),
    ...(extras.percents
      ? percents.flatMap((t) => [
          '',
          `Percent of target, ${t.course}: find the boat speed below the wind speed`,
          percentRows(t, style),
        ])
      : []),
    ...(extras.boatSpeed === undefined
      ? []
      : [
          '',
          `${fixed(speedIn(style.unit, extras.boatSpeed), style.decimals)} ${style.unit} in percent of target`,
          percentOfRows(card, extras.boatSpeed, style),
        ]),
    ...(reasons.length > 0 ? ['', ...reasons] : []),
  ].join('\n');
}

/** The targets as comma-separated values (RFC 4180, CRLF): one row a target. */
export function targetsCsv(card: TargetCard, { unit, decimals }: TargetStyle): string {
  const d = decimalsFor(decimals);
  const u = unitSuffix(unit);
  const heads = [
    'course',
    `tws_${u}`,
    'twa_deg',
    `target_speed_${u}`,
    `vmg_${u}`,
    `aws_${u}`,
    'awa_deg',
    'heel_deg',
    'leeway_deg',
    'ease',
    'crew_share',
    'crew_arm_m',
    'board_down',
    'sails',
    'regime',
    'percent_of_prediction',
    `predicted_speed_${u}`,
    'wind_height_m',
    'status',
    'reason',
    'label',
  ];
  const speed = (v: number): string => fixed(speedIn(unit, v), d.speed);
  const angle = (v: number): string => fixed(degrees(v), d.angle);
  const lines = rowsOf(card).map(({ course, tws, cell }) => {
    const height = fixed(card.windHeight, 2);
    const label = csvText(oneLine(card.label));
    const off = fixed(100 * card.share, 1);
    if (!cell.ok) {
      // The angle of best VMG is not known where there is none.
      const twa = course === 'reach' ? angle(cell.twa) : '';
      const gap = new Array<string>(12).fill('');
      return [course, speed(tws), twa, ...gap, off, '', height, cell.why, csvText(cell.reason), label];
    }
    const s = cell.state;
    return [
      course,
      speed(tws),
      angle(s.twa),
      speed(cell.speed),
      speed(cell.vmg),
      speed(cell.aws),
      angle(cell.awa),
      angle(s.heel),
      angle(s.leeway),
      fixed(s.ease, d.share + 1),
      fixed(s.crewShare, d.share + 1),
      fixed(s.crewArm, 2),
      fixed(s.boardDown, d.share + 1),
      csvText(s.sailSet),
      csvText(s.regime),
      off,
      speed(s.speed),
      height,
      s.status,
      csvText(s.notes.join('; ')),
      label,
    ];
  });
  return `${[heads, ...lines].map((c) => c.join(',')).join('\r\n')}\r\n`;
}

/** The helper tables as comma-separated values: one row a percent and wind. */
export function percentCsv(card: TargetCard, { unit, decimals }: TargetStyle): string {
  const u = unitSuffix(unit);
  const lines = (['up', 'down'] as const).flatMap((course) => {
    const t = percentTable(card, course);
    return t.tws.flatMap((tws, i) =>
      t.rows.map((r) => [
        course,
        fixed(speedIn(unit, tws), decimals),
        fixed(r.percent, 0),
        fixed(speedIn(unit, r.speeds[i]!), decimals),
      ]),
    );
  });
  const heads = ['course', `tws_${u}`, 'percent_of_target', `boat_speed_${u}`];
  return `${[heads, ...lines].map((c) => c.join(',')).join('\r\n')}\r\n`;
}

/** The card as JSON; units stand in the keys. */
export function targetsJson(card: TargetCard, { unit }: TargetStyle): string {
  const u = unitSuffix(unit);
  const speed = (v: number): number | null => rounded(speedIn(unit, v));
  const cell = (c: TargetCell) =>
    c.ok
      ? {
          status: c.state.status,
          twa_deg: rounded(degrees(c.state.twa)),
          [`target_speed_${u}`]: speed(c.speed),
          [`vmg_${u}`]: speed(c.vmg),
          [`aws_${u}`]: speed(c.aws),
          awa_deg: rounded(degrees(c.awa)),
          heel_deg: rounded(degrees(c.state.heel)),
          leeway_deg: rounded(degrees(c.state.leeway)),
          ease: rounded(c.state.ease),
          crew_share: rounded(c.state.crewShare),
          crew_arm_m: rounded(c.state.crewArm),
          board_down: rounded(c.state.boardDown),
          sails: c.state.sailSet,
          regime: c.state.regime,
          [`predicted_speed_${u}`]: speed(c.state.speed),
        }
      : { status: 'unbalanced', why: c.why, reason: c.reason };
  return `${JSON.stringify(
    {
      content: 'targets',
      version: 1,
      boat: card.boatName,
      label: card.label,
      wind_height_m: rounded(card.windHeight),
      percent_of_prediction: rounded(100 * card.share),
      taken_off: card.shares.map((s) => ({ what: s.what, percent_left: rounded(100 * s.share) })),
      winds: card.winds.map((w) => ({
        [`tws_${u}`]: speed(w.tws),
        best_vmg_up: cell(w.up),
        best_vmg_down: cell(w.down),
        reaches: w.reach.map((c, k) => ({ at_twa_deg: rounded(degrees(card.reachAngles[k]!)), ...cell(c) })),
      })),
      cautions: CAUTIONS,
    },
    null,
    2,
  )}\n`;
}
