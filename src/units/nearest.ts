/**
 * The candidate a mistyped name most likely meant: equal but for upper and lower case first, then the one
 * with the fewest slips (letter left out, put in, changed, or two neighbours swapped), among equals the one
 * that begins alike.
 *
 * @returns null where nothing is near: more slips than about a third of the longer name, at least one
 */
export function nearest(name: string, candidates: Iterable<string>): string | null {
  const lower = name.toLowerCase();
  let best: string | null = null;
  let bestSlips = Number.POSITIVE_INFINITY;
  let bestPrefix = 0;
  for (const candidate of candidates) {
    if (candidate.toLowerCase() === lower) return candidate;
    if (Math.abs(candidate.length - name.length) > 12) continue;
    const allowed = Math.max(1, Math.floor(Math.max(name.length, candidate.length) / 3));
    const slips = countSlips(lower.slice(0, 60), candidate.toLowerCase().slice(0, 60));
    const prefix = commonPrefix(lower, candidate.toLowerCase());
    if (slips <= allowed && (slips < bestSlips || (slips === bestSlips && prefix > bestPrefix))) {
      best = candidate;
      bestSlips = slips;
      bestPrefix = prefix;
    }
  }
  return best;
}

function commonPrefix(a: string, b: string): number {
  let n = 0;
  while (n < a.length && a[n] === b[n]) n++;
  return n;
}

/**
 * Optimal string alignment distance of two short texts.
 * @source F. J. Damerau, Commun. ACM 7(3), 171-176 (1964); V. Levenshtein, Sov. Phys. Dokl. 10, 707 (1966)
 */
export function countSlips(a: string, b: string): number {
  let before: number[] = [];
  let above = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const changed = a[i - 1] === b[j - 1] ? 0 : 1;
      let slips = Math.min(above[j] + 1, row[j - 1] + 1, above[j - 1] + changed);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        slips = Math.min(slips, before[j - 2] + 1);
      }
      row.push(slips);
    }
    before = above;
    above = row;
  }
  return above[b.length];
}
