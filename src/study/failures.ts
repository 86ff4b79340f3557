/** Cases that failed for one reason. */
export interface FailureCount {
  /** as it was told of the first of them */
  readonly reason: string;
  readonly count: number;
  /** number of the first of them, from 1 */
  readonly first: number;
}

/** Failed cases by reason, the commonest first; reasons that differ in their numbers only are one. */
export function countFailures(notes: readonly string[], failed: (row: number) => boolean): FailureCount[] {
  const found = new Map<string, { reason: string; count: number; first: number }>();
  for (const [row, reason] of notes.entries()) {
    if (!failed(row)) continue;
    const kind = reason.replace(/(?<![\w.])[-+]?\d+(?:\.\d+)?(?:e[-+]?\d+)?/gi, '#');
    const before = found.get(kind);
    if (before === undefined) found.set(kind, { reason, count: 1, first: row + 1 });
    else before.count += 1;
  }
  return [...found.values()].sort((a, b) => b.count - a.count || a.first - b.first);
}
