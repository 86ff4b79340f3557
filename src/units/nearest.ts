/** Pairs of letters compared for one name: those of some thousand candidates, a few milliseconds. */
const MOST_COMPARED = 1_000_000;

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
  let compared = 0;
  for (const candidate of candidates) {
    if (candidate.toLowerCase() === lower) return candidate;
    const allowed = Math.max(1, Math.floor(Math.max(name.length, candidate.length) / 3));
    // Every letter more or less is a slip.
    if (Math.abs(candidate.length - name.length) > Math.min(allowed, 12, bestSlips)) continue;
    compared += Math.min(60, name.length) * Math.min(60, candidate.length);
    if (compared > MOST_COMPARED) break;
    const slips = countSlips(
      lower.slice(0, 60),
      candidate.toLowerCase().slice(0, 60),
      Math.min(allowed, bestSlips),
    );
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
 *
 * @param most  what is further apart than this need not be told: any number above it is given then
 * @source F. J. Damerau, Commun. ACM 7(3), 171-176 (1964); V. Levenshtein, Sov. Phys. Dokl. 10, 707 (1966)
 */
export function countSlips(a: string, b: string, most = Number.POSITIVE_INFINITY): number {
  const width = b.length + 1;
  let before = new Int32Array(width);
  let above = Int32Array.from({ length: width }, (_, j) => j);
  let row = new Int32Array(width);
  for (let i = 1; i <= a.length; i++) {
    row[0] = i;
    let least = i;
    for (let j = 1; j <= b.length; j++) {
      const changed = a.charCodeAt(i - 1) === b.charCodeAt(j - 1) ? 0 : 1;
      let slips = Math.min(above[j] + 1, row[j - 1] + 1, above[j - 1] + changed);
      if (
        i > 1 &&
        j > 1 &&
        a.charCodeAt(i - 1) === b.charCodeAt(j - 2) &&
        a.charCodeAt(i - 2) === b.charCodeAt(j - 1)
      ) {
        slips = Math.min(slips, before[j - 2] + 1);
      }
      row[j] = slips;
      if (slips < least) least = slips;
    }
    // A swap reaches back two rows, and adds one slip: from here it can get no better than this.
    if (least > most + 1) return least;
    [before, above, row] = [above, row, before];
  }
  return above[b.length];
}
