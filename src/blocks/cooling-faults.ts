import type { BlockFault, SettingsFault } from './block.ts';
import type { CoolingSettings } from './cooling.ts';

/** A kelvin this far past an evaporator is rounding. */
const ROUNDING_K = 1e-6;

/** Faults of the cooling of a condenser that is to reach a temperature [K]; undefined where that is not known. */
export function coolingFaults(
  setting: CoolingSettings | undefined,
  outletK: number | undefined,
): SettingsFault[] {
  const levels = setting?.levels;
  if (!setting || !levels) return [];
  const waterReachK = setting.water + setting.approach;
  return [
    ...levels.flatMap((level, k): SettingsFault[] => {
      const path = ['cooling', 'levels', k];
      if (k > 0 && level >= levels[k - 1]) {
        return [
          {
            path,
            code: 'level-order',
            what: `The level at ${celsius(level)} stands behind the one at ${celsius(levels[k - 1])}, which is no warmer.`,
            why: 'the stream passes the chillers from the warmest to the coldest',
            mend: 'list the levels from warm to cold, each once',
          },
        ];
      }
      if (k === 0 && level + setting.approach >= waterReachK) {
        return [
          {
            path,
            code: 'idle-setting',
            what: `The level at ${celsius(level)} has nothing to do.`,
            why: `cooling water takes the stream down to ${celsius(waterReachK)}, which is as cold as this level would`,
            mend: 'take it out, or set it below the temperature of the water',
          },
        ];
      }
      return [];
    }),
    ...(outletK === undefined ? [] : coldFaults(setting, outletK)).map((fault) => ({
      path: ['temperature'],
      ...fault,
    })),
  ];
}

/** The fault of an outlet that no level reaches; none where the levels are left to Looptally. */
export function coldFaults(setting: CoolingSettings, outletK: number): BlockFault[] {
  const last = setting.levels?.at(-1);
  if (last === undefined || outletK >= last + setting.approach - ROUNDING_K) return [];
  const reached = celsius(last + setting.approach);
  return [
    {
      code: 'colder-than-refrigerant',
      what: `The outlet of ${celsius(outletK)} is colder than the coldest chiller level can make it.`,
      why: `that level evaporates at ${celsius(last)} and comes within ${setting.approach.toFixed(1)} K of the stream, which is ${reached}`,
      mend: `add a level at ${celsius(outletK - setting.approach)} or below, or let the outlet be ${reached} or warmer`,
    },
  ];
}

function celsius(T: number): string {
  return `${(T - 273.15).toFixed(1)} degC`;
}
