import type { SailingResult, SailingState } from '../equilibrium/index.js';
import { fixed } from './numbers.js';
import { oneLine } from './plain-text.js';
import { figures, type StateFigures } from './report.js';
import { textTable } from './text-table.js';

/** What holding something costs: the held state beside the one where everything is chosen for speed. */
export function heldText(held: SailingState, free: SailingResult): string {
  const h = figures(held) as StateFigures;
  const f = figures(free);
  if (f.status === 'unbalanced')
    return `With everything free she finds no balance here: ${f.why}. ${oneLine(f.reason)}`;
  const row = (name: string, pick: (s: StateFigures) => number, unit: string, decimals: number): string[] => [
    name,
    fixed(pick(h), decimals),
    fixed(pick(f), decimals),
    fixed(pick(h) - pick(f), decimals),
    unit,
  ];
  return textTable(
    [
      { head: 'held against free', unit: '', left: true },
      { head: 'held', unit: '' },
      { head: 'free', unit: '' },
      { head: 'difference', unit: '' },
      { head: 'unit', unit: '', left: true },
    ],
    [
      row('boat speed', (s) => s.speedKn, 'kn', 3),
      row('VMG', (s) => s.vmgKn, 'kn', 3),
      row('heel', (s) => s.heelDeg, 'deg', 2),
      row('leeway', (s) => s.leewayDeg, 'deg', 2),
      row('rudder', (s) => s.rudderDeg, 'deg', 2),
      row('ease', (s) => s.ease, '', 3),
      row('crew', (s) => s.crewShare, '', 3),
      row('seconds per nautical mile', (s) => 3600 / s.speedKn, 's', 1),
    ],
  );
}
