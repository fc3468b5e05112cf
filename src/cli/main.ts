import { createRequire } from 'node:module';
import { choose } from './commands.js';
import { UsageError } from './errors.js';
import { guardPipes, printRaw } from './streams.js';

/** Exit codes. */
export const EXIT = { fine: 0, internal: 1, usage: 2 } as const;

function ownVersion(): string {
  const { version } = createRequire(import.meta.url)('../../package.json') as { version: string };
  return version;
}

/**
 * Runs one command line (without the program's own name). Results go to standard output, messages to standard error.
 * @returns the exit code: 0 fine, 2 something the user can put right, 1 internal failure
 */
export async function main(argv: readonly string[]): Promise<number> {
  guardPipes();
  try {
    const chosen = await choose(argv, ownVersion());
    if (chosen.kind === 'text') printRaw(`${chosen.text}\n`);
    else await chosen.run();
    return EXIT.fine;
  } catch (error) {
    return await failed(error);
  }
}

async function failed(error: unknown): Promise<number> {
  const { say } = await import('./output.js');
  if (error instanceof UsageError) {
    say(error.message);
    if (error.help !== undefined) say(`See: ${error.help}`);
    return EXIT.usage;
  }
  if (error instanceof Error && error.name === 'OutputError') {
    say(error.message);
    return EXIT.usage;
  }
  const message = error instanceof Error ? error.message : String(error);
  say(`Internal failure: ${message}`);
  const stack = error instanceof Error ? error.stack : undefined;
  if (process.env.POLARWRIGHT_DEBUG === '1' && stack !== undefined) say(stack);
  else say('This is a fault of the program. POLARWRIGHT_DEBUG=1 in the environment shows where.');
  return EXIT.internal;
}
