import type { ForceBalance, ForceRow, SailingResult } from '../equilibrium/index.js';
import { CAUTIONS } from './cautions.js';
import { decimalsFor, fixed, significant } from './numbers.js';
import { oneLine, shortened, wrapped } from './plain-text.js';
import { type BoatFacts, figures, type PolarReport, type StateFigures } from './report.js';

/** Widest line of any table for the terminal. */
export const TEXT_WIDTH = 100;

export interface Column {
  readonly head: string;
  readonly unit: string;
  readonly left?: boolean;
}

const width = (s: string): number => [...s].length;

/** A table in plain text: headers, units, a rule, rows. Texts to the left, figures to the right. */
export function textTable(columns: readonly Column[], rows: readonly (readonly string[] | 'rule')[]): string {
  const units = columns.some((c) => c.unit !== '');
  const widths = columns.map((c, j) =>
    Math.max(width(c.head), width(c.unit), ...rows.map((r) => (r === 'rule' ? 0 : width(r[j] ?? '')))),
  );
  const line = (cells: readonly string[]): string =>
    columns
      .map((c, j) => {
        const cell = cells[j] ?? '';
        const pad = ' '.repeat(Math.max(0, widths[j]! - width(cell)));
        return c.left ? cell + pad : pad + cell;
      })
      .join('  ')
      .trimEnd();
  const rule = '-'.repeat(widths.reduce((a, b) => a + b + 2, -2));
  return [
    line(columns.map((c) => c.head)),
    ...(units ? [line(columns.map((c) => c.unit))] : []),
    rule,
    ...rows.map((r) => (r === 'rule' ? rule : line(r))),
  ].join('\n');
}

const TARGET_COLUMNS: readonly Column[] = [
  { head: 'TWS', unit: 'kn' },
  { head: '', unit: '', left: true },
  { head: 'TWA', unit: 'deg' },
  { head: 'speed', unit: 'kn' },
  { head: 'VMG', unit: 'kn' },
  { head: 'AWA', unit: 'deg' },
  { head: 'heel', unit: 'deg' },
  { head: 'leeway', unit: 'deg' },
  { head: 'ease', unit: '' },
  { head: 'crew', unit: '' },
  { head: 'regime', unit: '', left: true },
  { head: 'sails', unit: '', left: true },
];

/** Room left for the names of sail sets in the target table. */
const SAILS_WIDTH = 14;

/**
 * Target table: for every wind speed the states of best VMG upwind and downwind. `ease` is the share of heeling
 * moment given up, `crew` the crew's arm as a share of fully out.
 */
export function targetTable(report: PolarReport, decimals = 2): string {
  const d = decimalsFor(decimals);
  const { polar, boat } = report;
  const rows: string[][] = [];
  const notes: string[] = [];
  const add = (tws: string, course: string, result: SailingResult): void => {
    const f = figures(result);
    if (f.status === 'unbalanced') {
      rows.push([tws, course, '', '', '', '', '', '', '', '', f.why]);
      notes.push(
        wrapped(`${fixed(f.twsKn, 1)} kn ${course}: ${f.why}. ${oneLine(f.reason)}`, TEXT_WIDTH, '  '),
      );
      return;
    }
    rows.push([
      tws,
      course,
      fixed(f.twaDeg, d.angle),
      fixed(f.speedKn, d.speed),
      fixed(Math.abs(f.vmgKn), d.speed),
      fixed(f.awaDeg, d.angle),
      fixed(f.heelDeg, d.angle),
      fixed(f.leewayDeg, d.angle),
      fixed(f.ease, d.share),
      fixed(f.crewShare, d.share),
      f.regime,
      shortened(oneLine(f.sailSet), SAILS_WIDTH),
    ]);
  };
  polar.tws.forEach((_, i) => {
    const tws = fixed(figures(polar.bestUp[i]!).twsKn, 1);
    add(tws, 'up', polar.bestUp[i]!);
    add('', 'down', polar.bestDown[i]!);
  });
  const title = `${shortened(oneLine(boat.name), 60)}: best VMG, wind at ${significant(polar.windHeight, 3)} m`;
  return [title, '', textTable(TARGET_COLUMNS, rows), ...(notes.length > 0 ? ['', ...notes] : [])].join('\n');
}

/** The cautions, one a paragraph, wrapped. */
export function cautionText(): string {
  return ['Cautions', ...CAUTIONS.map((c) => wrapped(`- ${c}`, TEXT_WIDTH, '  '))].join('\n');
}

