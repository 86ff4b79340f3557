import type { RateLaw } from '../chemistry/rate-laws/rate-law.ts';
import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { pressureAfterDrop } from './checks.ts';
import type { BedChemistry } from './kinetic-bed-chemistry.ts';
import { createGasHeat } from './kinetic-bed-heat.ts';
import { createBedMarch } from './kinetic-bed-march.ts';
import { bedMass, bedVolume, type KineticBedSettings } from './kinetic-bed-settings.ts';

/** The gas at one place of the bed; its arrays are rewritten from place to place. */
export interface BedPlace {
  /** share of the bed that lies behind, 0–1 */
  position: number;
  temperatureK: number;
  pressurePa: number;
  readonly flowsMolPerS: Float64Array;
  /** rates of the named reactions [mol/(m3 s) or mol/(kg s)] */
  readonly rates: Float64Array;
}

/** The way of the gas through a bed. */
export interface BedPath {
  /** @throws PassTrouble */
  pass(inlet: StreamState, out: StreamState): void;
  /** extents of the named reactions over the last pass [mol/s] */
  readonly extents: Float64Array;
  /** how often rates along the bed have been evaluated so far */
  evaluations(): number;
  /** Follow the gas again, with stops at 0, 1/sections, ..., 1. */
  follow(inlet: StreamState, sections: number, at: (place: BedPlace) => void): void;
}

/** Heat of a mole of feed that counts as one in the integration [J/mol]. */
const HEAT_SCALE = 3e4;
/** Share of the feed by which a component may be overdrawn on the way; what is left is settled at the outlet. */
const OVERDRAWN = 1e-7;

/**
 * Integrates dξ/dz = size × rate over the share z of the bed, size its volume or mass, and with a coolant
 * dQ/dz = heat_transfer V (T_coolant − T), per mole of feed. T at each place is that of the enthalpy
 * H(T, P(z), n) = H_in + Q, so that nothing is lost on the way.
 */
export function createBedPath(
  setting: KineticBedSettings,
  law: RateLaw,
  chemistry: BedChemistry,
  mixture: Mixture,
): BedPath {
  const { size } = mixture;
  const named = chemistry.reactions;
  const count = named.length;
  const heat = createGasHeat(mixture);
  const isCooled = setting.cooling !== undefined;
  const x = new Float64Array(count + (isCooled ? 1 : 0));
  const feed = new Float64Array(size);
  const extents = new Float64Array(count);
  const place: BedPlace = {
    position: 0,
    temperatureK: 298.15,
    pressurePa: 1e5,
    flowsMolPerS: new Float64Array(size),
    rates: new Float64Array(count),
  };
  const at = { total: 0, enthalpyW: 0, inletPa: 0, dropPa: 0, amount: 0, coolingWPerK: 0, evaluations: 0 };

  /** Take in the inlet and the settings as they stand; false where nothing flows. */
  function enter(inlet: StreamState): boolean {
    feed.set(inlet.flowsMolPerS);
    at.total = mixture.total(inlet);
    at.enthalpyW = inlet.enthalpyW;
    at.inletPa = inlet.pressurePa;
    at.dropPa = inlet.pressurePa - pressureAfterDrop(inlet.pressurePa, setting.pressure_drop);
    at.amount = (law.per === 'volume' ? bedVolume(setting) : bedMass(setting))!;
    at.coolingWPerK = isCooled ? setting.cooling!.heat_transfer * bedVolume(setting)! : 0;
    place.temperatureK = setting.temperature ?? inlet.temperatureK;
    x.fill(0);
    return at.total > 0;
  }

  function goTo(z: number, state: Float64Array): void {
    place.position = z;
    place.pressurePa = at.inletPa - at.dropPa * z;
    for (let i = 0; i < size; i++) place.flowsMolPerS[i] = Math.max(flow(i, state), 0);
    if (setting.temperature !== undefined) return;
    place.temperatureK = heat.temperature(
      place.temperatureK,
      place.pressurePa,
      place.flowsMolPerS,
      at.enthalpyW + heatAdded(state),
    );
  }

  /** what is left of a component; below 0 where more is taken than there is [mol/s] */
  function flow(i: number, state: Float64Array): number {
    let sum = feed[i];
    for (let k = 0; k < count; k++) sum += at.total * state[k] * named[k].coefficients[i];
    return sum;
  }

  function heatAdded(state: Float64Array): number {
    return isCooled ? at.total * HEAT_SCALE * state[count] : 0;
  }

  function slope(z: number, state: Float64Array, out: Float64Array): void {
    at.evaluations++;
    goTo(z, state);
    const { temperatureK, pressurePa, flowsMolPerS, rates } = place;
    chemistry.rates(temperatureK, pressurePa, flowsMolPerS, feed, rates);
    for (let k = 0; k < count; k++) out[k] = (at.amount * rates[k]) / at.total;
    if (isCooled) {
      out[count] =
        (at.coolingWPerK * (setting.cooling!.temperature - temperatureK)) / (at.total * HEAT_SCALE);
    }
  }

  function isPossible(state: Float64Array): boolean {
    for (let i = 0; i < size; i++) if (!(flow(i, state) >= -OVERDRAWN * at.total)) return false;
    return true;
  }

  const march = createBedMarch(x.length, slope, isPossible);

  return {
    extents,
    evaluations: () => at.evaluations,
    pass(inlet, out) {
      const flows = enter(inlet);
      if (flows) march.through(x);
      for (let k = 0; k < count; k++) extents[k] = at.total * x[k];
      out.pressurePa = at.inletPa - at.dropPa;
      leave(feed, extents, named, out.flowsMolPerS);
      goTo(1, x);
      out.temperatureK = place.temperatureK;
      if (setting.temperature !== undefined || !flows) mixture.settle(out);
      else mixture.settleAtEnthalpy(out, at.enthalpyW + heatAdded(x));
    },
    follow(inlet, sections, visit) {
      if (!enter(inlet)) return;
      march.inSections(sections, x, (z, state) => {
        goTo(z, state);
        chemistry.rates(place.temperatureK, place.pressurePa, place.flowsMolPerS, feed, place.rates);
        visit(place);
      });
    },
  };
}

/** As often as a trace taken too much may be given back: what one reaction gives back another may lack. */
const ROUNDS = 8;

/**
 * n = feed + Σ ν ξ; where an integration error has taken a trace more than there is, the extent that takes most of
 * it is shortened to what there is, so that atoms are kept.
 */
function leave(
  feed: Float64Array,
  extents: Float64Array,
  reactions: BedChemistry['reactions'],
  out: Float64Array,
): void {
  for (let round = 0; round < ROUNDS; round++) {
    let lacking = -1;
    for (let i = 0; i < feed.length; i++) {
      let sum = feed[i];
      for (let k = 0; k < extents.length; k++) sum += reactions[k].coefficients[i] * extents[k];
      out[i] = sum;
      if (sum < 0 && (lacking < 0 || sum < out[lacking])) lacking = i;
    }
    if (lacking < 0) return;
    const taken = (k: number) => -reactions[k].coefficients[lacking] * extents[k];
    let most = 0;
    for (let k = 1; k < extents.length; k++) if (taken(k) > taken(most)) most = k;
    extents[most] -= out[lacking] / reactions[most].coefficients[lacking];
  }
  for (let i = 0; i < feed.length; i++) out[i] = Math.max(out[i], 0);
}
