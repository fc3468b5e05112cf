/** Number of letters to change, add, drop or swap with a neighbour to turn one word into the other. */
export function editDistance(a: string, b: string): number {
  if (Math.abs(a.length - b.length) > 40 || a.length > 80) return Math.max(a.length, b.length);
  let before: number[] = [];
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let best = Math.min(row[j]! + 1, next[j - 1]! + 1, row[j - 1]! + same);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        best = Math.min(best, before[j - 2]! + 1);
      }
      next.push(best);
    }
    before = row;
    row = next;
  }
  return row[b.length]!;
}

/** The candidate nearest to a word, if it is near enough to be a slip of the pen. */
export function nearest(word: string, candidates: readonly string[]): string | undefined {
  const plain = (s: string): string => s.toLowerCase().replace(/[\s_-]+/g, '_');
  let best: string | undefined;
  let least = Math.max(2, Math.floor(word.length / 3)) + 1;
  for (const candidate of candidates) {
    const distance = editDistance(plain(word), plain(candidate));
    if (distance < least && distance < candidate.length) {
      least = distance;
      best = candidate;
    }
  }
  return best;
}
