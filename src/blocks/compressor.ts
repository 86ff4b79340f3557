import { z } from 'zod';
import { copyStream, type StreamState } from '../model/stream.ts';
import { count, fraction, plainNumber, quantity } from '../units/schema.ts';
import type { BlockFault, BlockKind, SettingsFault } from './block.ts';
import { exactlyOne } from './checks.ts';
import { hotDischarge, type IdleCooler, idleIntercooling, liquidAtSuction } from './compressor-warnings.ts';
import { createKnockOut } from './knock-out.ts';
import { createMachineStage, type MachineStage } from './machine-stage.ts';
import { followPressure, keepFlows } from './outlet-slopes.ts';
import { quietReport } from './report.ts';
import { stageRatio } from './stage-ratio.ts';
import { carryAlongTrain, type Train } from './train-slopes.ts';

const settings = z.strictObject({
  pressure: quantity('pressure', { description: 'discharge pressure' }).optional(),
  ratio: plainNumber({ min: 1, description: 'discharge over suction pressure', examples: [1.05] }).optional(),
  pressure_rise: quantity('pressureDifference', {
    min: 0,
    description: 'discharge less suction pressure',
    examples: ['12 bar'],
  }).optional(),
  efficiency: fraction({
    min: 0.05,
    description: 'isentropic efficiency of each stage, 75 % if left out',
    examples: ['78 %'],
  }).optional(),
  polytropic_efficiency: fraction({
    min: 0.4,
    description: 'polytropic efficiency of each stage, instead of the isentropic one',
    examples: ['82 %'],
  }).optional(),
  stages: count({
    max: 12,
    description: 'number of stages of equal pressure ratio, 1 if left out',
    examples: [3],
  }).optional(),
  intercooling: quantity('temperature', {
    description: 'temperature behind the coolers between stages; not cooled if left out',
    examples: ['40 degC'],
  }).optional(),
  pressure_drop_per_cooler: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost in each cooler between stages, none if left out',
    examples: ['0.5 bar'],
  }).optional(),
  knock_out: z
    .boolean()
    .meta({
      description: 'take out what condenses between stages, by the outlet condensate; false if left out',
    })
    .optional(),
  drive_efficiency: fraction({
    min: 0.05,
    description: 'shaft power over power drawn, 100 % if left out',
    examples: ['95 %'],
  }).optional(),
  discharge_limit: quantity('temperature', {
    description: 'a stage hotter than this is warned of, 232 degC if left out',
    examples: ['150 degC'],
  }).optional(),
});
type Settings = z.infer<typeof settings>;

/** Isentropic efficiency where none is given. @source common practice for centrifugal machines, 72–85 % */
const EFFICIENCY = 0.75;
/**
 * Compressor: one inlet, one outlet at a higher pressure; with `knock_out` a second outlet `condensate`.
 *
 * Settings: one of `pressure` [Pa], `ratio` [-], `pressure_rise` [Pa]; `efficiency` (isentropic, of each
 * stage) or `polytropic_efficiency`; `stages` of equal pressure ratio; `intercooling` [K] between stages with
 * `pressure_drop_per_cooler` [Pa] and `knock_out`; `drive_efficiency`; `discharge_limit` [K].
 * Balance: each stage takes its work adiabatically (see machine-stage.ts); the coolers take out heat between
 * stages; the liquid that the drums behind them take out is let down to the first drum and leaves there (see
 * knock-out.ts). Power drawn = shaft power / drive efficiency; drive losses are not given to the process.
 *
 * Inside a recycle the suction pressure is a guess, and may be above a set `pressure` before the recycle has come round: the
 * gas is then let down as by a valve. If it is still so when the loop has closed, that is a fault.
 */
