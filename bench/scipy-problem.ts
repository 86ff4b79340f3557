import type { Flowsheet } from '../src/model/flowsheet.ts';
import { gasInteractions } from '../src/properties/binary-interaction.ts';
import { liquidVolume } from '../src/properties/liquid-volume.ts';
import { lnVapourPressure } from '../src/properties/vapour-pressure.ts';
import { createPlant } from '../src/tally/plant.ts';

/** What scipy_loop.py is handed: the reference loop in the constants a user would have in his own script. */
export interface ScipyProblem {
  readonly components: readonly {
    readonly id: string;
    readonly criticalK: number;
    readonly criticalPa: number;
    readonly acentricFactor: number;
    /** null where the volume is not shifted */
    readonly rackettZ: number | null;
    readonly hydrogen: boolean;
    /** a1..a7, b1, b2 */
    readonly nasa: readonly number[];
  }[];
  /** makeup by component [mol/s] */
  readonly feed: readonly number[];
  readonly nu: readonly number[];
  readonly purgeFraction: number;
  /** index of what condenses */
  readonly product: number;
  readonly converter: Place & { readonly approachK: number };
  readonly condenser: Place & {
    /** A, B, C of log10(P/bar) = A − B/(T + C) */
    readonly antoine: readonly [number, number, number];
    readonly liquidVolumeM3PerMol: number;
  };
  /** relative error of the flows at which an answer counts as right */
  readonly tolerance: number;
  /** solves per method, of which the quickest time is told; fewer of what takes long */
  readonly rounds: number;
  /** whether the loop tuned by hand is to run, instead of the plain one */
  readonly tuned: boolean;
  /** methods to try; all where left out */
  readonly methods?: readonly string[];
}

interface Place {
  readonly temperatureK: number;
  readonly pressurePa: number;
  readonly kij: readonly (readonly number[])[];
}

/**
 * The loop of a flowsheet with one isothermal converter, one condenser at a set temperature and one purge, whose
 * product alone condenses and no gas dissolves.
 */
export function scipyProblem(
  flowsheet: Flowsheet,
  options: Pick<ScipyProblem, 'tolerance' | 'rounds' | 'tuned' | 'methods'>,
): ScipyProblem {
  const { components } = flowsheet;
  const plant = createPlant(flowsheet);
  plant.refreshFeeds();
  const makeup = plant.streams[plant.enters[0]!]!;
  const converterK = plant.get('converter.temperature')!;
  const condenserK = plant.get('condenser.temperature')!;
  const converterPa = makeup.pressurePa - plant.get('converter.pressure_drop')!;
  const approachK = plant.get('converter.reactions.synthesis.approach')!;
  const product = components.findIndex((c) => c.id === 'NH3');
  return {
    ...options,
    components: components.map((c) => ({
      id: c.id,
      criticalK: c.critical!.temperatureK,
      criticalPa: c.critical!.pressurePa,
      acentricFactor: c.critical!.acentricFactor,
      // Hydrogen keeps the volume of the equation, see gas-models.ts.
      rackettZ: c.id === 'H2' ? null : (c.liquid?.rackettZ ?? null),
      hydrogen: c.id === 'H2',
      nasa: nasaAt(c, converterK + approachK),
    })),
    feed: [...makeup.flowsMolPerS],
    nu: [...flowsheet.reactions[0]!.coefficients],
    purgeFraction: plant.get('purge.fractions.bleed')!,
    product,
    converter: {
      temperatureK: converterK,
      pressurePa: converterPa,
      approachK,
      kij: kijAt(flowsheet, converterK),
    },
    condenser: {
      temperatureK: condenserK,
      pressurePa: converterPa - plant.get('condenser.pressure_drop')!,
      kij: kijAt(flowsheet, condenserK),
      antoine: antoineAt(components[product]!, condenserK),
      liquidVolumeM3PerMol: liquidVolume(components[product]!, condenserK),
    },
  };
}

function kijAt(flowsheet: Flowsheet, T: number): number[][] {
  const { components } = flowsheet;
  const kij = components.map(() => components.map(() => 0));
  for (const { i, j, value } of gasInteractions('srk', components)) {
    kij[i]![j] = value(T);
    kij[j]![i] = value(T);
  }
  return kij;
}

type Component = Flowsheet['components'][number];

function nasaAt(c: Component, T: number): number[] {
  const interval = c.idealGas.find(({ fromK, toK }) => fromK <= T && T <= toK)!;
  return [...interval.a, interval.b1Atct ?? interval.b1, interval.b2];
}

/** The set that holds T; A so that the pressure is ours, which closes the printed sets' step of 1e-6 at the joint. */
function antoineAt(c: Component, T: number): [number, number, number] {
  const { B, C } = c.antoine.find(({ fromK, toK }) => fromK <= T && T <= toK)!;
  return [(lnVapourPressure(c, T) - Math.log(1e5)) / Math.LN10 + B / (T + C), B, C];
}
