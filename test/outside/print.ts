/** `npm run accuracy`: prints the table of comparisons with the outside; `--readme` also puts it into the README. */
import { readFileSync, writeFileSync } from 'node:fs';
import { accuracyTable } from './table.js';

export const BEGIN = '<!-- accuracy: begin -->';
export const END = '<!-- accuracy: end -->';

const { markdown, failed } = accuracyTable();
console.log(markdown);
if (process.argv.includes('--readme')) {
  const readme = readFileSync('README.md', 'utf8');
  const a = readme.indexOf(BEGIN);
  const b = readme.indexOf(END);
  if (a < 0 || b < a) throw new Error('README.md has no place for the accuracy table');
  writeFileSync('README.md', `${readme.slice(0, a + BEGIN.length)}\n${markdown}\n${readme.slice(b)}`);
}
if (failed > 0) {
  console.error(`${failed} comparison(s) beyond their tolerance`);
  process.exitCode = 1;
}