export const compressor: BlockKind<Settings> = {
  kind: 'compressor',
  summary: 'raises the pressure of a gas, in one or more stages',
  settings,
  models: () => ['real isentrope by the entropies of the mixture'],
  ports: ({ knock_out }) => ({ inlets: ['in'], outlets: knock_out ? ['out', 'condensate'] : ['out'] }),
  check: (setting) => [
    ...exactlyOne(setting, {
      pressure: 'pressure: 200 bar',
      ratio: 'ratio: 1.05',
      pressure_rise: 'pressure_rise: 12 bar',
    }),
    ...twoEfficiencies(setting),
    ...coolingWithoutStages(setting),
    ...withoutCoolers(setting),
  ],
  passes: (setting, outlet, _, role) => {
    if (!setting.knock_out) return true;
    return outlet === 'condensate' ? role !== 'gas' : role !== 'solid';
  },
  mayHoldBack: ({ pressure }) => pressure !== undefined,
  asksForHeat: (setting, asked) => asked || setting.knock_out === true,
  create(setting, { mixture }) {
    const machines: MachineStage[] = [];
    /** by stage: is it cooled before it? */
    const cooled: boolean[] = [];
    const drums = createKnockOut(mixture);
    let shaftW = 0;
    let coolingW = 0;
    let hottestK = 0;
    let wetAtInlet = false;
    let wetBetween = false;
    let idleCooler: IdleCooler | null = null;
    /** that let the pressure down and cooled nothing */
    let idleDrop = false;
    let ratio = 1;
    /** suction pressure above that of the discharge, which lets the gas down; null where the machine compresses [Pa] */
    let aboveDischargePa: number | null = null;
    return {
      pass([inlet], [out, condensate]) {
        const stages = setting.stages ?? 1;
        const drop = setting.intercooling === undefined ? 0 : (setting.pressure_drop_per_cooler ?? 0);
        shaftW = 0;
        coolingW = 0;
        hottestK = 0;
        idleCooler = null;
        idleDrop = false;
        wetAtInlet = inlet!.vapourFraction < 1;
        wetBetween = false;
        copyStream(inlet!, out!);
        drums.start();
        const target = dischargePressure(setting, inlet!.pressurePa);
        if (target < inlet!.pressurePa * (1 - 1e-9)) {
          aboveDischargePa = inlet!.pressurePa;
          out!.pressurePa = target;
          mixture.settleAtEnthalpy(out!, inlet!.enthalpyW);
          if (condensate) drums.collect(condensate, out!.temperatureK, target);
          return;
        }
        aboveDischargePa = null;
        ratio = stageRatio(inlet!.pressurePa, target, stages, drop);
        let firstDrumPa = inlet!.pressurePa;
        for (let k = 1; k <= stages; k++) {
          if (k > 1) {
            coolBetween(out!, k, drop);
            if (setting.knock_out) drums.drain(out!);
            else wetBetween ||= !wetAtInlet && out!.vapourFraction < 1;
            if (k === 2) firstDrumPa = out!.pressurePa;
          }
          const pressurePa = k === stages ? target : out!.pressurePa * ratio;
          shaftW += compress(k, out!, pressurePa);
          hottestK = Math.max(hottestK, out!.temperatureK);
        }
        if (condensate) drums.collect(condensate, setting.intercooling ?? out!.temperatureK, firstDrumPa);
      },
      ...(setting.knock_out ? {} : { passFlows }),
      slopes(_, __, { width, of: [[matrix]], flowsOnly }) {
        const pressureSlope = setting.ratio ?? (setting.pressure_rise === undefined ? 0 : 1);
        if (flowsOnly && !setting.knock_out) {
          keepFlows(matrix, mixture.size);
          followPressure(matrix, mixture.size, pressureSlope);
          return true;
        }
        if (setting.knock_out || idleDrop || aboveDischargePa !== null) return false;
        for (let i = 0; i < width; i++) matrix[i * width + i] = 1;
        const train: Train = {
          stages: machines.slice(0, setting.stages ?? 1),
          ratio,
          pressureSlope,
          cools: (stage) => cooled[stage],
        };
        return carryAlongTrain(train, mixture.size, matrix);
      },
      report(_, outlets) {
        const drawnW = shaftW / (setting.drive_efficiency ?? 1);
        return quietReport({
          dutyW: coolingW,
          powerW: drawnW,
          driveLossW: drawnW - shaftW,
          details: {
            shaft_power_kW: shaftW / 1e3,
            stages: setting.stages ?? 1,
            discharge_K: hottestK,
            intercooling_duty_kW: coolingW / 1e3,
            ...(outlets[1] ? { condensate_kmol_h: mixture.total(outlets[1]) * 3.6 } : {}),
          },
          faults: aboveDischargePa === null ? [] : [fallingPressure(setting.pressure!, aboveDischargePa)],
          warnings: [
            ...(wetAtInlet
              ? [liquidAtSuction('enters a stage; take it out before it with a condenser')]
              : []),
            ...(wetBetween
              ? [liquidAtSuction('condenses between stages; take it out with knock_out: true')]
              : []),
            ...(idleCooler ? [idleIntercooling(idleCooler, setting.intercooling!)] : []),
            ...hotDischarge(hottestK, setting.discharge_limit),
          ],
          assumptions: [
            ...(setting.efficiency === undefined && setting.polytropic_efficiency === undefined
              ? [`Isentropic efficiency ${100 * EFFICIENCY} % (common practice; none given).`]
              : []),
            ...(setting.drive_efficiency === undefined
              ? ['Power is that of the shaft: no drive efficiency is given.']
              : []),
          ],
        });
      },
    };

    function passFlows([inlet]: readonly StreamState[], [out]: readonly StreamState[]): void {
      out!.flowsMolPerS.set(inlet!.flowsMolPerS);
      out!.pressurePa = dischargePressure(setting, inlet!.pressurePa);
    }

    function compress(k: number, stream: StreamState, pressurePa: number): number {
      machines[k - 1] ??= createMachineStage(mixture);
      const stage = machines[k - 1];
      return setting.polytropic_efficiency === undefined
        ? stage.compress(stream, pressurePa, setting.efficiency ?? EFFICIENCY, 'isentropic')
        : stage.compress(stream, pressurePa, setting.polytropic_efficiency, 'polytropic');
    }

    /** The cooler before stage k. One set hotter than the discharge it is to cool does nothing. */
    function coolBetween(stream: StreamState, k: number, drop: number): void {
      cooled[k] = setting.intercooling !== undefined && setting.intercooling < stream.temperatureK;
      if (setting.intercooling === undefined) return;
      const before = stream.enthalpyW;
      stream.pressurePa -= drop;
      if (cooled[k]) {
        stream.temperatureK = setting.intercooling;
        mixture.settle(stream);
        coolingW += stream.enthalpyW - before;
        return;
      }
      if (mixture.total(stream) > 0) idleCooler ??= { behind: k - 1, dischargeK: stream.temperatureK };
      idleDrop ||= drop > 0;
      if (drop > 0) mixture.settleAtEnthalpy(stream, before);
    }
  },
};

