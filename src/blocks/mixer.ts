import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { copyStream, type StreamState } from '../model/stream.ts';
import { stateSlopes } from '../properties/state-slopes.ts';
import { quantity } from '../units/schema.ts';
import type { BlockKind } from './block.ts';
import { followPressure, keepFlows, keepTemperature, temperatureAt } from './outlet-slopes.ts';
import { quietReport } from './report.ts';

const settings = z.strictObject({
  pressure: quantity('pressure', {
    description: 'outlet pressure; the lowest inlet pressure if left out',
  }).optional(),
});
type Settings = z.infer<typeof settings>;

/** An inlet that loses more than this share of its pressure in a mixer is worth a word. @source common practice */
const THROTTLING_WORTH_A_WORD = 0.02;
/** Pressures closer than this share of them are equal but for rounding [-]. */
const SAME_PRESSURE = 1e-12;

/**
 * Mixer: any number of inlets, one outlet, adiabatic.
 *
 * Settings: `pressure` [Pa], default the lowest inlet pressure.
 * Balance: flows and enthalpies of the inlets add up; the outlet temperature follows from the enthalpy.
 */
export const mixer: BlockKind<Settings> = {
  kind: 'mixer',
  summary: 'joins streams without exchange of heat',
  settings,
  ports: () => ({ inlets: 'any', outlets: ['out'] }),
  asksForHeat: (_, asked) => asked,
  create(setting, { mixture }) {
    /** what mixing adds to the mean temperature of the inlets, from the last pass: next time's first guess [K] */
    const last = { riseK: 0 };
    const before = stateSlopes(mixture.size);
    const after = stateSlopes(mixture.size);
    const mean = { temperatureK: 0, enthalpyW: 0 };

    /** Flows and pressure of the outlet; of the inlets the sum of the enthalpies and the mean temperature. */
    function join(inlets: readonly StreamState[], out: StreamState): void {
      out.flowsMolPerS.fill(0);
      mean.enthalpyW = 0;
      let pressurePa = Number.POSITIVE_INFINITY;
      let flow = 0;
      let flowTimesK = 0;
      for (let k = 0; k < inlets.length; k++) {
        const inlet = inlets[k];
        const total = mixture.total(inlet);
        for (let i = 0; i < mixture.size; i++) out.flowsMolPerS[i] += inlet.flowsMolPerS[i];
        mean.enthalpyW += inlet.enthalpyW;
        // An inlet that carries nothing (a recycle not yet started) sets no pressure.
        if (total > 0) pressurePa = Math.min(pressurePa, inlet.pressurePa);
        flow += total;
        flowTimesK += total * inlet.temperatureK;
      }
      if (pressurePa === Number.POSITIVE_INFINITY) pressurePa = inlets[0].pressurePa;
      if (setting.pressure !== undefined) {
        if (setting.pressure > pressurePa * (1 + 1e-9)) throw raisesPressure(setting.pressure, pressurePa);
        pressurePa = setting.pressure;
      }
      out.pressurePa = pressurePa;
      mean.temperatureK = flow > 0 ? flowTimesK / flow : inlets[0].temperatureK;
    }

    return {
      pass(inlets, outlets) {
        const out = outlets[0];
        join(inlets, out);
        if (inlets.length === 1 && inlets[0].pressurePa === out.pressurePa) {
          copyStream(inlets[0], out);
          return;
        }
        out.temperatureK = mean.temperatureK + last.riseK;
        mixture.settleAtEnthalpy(out, mean.enthalpyW);
        last.riseK = out.temperatureK - mean.temperatureK;
      },
      passFlows(inlets, outlets) {
        join(inlets, outlets[0]);
      },
      slopes(inlets, outlets, { of: [matrices], moved, flowsOnly }) {
        const { size } = mixture;
        const [out] = outlets;
        const sets = (inlet: StreamState) =>
          mixture.total(inlet) > 0 && inlet.pressurePa <= out.pressurePa * (1 + SAME_PRESSURE);
        // Of equal pressures each has its share, the mean of the slopes to both sides: if a recycle's
        // alone set it, that would be left undetermined.
        const share = 1 / inlets.filter(sets).length;
        const unchanged = inlets.length === 1 && inlets[0].pressurePa === out.pressurePa;
        if (!flowsOnly && !unchanged && !mixture.slopes(out, 'enthalpy', after)) return false;
        for (let k = 0; k < inlets.length; k++) {
          if (!moved[k]) continue;
          keepFlows(matrices[k], size);
          if (setting.pressure === undefined && sets(inlets[k])) followPressure(matrices[k], size, share);
          if (flowsOnly) continue;
          if (unchanged) keepTemperature(matrices[k], size);
          else if (
            !mixture.slopes(inlets[k], 'enthalpy', before) ||
            !temperatureAt(after.enthalpy, before.enthalpy, matrices[k])
          )
            return false;
        }
        return true;
      },
      report(inlets, outlets) {
        const pressurePa = outlets[0].pressurePa;
        const throttled = inlets.filter(
          (inlet) =>
            mixture.total(inlet) > 0 && inlet.pressurePa > pressurePa * (1 + THROTTLING_WORTH_A_WORD),
        );
        return quietReport({
          details: { outlet_pressure_bar: pressurePa / 1e5 },
          warnings: throttled.map((inlet) => ({
            code: 'mixing-pressure',
            message: `an inlet at ${(inlet.pressurePa / 1e5).toFixed(2)} bar is let down to ${(pressurePa / 1e5).toFixed(2)} bar in the mixer without doing work`,
          })),
        });
      },
    };
  },
};

function raisesPressure(wantedPa: number, lowestPa: number): PassTrouble {
  return new PassTrouble(
    'pressure-rise',
    `The mixer is set to ${(wantedPa / 1e5).toFixed(3)} bar, above its lowest inlet of ${(lowestPa / 1e5).toFixed(3)} bar.`,
    'a mixer cannot raise the pressure of a stream',
    'lower the mixer pressure, or put a compressor or pump into the inlet of lower pressure',
  );
}
