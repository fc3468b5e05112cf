import type { Course, WindTable } from '../racecourse/index.js';
import { fixed } from './numbers.js';
import { oneLine, shortened, wrapped } from './plain-text.js';
import { TEXT_WIDTH, textTable } from './text-table.js';

/** Variants shown of a sweep. */
const SHOWN = 12;

interface Line {
  readonly variant: string;
  readonly time_s: number | null;
  readonly sailed?: number;
  readonly refused?: string;
}

/** What came of a sweep, for a terminal: the quickest variants, and how many could not be timed. */
export function sweepText(boat: string, course: Course, wind: WindTable, lines: readonly string[]): string {
  const all = lines.map((l) => JSON.parse(l) as Line);
  const timed = all.filter((l) => l.time_s !== null);
  // A variant that cannot sail all winds has a time over fewer of them: it does not belong into one order with the rest.
  const whole = timed.filter((l) => l.sailed! > 1 - 1e-6).sort((a, b) => a.time_s! - b.time_s!);
  const refused = all.filter((l) => l.refused !== undefined);
  const parts = [
    `${shortened(oneLine(boat), 60)}: ${all.length} variants, ${course.name}`,
    wrapped(`wind: ${wind.words}`, TEXT_WIDTH, '  '),
    '',
    textTable(
      [
        { head: '', unit: '' },
        { head: 'variant', unit: '', left: true },
        { head: 'time', unit: 's/nmi' },
      ],
      whole
        .slice(0, SHOWN)
        .map((l, i) => [`${i + 1}`, shortened(oneLine(l.variant), 70), fixed(l.time_s!, 1)]),
    ),
  ];
  if (whole.length > SHOWN)
    parts.push(
      `and ${whole.length - SHOWN} more, the slowest ${fixed(whole[whole.length - 1]!.time_s!, 1)} s/nmi`,
    );
  const short = all.length - refused.length - whole.length;
  if (short > 0) parts.push(`${short} cannot sail the course in every wind: not ranked`);
  if (refused.length > 0)
    parts.push(
      `${refused.length} are no boats:`,
      ...refused
        .slice(0, 3)
        .map((l) => wrapped(`- ${oneLine(l.variant)}: ${oneLine(l.refused!)}`, TEXT_WIDTH, '  ')),
    );
  return parts.join('\n');
}
