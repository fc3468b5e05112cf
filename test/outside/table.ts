import { allChecks } from './all.js';
import { runCheck } from './run.js';

const show = (v: number, unit: string): string => {
  if (v > 0 && v < 1e-9) return '< 1e-9';
  if (unit === 'relative') return `${(100 * v).toPrecision(2)} %`;
  const n = v === 0 ? '0' : Math.abs(v) < 1e-3 ? v.toExponential(1) : v.toPrecision(2);
  return unit === '' ? n : `${n} ${unit}`;
};

/** The table of comparisons with the outside as Markdown, good and bad, and how many are beyond their tolerance. */
export function accuracyTable(): { markdown: string; failed: number } {
  const lines = [
    '| source | quantity | cases | mean error | worst error | tolerance | |',
    '|---|---|---|---|---|---|---|',
  ];
  const notes: string[] = [];
  let failed = 0;
  for (const check of allChecks) {
    const r = runCheck(check);
    if (!r.passed && !check.printOnly) failed++;
    const verdict = r.passed ? 'ok' : check.printOnly ? 'outside' : 'FAILED';
    let mark = '';
    if (check.note) {
      notes.push(check.note);
      mark = ` [${notes.length}]`;
    }
    const unit = check.errorUnit;
    const worst = r.worst === 0 ? '0' : `${show(r.worst, unit)} (${r.worstCase})`;
    const tolerance = check.printOnly ? 'shown, not held to' : show(check.tolerance, unit);
    lines.push(
      `| ${check.source} | ${check.quantity}${check.showCases ? `: ${r.names.join(', ')}` : ''}${mark} | ${r.cases} | ${show(r.mean, unit)} | ${worst} | ${tolerance} | ${verdict} |`,
    );
  }
  lines.push('', ...notes.map((n, i) => `[${i + 1}] ${n}  `));
  return { markdown: lines.join('\n').trimEnd(), failed };
}
