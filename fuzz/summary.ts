import type { Judged } from './worker.ts';

/** Counts of a run, plain data so that processes can hand theirs over. */
export interface Summary {
  readonly cases: number;
  /** by kind and outcome, e.g. `structure: closed` */
  readonly outcomes: Readonly<Record<string, number>>;
  readonly slowest: { readonly index: number; readonly kind: string; readonly ms: number } | null;
  readonly findings: readonly Judged[];
}

export const nothing: Summary = { cases: 0, outcomes: {}, slowest: null, findings: [] };

export function withCase(before: Summary, judged: Judged): Summary {
  const { index, kind, outcome, finding, ms } = judged;
  const one = { cases: 1, outcomes: { [`${kind}: ${outcome}`]: 1 }, slowest: { index, kind, ms } };
  return together(before, { ...one, findings: finding === null ? [] : [judged] });
}

export function together(a: Summary, b: Summary): Summary {
  const outcomes: Record<string, number> = { ...a.outcomes };
  for (const [name, count] of Object.entries(b.outcomes)) outcomes[name] = (outcomes[name] ?? 0) + count;
  const slowest = (b.slowest?.ms ?? 0) > (a.slowest?.ms ?? 0) ? b.slowest : a.slowest;
  return { cases: a.cases + b.cases, outcomes, slowest, findings: [...a.findings, ...b.findings] };
}