function dischargePressure(setting: Settings, inletPa: number): number {
  return (
    setting.pressure ?? (setting.ratio ? inletPa * setting.ratio : inletPa + (setting.pressure_rise ?? 0))
  );
}

/** Only a set pressure can lie below the suction: ratio and rise are 1 and 0 at least. */
function fallingPressure(dischargePa: number, suctionPa: number): BlockFault {
  return {
    code: 'pressure-fall',
    path: ['pressure'],
    what: `The compressor is set to ${(dischargePa / 1e5).toFixed(3)} bar, below its suction of ${(suctionPa / 1e5).toFixed(3)} bar.`,
    why: 'a compressor raises the pressure',
    mend: 'raise the discharge pressure, or use a valve',
  };
}

function coolingWithoutStages(setting: Settings): SettingsFault[] {
  if (setting.intercooling === undefined || (setting.stages ?? 1) > 1) return [];
  return [
    {
      path: ['intercooling'],
      code: 'idle-setting',
      what: 'Intercooling is set on a compressor of one stage.',
      why: 'coolers stand between stages, and there is only one',
      mend: 'set stages to 2 or more, or take intercooling out and put a heater behind the compressor',
    },
  ];
}

function withoutCoolers(setting: Settings): SettingsFault[] {
  if (setting.intercooling !== undefined) return [];
  return (['knock_out', 'pressure_drop_per_cooler'] as const)
    .filter((key) => setting[key])
    .map((key) => ({
      path: [key],
      code: 'idle-setting',
      what: `${key} is set on a compressor without intercooling.`,
      why: 'it belongs to the coolers between stages, and there are none',
      mend: `add intercooling, e.g. intercooling: 40 degC, with stages: 2 or more, or take ${key} out`,
    }));
}

function twoEfficiencies(setting: Settings): SettingsFault[] {
  if (setting.efficiency === undefined || setting.polytropic_efficiency === undefined) return [];
  return [
    {
      path: ['polytropic_efficiency'],
      code: 'too-many-settings',
      what: 'efficiency and polytropic_efficiency are given together.',
      why: 'each of them fixes the work of a stage',
      mend: 'keep one and take out the other',
    },
  ];
}
