import type { StreamState } from '../model/stream.ts';
import type { BlockReport } from './block.ts';

/** A report in which only what is worth saying has been filled in. */
export function quietReport(said: Partial<BlockReport> = {}): BlockReport {
  return {
    dutyW: 0,
    powerW: 0,
    driveLossW: 0,
    refrigerationW: 0,
    details: {},
    warnings: [],
    faults: [],
    assumptions: [],
    curves: () => ({}),
    ...said,
  };
}

/** A property that is worked out when it is first read, for what a study of thousands of cases may never ask. */
export function lazily(work: () => unknown): PropertyDescriptor {
  let known: { readonly value: unknown } | null = null;
  const get = (): unknown => {
    known ??= { value: work() };
    return known.value;
  };
  return { enumerable: true, get };
}

/** Enthalpy that a block adds to its streams: what leaves less what enters [W]. */
export function enthalpyAdded(inlets: readonly StreamState[], outlets: readonly StreamState[]): number {
  let sum = 0;
  for (const out of outlets) sum += out.enthalpyW;
  for (const inlet of inlets) sum -= inlet.enthalpyW;
  return sum;
}
