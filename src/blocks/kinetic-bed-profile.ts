import type { RateLaw } from '../chemistry/rate-laws/rate-law.ts';
import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import type { BedChemistry } from './kinetic-bed-chemistry.ts';
import type { BedPath } from './kinetic-bed-path.ts';

/** The way of the gas through a bed, in columns of equal length that can be drawn. */
export interface BedProfile {
  readonly columns: Readonly<Record<string, unknown>>;
  readonly hottestK: number;
  readonly hottestPosition: number;
  readonly coldestK: number;
  /** null for a law without a published effectiveness */
  readonly effectivenessInlet: number | null;
  readonly effectivenessOutlet: number | null;
}

/** Points of the columns, the ends included, and stops of the march between two of them. */
const POINTS = 21;
const STOPS_PER_POINT = 4;

/** Follow the gas through the bed once more and note what is worth drawing. */
export function profileOf(
  path: BedPath,
  inlet: StreamState,
  law: RateLaw,
  chemistry: BedChemistry,
  mixture: Mixture,
): BedProfile {
  const { components } = mixture;
  const { reactions } = chemistry;
  const position: number[] = [];
  const temperature: number[] = [];
  const pressure: number[] = [];
  const fractions = components.map((): number[] => []);
  const rates = reactions.map((): number[] => []);
  const equilibrium = reactions.map((): (number | null)[] => []);
  const effectiveness: number[] = [];
  const stops: number[] = [];

  path.follow(inlet, STOPS_PER_POINT * (POINTS - 1), (place) => {
    stops.push(place.temperatureK);
    if ((stops.length - 1) % STOPS_PER_POINT !== 0) return;
    const { temperatureK, pressurePa, flowsMolPerS } = place;
    const total = flowsMolPerS.reduce((sum, flow) => sum + flow, 0);
    position.push(place.position);
    temperature.push(temperatureK);
    pressure.push(pressurePa / 1e5);
    fractions.forEach((column, i) => {
      column.push(flowsMolPerS[i] / total);
    });
    rates.forEach((column, k) => {
      column.push(place.rates[k]);
    });
    effectiveness.push(chemistry.effectiveness());
    equilibrium.forEach((column, k) => {
      column.push(chemistry.standing(k, temperatureK, pressurePa, flowsMolPerS).equilibriumK);
    });
  });

  const hottest = peakOf(stops);
  const perReaction = <V>(columns: readonly V[]) =>
    Object.fromEntries(reactions.map(({ name }, k) => [name, columns[k]]));
  return {
    columns: {
      position,
      temperature_K: temperature,
      pressure_bar: pressure,
      mole_fraction: Object.fromEntries(components.map(({ id }, i) => [id, fractions[i]])),
      [law.per === 'volume' ? 'rate_mol_m3_s' : 'rate_mol_kg_s']: perReaction(rates),
      equilibrium_K: perReaction(equilibrium),
    },
    hottestK: hottest.value,
    hottestPosition: hottest.at / (stops.length - 1),
    coldestK: Math.min(...stops),
    effectivenessInlet: law.effectiveness ? effectiveness[0] : null,
    effectivenessOutlet: law.effectiveness ? effectiveness.at(-1)! : null,
  };
}

/** Largest of a row of values, between two of them by the parabola through the three around it. */
function peakOf(values: readonly number[]): { readonly at: number; readonly value: number } {
  const at = values.indexOf(Math.max(...values));
  const here = values[at];
  const before = values[at - 1];
  const after = values[at + 1];
  if (before === undefined || after === undefined) return { at, value: here };
  const bend = before - 2 * here + after;
  if (!(bend < 0)) return { at, value: here };
  const shift = (before - after) / (2 * bend);
  return { at: at + shift, value: here - ((before - after) * shift) / 4 };
}
