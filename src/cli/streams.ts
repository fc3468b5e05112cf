let guarded = false;

/** A reader that closes the pipe early ("| head") is no failure: what is left is dropped. */
export function guardPipes(): void {
  if (guarded) return;
  guarded = true;
  for (const stream of [process.stdout, process.stderr]) {
    stream.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code !== 'EPIPE') throw error;
    });
  }
}

/** Text to standard output, as it is. */
export function printRaw(text: string): void {
  process.stdout.write(text);
}
