import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import { quantity } from '../units/schema.ts';
import type { BlockKind } from './block.ts';
import { exactlyOne, pressureAfterDrop } from './checks.ts';
import { createCounterCurrent, logMean } from './counter-current.ts';
import { createDutyLimit } from './duty-limit.ts';
import { exchangerFaults } from './exchanger-faults.ts';
import { haveSameFlows } from './heat-curve.ts';
import { quietReport } from './report.ts';

const settings = z.strictObject({
  cold_temperature: quantity('temperature', {
    description: 'outlet temperature of the cold side',
    examples: ['290 degC'],
  }).optional(),
  hot_temperature: quantity('temperature', {
    description: 'outlet temperature of the hot side',
    examples: ['90 degC'],
  }).optional(),
  duty: quantity('power', {
    min: 0,
    description: 'heat moved from the hot to the cold side',
    examples: ['20 MW'],
  }).optional(),
  approach: quantity('temperatureDifference', {
    min: 0,
    description: 'smallest temperature difference along the curve; the heat moved follows',
  }).optional(),
  hot_pressure_drop: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost on the hot side, none if left out',
  }).optional(),
  cold_pressure_drop: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost on the cold side, none if left out',
  }).optional(),
});
export type ExchangerSettings = z.infer<typeof settings>;

/** A closest approach below this asks for an unusual exchanger (plate-fin, coil-wound) [K]. @source common practice */
const CLOSE_K = 3;

/**
 * Exchanger of heat between two streams in counter-current flow; nothing is mixed, nothing is lost.
 *
 * Ports: `hot`, `cold` in; `hot`, `cold` out.
 * Settings: one of `cold_temperature` [K], `hot_temperature` [K] (outlets), `duty` [W, positive] and `approach`
 * [K, the smallest difference anywhere along the curve]; `hot_pressure_drop`, `cold_pressure_drop` [Pa].
 * Balance: the hot stream loses the enthalpy that the cold one gains; the duty of the block is 0, as no heat
 * crosses the battery limit. Along the curve pressure falls in proportion to the heat.
 *
 * Inside a recycle the inlets are guesses, so a pass moves no more heat than their temperatures let through
 * (0 ≤ Q, hot outlet ≥ cold inlet, cold outlet ≤ hot inlet). If the settings still ask for more when the loop
 * has closed, or the curves cross between the ends, that is a fault and the plant counts as not closed. An
 * outlet whose temperature is set needs its own inlet only and is calculated ahead, so that an exchanger
 * between feed and effluent is no recycle of its own; with `approach` it is one.
 */
