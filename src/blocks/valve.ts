import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
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
  create(setting, { mixture }) {
    const duty = createDutySlopes(mixture);
    let started = false;
    return {
      pass([inlet], [out]) {
        if (setting.pressure > inlet!.pressurePa * (1 + 1e-9)) {
          throw new PassTrouble(
            'pressure-rise',
            `The valve is set to ${(setting.pressure / 1e5).toFixed(3)} bar, above its inlet of ${(inlet!.pressurePa / 1e5).toFixed(3)} bar.`,
            'a valve cannot raise the pressure of a stream',
            'lower the outlet pressure, or use a compressor (gas) or a pump (liquid)',
          );
        }
        out!.flowsMolPerS.set(inlet!.flowsMolPerS);
        out!.pressurePa = setting.pressure;
        if (!started) out!.temperatureK = inlet!.temperatureK;
        started = true;
        mixture.settleAtEnthalpy(out!, inlet!.enthalpyW);
      },
      slopes: ([inlet], [out], { of }) =>
        duty.fill(inlet!, out!, { temperatureIsSet: false, pressureIsSet: true }, false, of[0][0]),
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
