import { terminalText } from '../publish/index.js';

export { printRaw } from './streams.js';

/** Results, for people: to standard output. */
export function print(text: string): void {
  process.stdout.write(`${terminalText(text)}\n`);
}

/** Messages: to standard error. */
export function say(text: string): void {
  process.stderr.write(`${terminalText(text)}\n`);
}
