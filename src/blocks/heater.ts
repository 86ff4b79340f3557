import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { fraction, quantity } from '../units/schema.ts';
import type { BlockKind } from './block.ts';
import { exactlyOne, pressureAfterDrop } from './checks.ts';
import { createDutySlopes } from './duty-slopes.ts';
import { temperatureAlong } from './heat-curve.ts';
import { settleWithDuty } from './heat-duty.ts';
import { enthalpyAdded, quietReport } from './report.ts';
import { raiseSteam, STEAM, steamFaults, steamSettings } from './steam-raising.ts';

const settings = z.strictObject({
  temperature: quantity('temperature', {
    description: 'outlet temperature',
    examples: ['290 degC'],
  }).optional(),
  duty: quantity('power', { description: 'heat added; negative for cooling' }).optional(),
  vapour_fraction: fraction({
    description: 'mol vapour per mol of the outlet',
    examples: ['100 %', '0.5'],
  }).optional(),
  pressure_drop: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost, none if left out',
  }).optional(),
  steam: steamSettings.meta({ description: STEAM }).optional(),
});
type Settings = z.infer<typeof settings>;

/**
 * Heater or cooler: one inlet, one outlet, phases stay together.
 *
 * Settings: one of `temperature` [K], `duty` [W, positive heats], `vapour_fraction` [0–1]; `pressure_drop` [Pa];
 * `steam` (what the heat given off could raise, see steam-raising.ts; changes no stream).
 * Balance: flows unchanged; the duty is the enthalpy that leaves less the one that enters.
 */
export const heater: BlockKind<Settings> = {
  kind: 'heater',
  summary: 'heats or cools a stream without parting its phases',
  settings,
  models: (setting) => (setting.steam ? ['steam: IAPWS-IF97, R7-97(2012)'] : []),
  ports: () => ({ inlets: ['in'], outlets: ['out'] }),
  check: (setting) => [
    ...exactlyOne(setting, {
      temperature: 'temperature: 280 degC',
      duty: 'duty: 12 MW',
      vapour_fraction: 'vapour_fraction: 100 %',
    }),
    ...steamFaults(setting.steam),
  ],
  asksForHeat: ({ duty }, asked) => asked && duty !== undefined,
  create(setting, { mixture }) {
    const duty = createDutySlopes(mixture);
    let started = false;

    function passFlows([inlet]: readonly StreamState[], [out]: readonly StreamState[]): void {
      out!.flowsMolPerS.set(inlet!.flowsMolPerS);
      out!.pressurePa = pressureAfterDrop(inlet!.pressurePa, setting.pressure_drop);
    }

    return {
      pass(inlets, outlets) {
        const [inlet] = inlets;
        const [out] = outlets;
        passFlows(inlets, outlets);
        if (setting.temperature !== undefined) {
          out!.temperatureK = setting.temperature;
          mixture.settle(out!);
          return;
        }
        if (!started) out!.temperatureK = inlet!.temperatureK;
        started = true;
        if (setting.duty !== undefined) settleWithDuty(mixture, out!, inlet!.enthalpyW, setting.duty);
        else settleAtVapourFraction(out!, setting.vapour_fraction!, mixture);
      },
      passFlows,
      slopes([inlet], [out], { of, flowsOnly }) {
        if (setting.vapour_fraction !== undefined && !flowsOnly) return false;
        const temperatureIsSet = flowsOnly || setting.temperature !== undefined;
        return duty.fill(inlet!, out!, { temperatureIsSet, pressureIsSet: false }, false, of[0][0]);
      },
      report(inlets, outlets) {
        const [inlet] = inlets;
        const [out] = outlets;
        const dutyW = enthalpyAdded(inlets, outlets);
        const steam =
          setting.steam && raiseSteam(setting.steam, dutyW, temperatureAlong(inlet, out, mixture));
        return quietReport({
          dutyW,
          details: {
            temperature_K: out.temperatureK,
            vapour_fraction: out.vapourFraction,
            ...(steam && { steam: steam.details }),
          },
          warnings: [...(steam?.warnings ?? []), ...mixture.cautions(out)],
          assumptions: steam?.assumptions ?? [],
        });
      },
    };
  },
};

/** Between these temperatures a vapour fraction is looked for [K]. */
const COLDEST_K = 60;
const HOTTEST_K = 800;
/** A step in the vapour fraction across one temperature larger than this is boiling, not rounding. */
const BOILS = 1e-6;

/**
 * Find the temperature at which a stream holds a given share of vapour, by bisection: the share rises with
 * temperature (0 and 1 mean the bubble and the dew point). A pure component boils at one temperature: there
 * its phases are shared as asked.
 */
function settleAtVapourFraction(stream: StreamState, wanted: number, mixture: Mixture): void {
  const shareAt = (T: number) => {
    stream.temperatureK = T;
    mixture.settle(stream);
    return stream.vapourFraction;
  };
  if (mixture.total(stream) === 0) {
    mixture.settle(stream);
    return;
  }
  let low = COLDEST_K;
  let high = HOTTEST_K;
  const isBelow = (share: number) => (wanted >= 1 ? share < 1 : share <= wanted);
  if (!isBelow(shareAt(low)) || isBelow(shareAt(high))) throw notReached(stream, wanted);
  while (high - low > 1e-12 * high) {
    const T = 0.5 * (low + high);
    if (T === low || T === high) break;
    if (isBelow(shareAt(T))) low = T;
    else high = T;
  }
  const shareHigh = shareAt(high);
  const shareLow = shareAt(low);
  if (shareHigh - shareLow > BOILS) {
    if (high >= lastCriticalK(stream, mixture)) throw notReached(stream, wanted);
    sharePhases(stream, (wanted - shareLow) / (shareHigh - shareLow), high, mixture);
  } else if (wanted >= 1) {
    shareAt(high);
  }
}

/** Mix a stream settled just below its boiling point with the same just above it. */
function sharePhases(stream: StreamState, weight: number, high: number, mixture: Mixture): void {
  const cold = stream.liquidMolPerS.slice();
  const coldFraction = stream.vapourFraction;
  stream.temperatureK = high;
  mixture.settle(stream);
  for (let i = 0; i < cold.length; i++) {
    stream.liquidMolPerS[i] = (1 - weight) * cold[i] + weight * stream.liquidMolPerS[i];
  }
  stream.vapourFraction = (1 - weight) * coldFraction + weight * stream.vapourFraction;
  mixture.settlePhases(stream);
}

/** The temperature from which on no component of a stream can be liquid: the share of vapour steps to 1 there. */
function lastCriticalK(stream: StreamState, mixture: Mixture): number {
  let last = 0;
  for (let i = 0; i < mixture.size; i++) {
    if (mixture.roles[i] !== 'condensable' || stream.flowsMolPerS[i] === 0) continue;
    last = Math.max(last, mixture.components[i].critical?.temperatureK ?? Number.POSITIVE_INFINITY);
  }
  return last;
}

function notReached(stream: StreamState, wanted: number): PassTrouble {
  return new PassTrouble(
    'vapour-fraction',
    `A vapour fraction of ${(100 * wanted).toFixed(2)} % is not reached between ${COLDEST_K} and ${HOTTEST_K} K at ${(stream.pressurePa / 1e5).toFixed(2)} bar.`,
    'the stream holds gases that do not condense, or it is above its critical pressure',
    'set a temperature or a duty instead',
  );
}
