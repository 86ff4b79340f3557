import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { copyStream } from '../model/stream.ts';
import { fraction, plainNumber, quantity } from '../units/schema.ts';
import type { BlockKind } from './block.ts';
import { exactlyOne } from './checks.ts';
import { createMachineStage } from './machine-stage.ts';
import { quietReport } from './report.ts';

const settings = z.strictObject({
  pressure: quantity('pressure', { description: 'discharge pressure', examples: ['6 bar'] }).optional(),
  ratio: plainNumber({ min: 1, description: 'inlet over discharge pressure', examples: [3] }).optional(),
  efficiency: fraction({
    min: 0.05,
    description: 'isentropic efficiency, 80 % if left out',
    examples: ['82 %'],
  }).optional(),
  drive_efficiency: fraction({
    min: 0.05,
    description: 'power delivered over shaft power (generator, gear), 100 % if left out',
    examples: ['95 %'],
  }).optional(),
});
type Settings = z.infer<typeof settings>;

/** Isentropic efficiency where none is given. @source common practice for turbo-expanders, 75–88 % */
const EFFICIENCY = 0.8;
/** Liquid in the discharge below this share is rounding [mol/mol]. */
const WORTH_A_WORD = 1e-9;

/**
 * Expander (turbine on purge or let-down): one inlet, one outlet at a lower pressure; delivers power.
 *
 * Settings: one of `pressure` [Pa], `ratio` [-]; `efficiency` (isentropic); `drive_efficiency` (generator).
 * Balance: h₂ = h₁ + η (h₂s − h₁), adiabatic, liquid may form. Power delivered = shaft power × drive
 * efficiency, and counts as negative; what the generator loses leaves the process all the same.
 */
export const expander: BlockKind<Settings> = {
  kind: 'expander',
  summary: 'lets a stream down to a lower pressure and delivers power',
  settings,
  models: () => ['real isentrope by the entropies of the mixture'],
  ports: () => ({ inlets: ['in'], outlets: ['out'] }),
  check: (setting) => exactlyOne(setting, { pressure: 'pressure: 6 bar', ratio: 'ratio: 3' }),
  create(setting, { mixture }) {
    const stage = createMachineStage(mixture);
    const pressureRow = new Float64Array(mixture.size + 2);
    let shaftW = 0;
    return {
      pass([inlet], [out]) {
        copyStream(inlet!, out!);
        shaftW = stage.expand(
          out!,
          dischargePressure(setting, inlet!.pressurePa),
          setting.efficiency ?? EFFICIENCY,
        );
      },
      slopes([inlet], [out], { width, of: [[matrix]] }) {
        for (let i = 0; i < width; i++) matrix[i * width + i] = 1;
        pressureRow[width - 1] = setting.pressure === undefined ? out!.pressurePa / inlet!.pressurePa : 0;
        return stage.carrySlopes(matrix, pressureRow);
      },
      report([inlet], [out]) {
        const drawnW = shaftW * (setting.drive_efficiency ?? 1);
        const wet = mixture.total(out!) > 0 && inlet!.vapourFraction - out!.vapourFraction > WORTH_A_WORD;
        return quietReport({
          powerW: drawnW,
          driveLossW: drawnW - shaftW,
          details: {
            shaft_power_kW: shaftW / 1e3,
            discharge_K: out!.temperatureK,
            vapour_fraction: out!.vapourFraction,
          },
          warnings: [...(wet ? [liquidAtDischarge(out!.vapourFraction)] : []), ...mixture.cautions(out!)],
          assumptions:
            setting.efficiency === undefined
              ? [`Isentropic efficiency ${100 * EFFICIENCY} % (common practice; none given).`]
              : [],
        });
      },
    };
  },
};

function dischargePressure(setting: Settings, inletPa: number): number {
  const target = setting.pressure ?? inletPa / setting.ratio!;
  if (target <= inletPa * (1 + 1e-9)) return target;
  throw new PassTrouble(
    'pressure-rise',
    `The expander is set to ${(target / 1e5).toFixed(3)} bar, above its inlet of ${(inletPa / 1e5).toFixed(3)} bar.`,
    'an expander lowers the pressure',
    'lower the discharge pressure, or use a compressor',
  );
}

function liquidAtDischarge(vapourFraction: number): { code: string; message: string } {
  return {
    code: 'liquid-at-discharge',
    message: `${(100 * (1 - vapourFraction)).toFixed(1)} mol % of the discharge is liquid; heat the inlet or let down less if the machine does not stand it`,
  };
}
