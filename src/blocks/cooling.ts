import { z } from 'zod';
import { emptyStream, type StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { fraction, quantity } from '../units/schema.ts';
import type { BlockFault } from './block.ts';
import { coldFaults } from './cooling-faults.ts';

/** How a condenser is cooled: by water as far as that goes, by refrigeration below. */
export const coolingSettings = z.strictObject({
  water: quantity('temperature', {
    description: 'temperature of the cooling water',
    examples: ['25 degC'],
  }),
  approach: quantity('temperatureDifference', {
    min: 0,
    description: 'closest approach to water and refrigerant',
  }),
  levels: z
    .array(
      quantity('temperature', {
        description: 'evaporation temperature of a chiller level',
        examples: ['-10 degC'],
      }),
    )
    .min(1)
    .max(8)
    .meta({
      description:
        'evaporation temperatures of chillers in series, warmest first; one as cold as needed if left out',
      examples: [['5 degC', '-10 degC']],
    })
    .optional(),
  second_law_efficiency: fraction({
    min: 0.05,
    description: 'power of an ideal refrigerator over the real power, 50 % if left out',
    examples: ['50 %'],
  }).optional(),
});
export type CoolingSettings = z.infer<typeof coolingSettings>;

/**
 * Share of the Carnot performance that a vapour-compression plant reaches. The ideal single-stage ammonia cycle
 * itself reaches 0.73 (−33 to 40 degC) to 0.90 (5 to 30 degC) of Carnot, for its throttle and superheat; a compressor
 * of 75 % and a drive of 95 % leave 0.52 to 0.64, pressure losses 0.5 to 0.6. @source common practice
 */
const SECOND_LAW_EFFICIENCY = 0.5;

export interface LevelDuty {
  readonly evaporator_K: number;
  /** heat added to the process, negative */
  readonly duty_kW: number;
  readonly power_kW: number;
}

export interface CoolingSplit {
  readonly powerW: number;
  readonly details: {
    readonly water_duty_kW: number;
    readonly refrigeration_duty_kW: number;
    /** of the coldest level that runs; 0 where none does */
    readonly evaporator_K: number;
    readonly refrigeration_power_kW: number;
    /** what each level given takes, an idle one 0; the one level where none is given */
    readonly levels: readonly LevelDuty[];
  };
  readonly faults: readonly BlockFault[];
  readonly assumptions: readonly string[];
}

/**
 * Share a condenser's duty along its cooling curve: cooling water takes it down to water + approach, then each
 * chiller level in turn down to its evaporation temperature + approach, the last only as far as needed. The
 * power of a level is that of the Carnot factor
 *   W = Q (T_cond − T_evap)/T_evap / η,  T_cond = water + approach,
 * with a second-law efficiency η. Without `levels` there is one, T_evap = outlet − approach.
 *
 * @returns a function of inlet, settled outlet, duty [W, negative] and the settings
 * @source Carnot; η: common practice
 */
export function createCoolingSplit(mixture: Mixture) {
  const between = emptyStream(mixture.size);

  return (inlet: StreamState, outlet: StreamState, dutyW: number, setting: CoolingSettings): CoolingSplit => {
    const waterReachK = setting.water + setting.approach;
    const efficiency = setting.second_law_efficiency ?? SECOND_LAW_EFFICIENCY;
    const evaporatorsK = setting.levels ?? [outlet.temperatureK - setting.approach];
    const chilledW = leftBelow(waterReachK);
    const levels: LevelDuty[] = [];
    let aboveW = chilledW;
    evaporatorsK.forEach((evaporatorK, k) => {
      const isLast = k === evaporatorsK.length - 1;
      const belowW = isLast ? 0 : Math.min(leftBelow(evaporatorK + setting.approach), aboveW);
      const takenW = aboveW - belowW;
      aboveW = belowW;
      const lift = Math.max(waterReachK - evaporatorK, 0);
      levels.push({
        evaporator_K: evaporatorK,
        duty_kW: takenW > 0 ? -takenW / 1e3 : 0,
        power_kW: takenW > 0 ? (takenW * lift) / evaporatorK / efficiency / 1e3 : 0,
      });
    });
    const powerW = levels.reduce((sum, level) => sum + 1e3 * level.power_kW, 0);
    const coldest = levels.findLast((level) => level.duty_kW < 0);
    return {
      powerW,
      details: {
        water_duty_kW: (dutyW + chilledW) / 1e3,
        refrigeration_duty_kW: chilledW > 0 ? -chilledW / 1e3 : 0,
        evaporator_K: coldest?.evaporator_K ?? 0,
        refrigeration_power_kW: powerW / 1e3,
        levels,
      },
      faults: coldFaults(setting, outlet.temperatureK),
      assumptions: chilledW > 0 ? [assumptionOf(setting, efficiency)] : [],
    };

    /** Heat still to be taken out below a temperature [W, positive]. */
    function leftBelow(T: number): number {
      if (outlet.temperatureK >= T) return 0;
      if (inlet.temperatureK <= T) return Math.max(-dutyW, 0);
      between.flowsMolPerS.set(outlet.flowsMolPerS);
      between.pressurePa = outlet.pressurePa;
      between.temperatureK = T;
      mixture.settle(between);
      return Math.max(between.enthalpyW - outlet.enthalpyW, 0);
    }
  };
}

function assumptionOf(setting: CoolingSettings, efficiency: number): string {
  const evaporator = setting.levels
    ? `chiller levels in series at ${setting.levels.map(celsius).join(', ')}, each cooling to ${setting.approach} K above its evaporator`
    : `evaporator ${setting.approach} K below the condensate`;
  const share = `${(100 * efficiency).toFixed(0)} % of the Carnot performance`;
  const origin = setting.second_law_efficiency === undefined ? ' (common practice)' : '';
  return `Refrigeration: ${evaporator}, condenser ${setting.approach} K above the cooling water, ${share}${origin}.`;
}

function celsius(T: number): string {
  return `${(T - 273.15).toFixed(1)} degC`;
}
