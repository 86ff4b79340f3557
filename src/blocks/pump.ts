import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { copyStream, emptyStream, type StreamState } from '../model/stream.ts';
import { stateSlopes } from '../properties/state-slopes.ts';
import { fraction, quantity } from '../units/schema.ts';
import type { BlockKind } from './block.ts';
import { keepFlows, temperatureAt } from './outlet-slopes.ts';
import { quietReport } from './report.ts';

const settings = z.strictObject({
  pressure: quantity('pressure', { description: 'discharge pressure' }),
  efficiency: fraction({
    min: 0.05,
    description: 'hydraulic efficiency, 70 % if left out',
    examples: ['75 %'],
  }).optional(),
});
type Settings = z.infer<typeof settings>;

/** Efficiency where none is given. @source common practice for centrifugal pumps */
const EFFICIENCY = 0.7;
/** Steps of the differences in the volume of a liquid, relative [-]. */
const STEP = 1e-4;

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
    const before = stateSlopes(mixture.size);
    const after = stateSlopes(mixture.size);
    const beside = emptyStream(mixture.size);
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
      slopes([inlet], [out], { of: [[matrix]] }) {
        if (gasAtSuction || mixture.total(inlet!) === 0) return false;
        if (!mixture.slopes(inlet!, 'all', before) || !mixture.slopes(out!, 'all', after)) return false;
        keepFlows(matrix, mixture.size);
        addPowerSlopes(inlet!, before.enthalpy);
        return temperatureAt(after.enthalpy, before.enthalpy, matrix);
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

    /** Adds the derivatives of the power to those of the enthalpy of the inlet, a liquid. */
    function addPowerSlopes(inlet: StreamState, enthalpy: Float64Array): void {
      const { size } = mixture;
      const perVolume = (setting.pressure - inlet.pressurePa) / (setting.efficiency ?? EFFICIENCY);
      const total = mixture.total(inlet);
      const volumeAt = (variable: number, by: number) => {
        copyStream(inlet, beside);
        if (variable < size) {
          beside.flowsMolPerS[variable] += by;
          beside.liquidMolPerS[variable] += by;
        } else if (variable === size) beside.temperatureK += by;
        else beside.pressurePa += by;
        return mixture.volume(beside);
      };
      for (let k = 0; k < size + 2; k++) {
        const step = STEP * (k < size ? total : k === size ? inlet.temperatureK : inlet.pressurePa);
        // A component that does not flow can only come.
        const back = k < size ? Math.min(step, inlet.flowsMolPerS[k]) : step;
        enthalpy[k] += (perVolume * (volumeAt(k, step) - volumeAt(k, -back))) / (step + back);
      }
      enthalpy[size + 1] -= mixture.volume(inlet) / (setting.efficiency ?? EFFICIENCY);
    }
  },
};
