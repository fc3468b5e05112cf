/** `npm run soak -- [combinations] [seed]`: random boats, winds and angles through the solver; counts what came out. */
import { soak } from '../support/soak.js';

const combinations = Number(process.argv[2] ?? 100_000);
const seed = Number(process.argv[3] ?? 1);
const confirm = Number(process.argv[4] ?? 0.01);
const t = process.hrtime.bigint();
const c = soak(combinations, seed, confirm, (done) => {
  if (process.stderr.isTTY) process.stderr.write(`\r${done}`);
});
if (process.stderr.isTTY) process.stderr.write('\n');
const seconds = Number(process.hrtime.bigint() - t) / 1e9;
const share = (n: number): string => `${((100 * n) / c.combinations).toFixed(2)} %`;
console.log(
  `combinations       ${c.combinations} (${c.refusedBoats} boats refused as unable to float or be built)`,
);
console.log(
  `balanced           ${c.balanced} (${share(c.balanced)}), worst residual ${c.worstResidual.toExponential(1)}`,
);
console.log(`not proven fastest  ${c.unproven} (${share(c.unproven)}) of the balanced, said so in a note`);
for (const [why, n] of Object.entries(c.unbalanced)) console.log(`${why.padEnd(19)}${n} (${share(n)})`);
console.log(`crashes            ${c.crashes.length}`);
console.log(`not a number       ${c.notNumbers.length}`);
console.log(
  `looked into        ${c.looked} answers without a state by brute force; contradicted ${c.contradicted.length}`,
);
for (const line of [...c.crashes, ...c.notNumbers, ...c.contradicted].slice(0, 40)) console.log(`  ${line}`);
console.log(
  `time               ${seconds.toFixed(0)} s, ${((1000 * seconds) / c.combinations).toFixed(2)} ms each`,
);
if (c.crashes.length + c.notNumbers.length > 0) process.exitCode = 1;
