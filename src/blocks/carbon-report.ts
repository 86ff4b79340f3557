import {
  type CarbonActivityOf,
  carbonFreeWindow,
  createCarbonActivity,
} from '../chemistry/carbon-activity.ts';
import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import type { BlockReport } from './block.ts';
import { listed } from './checks.ts';

/** A place in a reactor whose gas is asked for carbon. */
export interface CarbonPlace {
  /** as in "at the outlet" */
  readonly name: string;
  readonly stream: StreamState;
}

/** What a reactor says of carbon. */
export interface CarbonReport {
  /**
   * Activities at inlet and outlet, and between which temperatures a gas of their composition stays below 1:
   * `..._carbon_free_above_K` where it falls through 1 on heating (CO lays down carbon below),
   * `..._carbon_free_below_K` where it rises through 1 (CH4 cracks above); null where the largest of the
   * routes does not cross 1 so between 200 and 1200 degC.
   */
  details(inlet: StreamState, outlet: StreamState): BlockReport['details'];
  /** One warning for all places whose activity is above 1. */
  warnings(places: readonly CarbonPlace[]): BlockReport['warnings'];
}

/** More places than this are not listed one by one. */
const MOST_NAMED = 2;

export function createCarbonReport({ components, gas, spec }: Mixture): CarbonReport {
  let made: CarbonActivityOf | null = null;
  // Made when first asked: the passes do not need it.
  const activityOf: CarbonActivityOf = (T, P, amounts) => {
    made ??= createCarbonActivity(components, gas, spec.basis);
    return made(T, P, amounts);
  };
  const activity = ({ temperatureK, pressurePa, flowsMolPerS }: StreamState) =>
    activityOf(temperatureK, pressurePa, flowsMolPerS).largest;
  const window = ({ pressurePa, flowsMolPerS }: StreamState) =>
    carbonFreeWindow(activityOf, pressurePa, flowsMolPerS);

  return {
    details(inlet, outlet) {
      const before = window(inlet);
      const after = window(outlet);
      return {
        carbon_activity_inlet: activity(inlet),
        carbon_activity_outlet: activity(outlet),
        inlet_carbon_free_above_K: before.aboveK,
        inlet_carbon_free_below_K: before.belowK,
        outlet_carbon_free_above_K: after.aboveK,
        outlet_carbon_free_below_K: after.belowK,
      };
    },
    warnings(places) {
      const found = places.flatMap(({ name, stream }) => {
        const here = activity(stream);
        return here !== null && here > 1 ? [{ here, text: `${here.toPrecision(3)} at the ${name}` }] : [];
      });
      if (found.length === 0) return [];
      const worst = found.reduce((most, one) => (one.here > most.here ? one : most));
      const list =
        found.length <= MOST_NAMED
          ? listed(found.map((one) => one.text))
          : `${worst.text}, the largest of ${found.length} places above 1`;
      const message = `carbon activity of ${list}: carbon can form at equilibrium (a catalyst may or may not let it)`;
      return [{ code: 'carbon', message }];
    },
  };
}
