import type { BlockReport } from '../blocks/block.ts';
import type { LedgerEntry, Result } from '../model/result.ts';
import type { StreamState } from '../model/stream.ts';
import type { Plant } from './plant.ts';
import { KMOL_H } from './stream-results.ts';

/** Flows over the battery limit and what the reactors do, per component [mol/s]. */
export interface Tallied {
  readonly entering: Float64Array;
  readonly leaving: Float64Array;
  readonly formed: Float64Array;
  readonly consumed: Float64Array;
}

/** Count what enters, leaves, is formed and is consumed. */
export function count(plant: Plant): Tallied {
  const size = plant.mixture.size;
  const sumOf = (states: readonly StreamState[]) => {
    const sum = new Float64Array(size);
    for (const state of states) for (let i = 0; i < size; i++) sum[i] += state.flowsMolPerS[i];
    return sum;
  };
  const formed = new Float64Array(size);
  const consumed = new Float64Array(size);
  plant.kinds.forEach((kind, b) => {
    if (!kind.reactionsIn) return;
    const out = sumOf(plant.outlets[b]);
    const into = sumOf(plant.inlets[b]);
    for (let i = 0; i < size; i++) {
      const made = out[i] - into[i];
      if (made > 0) formed[i] += made;
      else consumed[i] -= made;
    }
  });
  return {
    entering: sumOf(plant.enters.map((s) => plant.streams[s])),
    leaving: sumOf(plant.leaves.map((s) => plant.streams[s])),
    formed,
    consumed,
  };
}

/** The ledger of the result: kmol/h per component, with each exit by its tag; closure relative to what comes in. */
export function ledger(plant: Plant, tallied: Tallied): Record<string, LedgerEntry> {
  const { entering, leaving, formed, consumed } = tallied;
  return Object.fromEntries(
    plant.mixture.components.map((component, i) => {
      const gained = entering[i] + formed[i];
      const open = gained - consumed[i] - leaving[i];
      return [
        component.id,
        {
          in: entering[i] * KMOL_H,
          formed: formed[i] * KMOL_H,
          consumed: consumed[i] * KMOL_H,
          out: Object.fromEntries(
            plant.leaves.map((s) => [
              plant.flowsheet.streams[s].tag,
              plant.streams[s].flowsMolPerS[i] * KMOL_H,
            ]),
          ),
          closure: gained > 0 ? open / gained : 0,
        },
      ];
    }),
  );
}

/**
 * Relative closures over the battery limit: mass, atoms by element, energy.
 * Energy: (Σ H in + Σ heat + Σ work given to the process − Σ H out) / (Σ|H in| + Σ|H out| + Σ|heat| + Σ|work|).
 */
export function closures(plant: Plant, tallied: Tallied, reports: readonly BlockReport[]): Result['closure'] {
  const { components } = plant.mixture;
  const weighted = (flows: Float64Array, weight: (i: number) => number) =>
    flows.reduce((sum, flow, i) => sum + flow * weight(i), 0);
  const relative = (weight: (i: number) => number) => {
    const into = weighted(tallied.entering, weight);
    return into > 0 ? (into - weighted(tallied.leaving, weight)) / into : 0;
  };
  const elements = [...new Set(components.flatMap((c) => Object.keys(c.elements)))].sort();
  const enthalpies = (list: readonly number[]) => list.map((s) => plant.streams[s].enthalpyW);
  const into = enthalpies(plant.enters);
  const out = enthalpies(plant.leaves);
  const heat = reports.map((r) => r.dutyW);
  const work = reports.map((r) => r.powerW - r.driveLossW);
  const sum = (list: readonly number[]) => list.reduce((total, value) => total + value, 0);
  const size = sum([...into, ...out, ...heat, ...work].map(Math.abs));
  return {
    mass: relative((i) => components[i].molarMassKgPerMol),
    atoms: Object.fromEntries(elements.map((e) => [e, relative((i) => components[i].elements[e] ?? 0)])),
    energy: size > 0 ? (sum(into) + sum(heat) + sum(work) - sum(out)) / size : 0,
  };
}
