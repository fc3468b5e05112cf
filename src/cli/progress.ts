/** A line that shows how far a long run is: on a terminal only, and gone when the run ends. */
export function progressLine(what: string, total: number): { show(done: number): void; end(): void } {
  const out = process.stderr;
  if (out.isTTY !== true || total <= 1) return { show: () => {}, end: () => {} };
  let shown = -1;
  return {
    show: (done) => {
      const percent = Math.floor((100 * done) / total);
      if (percent === shown) return;
      shown = percent;
      const full = Math.round(percent / 4);
      out.write(`\r${what} [${'='.repeat(full)}${' '.repeat(25 - full)}] ${done} of ${total}`);
    },
    end: () => out.write(`\r${' '.repeat(what.length + 60)}\r`),
  };
}
