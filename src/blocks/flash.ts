import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { emptyStream, type StreamState } from '../model/stream.ts';
import { quantity } from '../units/schema.ts';
import type { BlockKind } from './block.ts';
import { exactlyOne } from './checks.ts';
import { createDutySlopes } from './duty-slopes.ts';
import { settleWithDuty } from './heat-duty.ts';
import { partSlopes } from './outlet-slopes.ts';
import { partFlows, partPhases } from './phase-outlets.ts';
import { enthalpyAdded, quietReport } from './report.ts';

const settings = z.strictObject({
  pressure: quantity('pressure', { description: 'pressure of the vessel', examples: ['20 bar'] }),
  adiabatic: z
    .literal(true)
    .meta({ description: 'no heat is exchanged; one of adiabatic, temperature and duty' })
    .optional(),
  temperature: quantity('temperature', {
    description: 'temperature of the vessel',
    examples: ['30 degC'],
  }).optional(),
  duty: quantity('power', { description: 'heat added; negative for cooling' }).optional(),
});
type Settings = z.infer<typeof settings>;

/**
 * Let-down vessel: one inlet; outlets `gas` and `liquid` in equilibrium at the vessel's pressure.
 *
 * Settings: `pressure` [Pa] and one of `adiabatic`, `temperature` [K], `duty` [W, positive heats].
 * Balance: gas and liquid add up to the inlet; adiabatic keeps the enthalpy.
 */
export const flash: BlockKind<Settings> = {
  kind: 'flash',
  summary: 'lets a stream down to a pressure and parts gas from liquid',
  settings,
  ports: () => ({ inlets: ['in'], outlets: ['gas', 'liquid'] }),
  check: (setting) =>
    exactlyOne(setting, {
      adiabatic: 'adiabatic: true',
      temperature: 'temperature: -10 degC',
      duty: 'duty: 50 kW',
    }),
  passes: (_, outlet, __, role) =>
    role === 'solid' ? outlet === 'liquid' : outlet === 'gas' || role !== 'gas',
  asksForHeat: ({ temperature }) => temperature === undefined,
  create(setting, { mixture }) {
    const mixed = emptyStream(mixture.size);
    const mixedSlopes = new Float64Array((mixture.size + 2) ** 2);
    const duty = createDutySlopes(mixture);
    let started = false;

    function letDown(inlet: StreamState): void {
      if (setting.pressure > inlet.pressurePa * (1 + 1e-9))
        throw raisesPressure(setting.pressure, inlet.pressurePa);
      mixed.flowsMolPerS.set(inlet.flowsMolPerS);
      mixed.pressurePa = setting.pressure;
    }

    function passFlows([inlet]: readonly StreamState[], [gas, liquid]: readonly StreamState[]): void {
      letDown(inlet!);
      mixed.temperatureK = setting.temperature!;
      mixture.settleLiquid(mixed);
      partFlows(mixed, gas!, liquid!);
    }

    return {
      pass([inlet], [gas, liquid]) {
        letDown(inlet!);
        if (setting.temperature !== undefined) {
          mixed.temperatureK = setting.temperature;
          mixture.settle(mixed);
        } else {
          if (!started) mixed.temperatureK = inlet!.temperatureK;
          started = true;
          settleWithDuty(mixture, mixed, inlet!.enthalpyW, setting.duty ?? 0);
        }
        partPhases(mixed, gas!, liquid!, mixture);
      },
      ...(setting.temperature === undefined ? {} : { passFlows }),
      slopes([inlet], _, { of: [[gas], [liquid]] }) {
        const temperatureIsSet = setting.temperature !== undefined;
        mixedSlopes.fill(0);
        if (!duty.fill(inlet!, mixed, { temperatureIsSet, pressureIsSet: true }, true, mixedSlopes))
          return false;
        partSlopes(duty.liquid, mixture.size, mixedSlopes, gas, liquid);
        return true;
      },
      report(inlets, outlets) {
        return quietReport({
          dutyW: setting.adiabatic ? 0 : enthalpyAdded(inlets, outlets),
          details: {
            temperature_K: mixed.temperatureK,
            pressure_bar: mixed.pressurePa / 1e5,
            gas_fraction: mixed.vapourFraction,
          },
          warnings: mixture.cautions(mixed),
        });
      },
    };
  },
};

function raisesPressure(vesselPa: number, inletPa: number): PassTrouble {
  return new PassTrouble(
    'pressure-rise',
    `The vessel is set to ${(vesselPa / 1e5).toFixed(3)} bar, above its inlet of ${(inletPa / 1e5).toFixed(3)} bar.`,
    'a let-down vessel cannot raise the pressure of a stream',
    'lower the pressure of the vessel, or put a pump or compressor before it',
  );
}
