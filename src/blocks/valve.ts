import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import { quantity } from '../units/schema.ts';
import type { BlockKind } from './block.ts';
import { createDutySlopes } from './duty-slopes.ts';
import { quietReport } from './report.ts';

const settings = z.strictObject({
  pressure: quantity('pressure', { description: 'outlet pressure', examples: ['20 bar'] }),
});
type Settings = z.infer<typeof settings>;

/**
 * Valve: one inlet, one outlet at a lower pressure, constant enthalpy.
 *
 * Settings: `pressure` [Pa] of the outlet.
 * Balance: flows and enthalpy unchanged; the outlet temperature follows (hydrogen warms, most gases cool).
 */
export const valve: BlockKind<Settings> = {
  kind: 'valve',
  summary: 'lets a stream down to a lower pressure at constant enthalpy',
  settings,
  ports: () => ({ inlets: ['in'], outlets: ['out'] }),
  asksForHeat: (_, asked) => asked,
  create(setting, { mixture }) {
    const duty = createDutySlopes(mixture);
    let started = false;

    function passFlows([inlet]: readonly StreamState[], [out]: readonly StreamState[]): void {
      if (setting.pressure > inlet!.pressurePa * (1 + 1e-9))
        throw raisesPressure(setting.pressure, inlet!.pressurePa);
      out!.flowsMolPerS.set(inlet!.flowsMolPerS);
      out!.pressurePa = setting.pressure;
    }

    return {
      passFlows,
      pass(inlets, outlets) {
        const [inlet] = inlets;
        const [out] = outlets;
        passFlows(inlets, outlets);
        if (!started) out!.temperatureK = inlet!.temperatureK;
        started = true;
        mixture.settleAtEnthalpy(out!, inlet!.enthalpyW);
      },
      slopes: ([inlet], [out], { of, flowsOnly }) =>
        duty.fill(inlet!, out!, { temperatureIsSet: flowsOnly, pressureIsSet: true }, false, of[0][0]),
      report(inlets, outlets) {
        return quietReport({
          details: {
            pressure_bar: outlets[0].pressurePa / 1e5,
            temperature_change_K: outlets[0].temperatureK - inlets[0].temperatureK,
            vapour_fraction: outlets[0].vapourFraction,
          },
          warnings: mixture.cautions(outlets[0]),
        });
      },
    };
  },
};

function raisesPressure(wantedPa: number, inletPa: number): PassTrouble {
  return new PassTrouble(
    'pressure-rise',
    `The valve is set to ${(wantedPa / 1e5).toFixed(3)} bar, above its inlet of ${(inletPa / 1e5).toFixed(3)} bar.`,
    'a valve cannot raise the pressure of a stream',
    'lower the outlet pressure, or use a compressor (gas) or a pump (liquid)',
  );
}
