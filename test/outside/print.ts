/** `npm run accuracy`: the table of comparisons with the outside, good and bad, as Markdown. */
import { allChecks } from './all.js';
import { runCheck } from './run.js';

const show = (v: number, unit: string): string => {
  if (unit === 'relative') return `${(100 * v).toPrecision(2)} %`;
  const n = v === 0 ? '0' : Math.abs(v) < 1e-3 ? v.toExponential(1) : v.toPrecision(2);
  return unit === '' ? n : `${n} ${unit}`;
};

console.log('| source | quantity | cases | mean error | worst error | tolerance | |');
console.log('|---|---|---|---|---|---|---|');
let failed = 0;
for (const check of allChecks) {
  const r = runCheck(check);
  const verdict = r.passed ? 'ok' : check.printOnly ? 'outside, see note' : 'FAILED';
  if (!r.passed && !check.printOnly) failed++;
  const unit = check.errorUnit;
  console.log(
    `| ${check.source} | ${check.quantity}${check.note ? ` (${check.note})` : ''} | ${r.cases} | ${show(r.mean, unit)} | ${show(r.worst, unit)} (${r.worstCase}) | ${show(check.tolerance, unit)} | ${verdict} |`,
  );
}
if (failed > 0) {
  console.error(`${failed} comparison(s) beyond their tolerance`);
  process.exitCode = 1;
}
