import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { fraction, quantity } from '../units/schema.ts';
import type { BlockKind } from './block.ts';
import { quietReport } from './report.ts';

const settings = z.strictObject({
  pressure: quantity('pressure', { description: 'discharge pressure' }),
  efficiency: fraction({ min: 0.05, description: 'hydraulic efficiency, 70 % if left out' }).optional(),
});
type Settings = z.infer<typeof settings>;

/** Efficiency where none is given. @source common practice for centrifugal pumps */
const EFFICIENCY = 0.7;

/**
 * Pump: one liquid inlet, one outlet at a higher pressure.
 *
 * Settings: `pressure` [Pa], `efficiency`.
 * Balance: power = V (P₂ − P₁)/η with the volume flow V of the inlet; all of it heats the liquid.
 */
export const pump: BlockKind<Settings> = {
  kind: 'pump',
  summary: 'raises the pressure of a liquid',
  settings,
  models: () => ['incompressible liquid'],
  ports: () => ({ inlets: ['in'], outlets: ['out'] }),
  create(setting, { mixture }) {
    let powerW = 0;
    let gasAtSuction = false;
    return {
      pass([inlet], [out]) {
        if (setting.pressure < inlet!.pressurePa * (1 - 1e-9)) {
          throw new PassTrouble(
            'pressure-fall',
            `The pump is set to ${(setting.pressure / 1e5).toFixed(3)} bar, below its suction of ${(inlet!.pressurePa / 1e5).toFixed(3)} bar.`,
            'a pump raises the pressure',
            'raise the discharge pressure, or use a valve',
          );
        }
        gasAtSuction = inlet!.vapourFraction > 1e-9 && mixture.total(inlet!) > 0;
        powerW =
          (mixture.volume(inlet!) * (setting.pressure - inlet!.pressurePa)) /
          (setting.efficiency ?? EFFICIENCY);
        out!.flowsMolPerS.set(inlet!.flowsMolPerS);
        out!.pressurePa = setting.pressure;
        out!.temperatureK = inlet!.temperatureK;
        mixture.settleAtEnthalpy(out!, inlet!.enthalpyW + powerW);
      },
      report(inlets, outlets) {
        return quietReport({
          powerW,
          details: {
            shaft_power_kW: powerW / 1e3,
            temperature_rise_K: outlets[0].temperatureK - inlets[0].temperatureK,
          },
          warnings: gasAtSuction
            ? [
                {
                  code: 'gas-at-suction',
                  message: 'gas enters the pump; its power is that of an incompressible fluid',
                },
              ]
            : [],
          assumptions:
            setting.efficiency === undefined
              ? [`Pump efficiency ${100 * EFFICIENCY} % (common practice; none given).`]
              : [],
        });
      },
    };
  },
};