export const exchanger: BlockKind<ExchangerSettings> = {
  kind: 'exchanger',
  summary: 'moves heat from a hot stream to a cold one, e.g. from effluent to feed',
  settings,
  ports: () => ({ inlets: ['hot', 'cold'], outlets: ['hot', 'cold'] }),
  check: (setting) =>
    exactlyOne(setting, {
      cold_temperature: 'cold_temperature: 290 degC',
      hot_temperature: 'hot_temperature: 90 degC',
      duty: 'duty: 20 MW',
      approach: 'approach: 20 K',
    }),
  through: (inlet, outlet) => inlet === outlet,
  needs: (setting, outlet) => {
    const isSet = outlet === 'cold' ? setting.cold_temperature : setting.hot_temperature;
    return isSet !== undefined || setting.duty !== undefined ? outlet : null;
  },
  mayHoldBack: () => true,
  create(setting, { mixture }) {
    const limit = createDutyLimit(mixture);
    const curve = createCounterCurrent(mixture);
    let wantedW = 0;
    const started = new Set<StreamState>();

    /** Flows and pressure of an outlet; a temperature to start from where it has none of its own. */
    function leadThrough(inlet: StreamState, out: StreamState, dropPa: number | undefined): void {
      out.flowsMolPerS.set(inlet.flowsMolPerS);
      out.pressurePa = pressureAfterDrop(inlet.pressurePa, dropPa);
      if (!started.has(out) || mixture.total(inlet) === 0) out.temperatureK = inlet.temperatureK;
      started.add(out);
    }

    /** Settles the outlet whose temperature is set, and returns the heat that takes [W]. */
    function heatWanted(hot: StreamState, cold: StreamState, hotOut: StreamState, coldOut: StreamState) {
      if (setting.duty !== undefined) return setting.duty;
      if (setting.cold_temperature !== undefined) {
        coldOut.temperatureK = setting.cold_temperature;
        mixture.settle(coldOut);
        return coldOut.enthalpyW - cold.enthalpyW;
      }
      if (setting.hot_temperature !== undefined) {
        hotOut.temperatureK = setting.hot_temperature;
        mixture.settle(hotOut);
        return hot.enthalpyW - hotOut.enthalpyW;
      }
      return limit.heatAtApproach(setting.approach!);
    }

    return {
      pass([hot, cold], [hotOut, coldOut]) {
        leadThrough(hot, hotOut, setting.hot_pressure_drop);
        leadThrough(cold, coldOut, setting.cold_pressure_drop);
        limit.between(hot, cold, hotOut.pressurePa, coldOut.pressurePa);
        wantedW = heatWanted(hot, cold, hotOut, coldOut);
        const movedW = Math.min(Math.max(wantedW, 0), limit.heatAtEnds(0));
        mixture.settleAtEnthalpy(hotOut, hot.enthalpyW - movedW);
        mixture.settleAtEnthalpy(coldOut, cold.enthalpyW + movedW);
      },
      passAhead(outlet, [hot, cold], [hotOut, coldOut]) {
        const isCold = outlet === 'cold';
        const [inlet, out] = isCold ? [cold, coldOut] : [hot, hotOut];
        leadThrough(inlet, out, isCold ? setting.cold_pressure_drop : setting.hot_pressure_drop);
        const temperatureK = isCold ? setting.cold_temperature : setting.hot_temperature;
        if (temperatureK === undefined) {
          mixture.settleAtEnthalpy(out, inlet.enthalpyW + (isCold ? 1 : -1) * setting.duty!);
        } else {
          out.temperatureK = temperatureK;
          mixture.settle(out);
        }
      },
      report([hot, cold], [hotOut, coldOut]) {
        const movedW = coldOut.enthalpyW - cold.enthalpyW;
        const ends = {
          exchanged_kW: movedW / 1e3,
          hot_inlet_K: hot.temperatureK,
          hot_outlet_K: hotOut.temperatureK,
          cold_inlet_K: cold.temperatureK,
          cold_outlet_K: coldOut.temperatureK,
        };
        // A plant that did not close has streams of different passes side by side: no curve joins them.
        if (!haveSameFlows(hot, hotOut) || !haveSameFlows(cold, coldOut))
          return quietReport({ details: ends });
        try {
          curve.lay(hot, hotOut, cold, coldOut);
          const closest = curve.closest();
          limit.between(hot, cold, hotOut.pressurePa, coldOut.pressurePa);
          return quietReport({
            details: {
              ...ends,
              closest_approach_K: closest.differenceK,
              closest_at: {
                share_of_heat_from_cold_end: closest.share,
                hot_K: closest.hotK,
                cold_K: closest.coldK,
              },
              log_mean_difference_K: meanOfEnds(hot, hotOut, cold, coldOut),
              conductance_kW_K: kilo(curve.conductance(movedW)),
            },
            curves: () => {
              curve.lay(hot, hotOut, cold, coldOut);
              return { heat_curve: movedW > 0 ? curve.curve(movedW, closest) : null };
            },
            faults: exchangerFaults(setting, { hot, cold }, { wantedW, movedW, closest }, limit),
            assumptions: ['Counter-current flow without losses; pressure falls in proportion to the heat.'],
            warnings: [
              ...closeWarning(closest.differenceK, movedW),
              ...mixture.cautions(hotOut),
              ...mixture.cautions(coldOut),
            ],
          });
        } catch (trouble) {
          if (trouble instanceof PassTrouble) return quietReport({ details: ends });
          throw trouble;
        }
      },
    };
  },
};

/** Logarithmic mean of the differences at the two ends [K]; null where one of them is not above zero. */
function meanOfEnds(hot: StreamState, hotOut: StreamState, cold: StreamState, coldOut: StreamState) {
  const atHotEnd = hot.temperatureK - coldOut.temperatureK;
  const atColdEnd = hotOut.temperatureK - cold.temperatureK;
  return atHotEnd > 0 && atColdEnd > 0 ? logMean(atHotEnd, atColdEnd) : null;
}

function kilo(value: number | null): number | null {
  return value === null ? null : value / 1e3;
}

function closeWarning(differenceK: number, movedW: number) {
  if (!(movedW > 0) || differenceK >= CLOSE_K || differenceK < 0) return [];
  return [
    {
      code: 'close-approach',
      message: `hot and cold come within ${differenceK.toFixed(2)} K of one another; below ${CLOSE_K} K the exchanger becomes unusually large`,
    },
  ];
}