function stateLines(f: StateFigures): string {
  const line = (name: string, value: string, unit: string): string[] => [name, value, unit];
  return textTable(
    [
      { head: 'state', unit: '', left: true },
      { head: 'value', unit: '' },
      { head: 'unit', unit: '', left: true },
    ],
    [
      line('true wind speed', fixed(f.twsKn, 2), 'kn'),
      line('true wind angle, from the course', fixed(f.twaDeg, 2), 'deg'),
      line('true wind angle, from the heading', fixed(f.twaHeadingDeg, 2), 'deg'),
      line('apparent wind speed', fixed(f.awsKn, 2), 'kn'),
      line('apparent wind angle, from the heading', fixed(f.awaDeg, 2), 'deg'),
      line('boat speed', fixed(f.speedKn, 3), 'kn'),
      line('VMG', fixed(f.vmgKn, 3), 'kn'),
      line('heel', fixed(f.heelDeg, 2), 'deg'),
      line('leeway', fixed(f.leewayDeg, 2), 'deg'),
      line('rudder', fixed(f.rudderDeg, 2), 'deg'),
      line('ease (share of heeling moment given up)', fixed(f.ease, 3), ''),
      line('crew (share of the arm fully out)', fixed(f.crewShare, 3), ''),
      ...(f.boardDown < 1 ? [line('board (share lowered)', fixed(f.boardDown, 3), '')] : []),
      line('sails', shortened(oneLine(f.sailSet), 40), ''),
      line('regime', f.regime, ''),
      ...f.notes.map((n) => line('note', shortened(oneLine(n), 50), '')),
    ],
  );
}

const GROUPS: readonly ForceRow['group'][] = ['air', 'water', 'weight'];

/** One state: its header, every force and moment by group with sums, and the facts beside them. */
export function balanceText(boat: BoatFacts, balance: ForceBalance): string {
  const f = figures(balance.state) as StateFigures;
  const rows: (readonly string[] | 'rule')[] = [];
  const cells = (
    group: string,
    name: string,
    r: { forward: number; leeward: number; roll: number; yaw: number },
  ): readonly string[] => [
    group,
    shortened(oneLine(name), 44),
    fixed(r.forward, 1),
    fixed(r.leeward, 1),
    fixed(r.roll, 1),
    fixed(r.yaw, 1),
  ];
  for (const group of GROUPS) {
    const members = balance.rows.filter((r) => r.group === group);
    if (members.length === 0) continue;
    const sum = { forward: 0, leeward: 0, roll: 0, yaw: 0 };
    members.forEach((r, i) => {
      rows.push(cells(i === 0 ? group : '', r.name, r));
      sum.forward += r.forward;
      sum.leeward += r.leeward;
      sum.roll += r.roll;
      sum.yaw += r.yaw;
    });
    rows.push(cells('', `= ${group}, together`, sum));
    rows.push('rule');
  }
  rows.push(cells('sum', '', balance.sum));
  const forces = textTable(
    [
      { head: 'from', unit: '', left: true },
      { head: 'force or moment', unit: '', left: true },
      { head: 'forward', unit: 'N' },
      { head: 'leeward', unit: 'N' },
      { head: 'heeling', unit: 'N m' },
      { head: 'yaw', unit: 'N m' },
    ],
    rows,
  );
  const facts = textTable(
    [
      { head: 'beside the table', unit: '', left: true },
      { head: 'value', unit: '' },
      { head: 'unit', unit: '', left: true },
    ],
    balance.facts.map((x) => [shortened(oneLine(x.name), 60), significant(x.value), x.unit]),
  );
  const key = wrapped(
    'forward: along the course. leeward: across it. heeling: to leeward positive, about the fore-and-aft axis. ' +
      'yaw: bow to windward positive. Sums are taken before rounding; the last row is what the solver left over.',
    TEXT_WIDTH,
  );
  return [shortened(oneLine(boat.name), 80), '', stateLines(f), '', forces, '', key, '', facts].join('\n');
}

/** The boat's derived quantities by section, what was estimated, and what lies outside a method's range. */
export function boatText(boat: BoatFacts): string {
  const parts: string[] = [shortened(oneLine(boat.name), 80)];
  if (oneLine(boat.note) !== '') parts.push(wrapped(boat.note, TEXT_WIDTH));
  const rows: string[][] = [];
  let section = '';
  for (const r of boat.description) {
    const value = typeof r.value === 'number' ? significant(r.value) : shortened(oneLine(r.value), 20);
    const lines = wrapped(r.quantity, 50, '  ')
      .split('\n')
      .map((l) => shortened(l, 50));
    lines.forEach((line, i) => {
      const last = i === lines.length - 1;
      const part = i > 0 || r.section === section ? '' : r.section;
      rows.push([part, line, ...(last ? [value, r.unit] : [])]);
    });
    section = r.section;
  }
  parts.push(
    '',
    textTable(
      [
        { head: 'part', unit: '', left: true },
        { head: 'quantity', unit: '', left: true },
        { head: 'value', unit: '' },
        { head: 'unit', unit: '', left: true },
      ],
      rows,
    ),
  );
  parts.push('', `Estimated, for want of a value in the file: ${boat.estimates.length}`);
  for (const e of boat.estimates) parts.push(wrapped(`- ${e.key} = ${e.value}: ${e.rule}`, TEXT_WIDTH, '  '));
  parts.push('', `Outside the range of a method: ${boat.warnings.length}`);
  for (const w of boat.warnings) parts.push(wrapped(`- ${warningText(w)}`, TEXT_WIDTH, '  '));
  return parts.join('\n');
}

/** A range warning in one sentence. */
export function warningText(w: BoatFacts['warnings'][number]): string {
  return (
    `${w.parameter} is ${significant(w.value)}, outside ${significant(w.range[0])} to ` +
    `${significant(w.range[1])} of ${w.method}: ${w.treatment}`
  );
}
