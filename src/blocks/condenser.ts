import { z } from 'zod';
import type { Component } from '../model/component.ts';
import { emptyStream, type StreamState } from '../model/stream.ts';
import { vapourPressureRange } from '../properties/vapour-pressure.ts';
import { quantity } from '../units/schema.ts';
import type { BlockKind, SettingsFault } from './block.ts';
import { exactlyOne, knownComponents, pressureAfterDrop } from './checks.ts';
import { coolingSettings, createCoolingSplit } from './cooling.ts';
import { coolingFaults } from './cooling-faults.ts';
import { createDutySlopes } from './duty-slopes.ts';
import { heatCurve } from './heat-curve.ts';
import { settleWithDuty } from './heat-duty.ts';
import { partSlopes } from './outlet-slopes.ts';
import { partFlows, partPhases } from './phase-outlets.ts';
import { enthalpyAdded, quietReport } from './report.ts';

const settings = z.strictObject({
  temperature: quantity('temperature', {
    description: 'temperature of gas and condensate',
    examples: ['-5 degC', '40 degC'],
  }).optional(),
  duty: quantity('power', { description: 'heat added; negative for cooling' }).optional(),
  pressure_drop: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost on the gas side, none if left out',
  }).optional(),
  condense: z
    .array(z.string())
    .min(1)
    .meta({
      description:
        'components that share themselves between gas and liquid by vapour pressure; those with a critical temperature above 350 K if left out',
      examples: [['NH3']],
    })
    .optional(),
  cooling: coolingSettings
    .meta({
      description: 'shares the duty between cooling water and refrigeration; one duty if left out',
      examples: [{ water: '25 degC', approach: '10 K' }],
    })
    .optional(),
});
type Settings = z.infer<typeof settings>;

/** Below this, no cooling water reaches [K]. @source common practice: water of 15 to 30 degC */
const NEEDS_REFRIGERATION_K = 20 + 273.15;

/**
 * Condenser with separator: one inlet; outlets `gas` and `liquid` in equilibrium at one temperature.
 *
 * Settings: `temperature` [K] or `duty` [W, negative cools]; `pressure_drop` [Pa]; `condense` (ids that share
 * themselves by vapour pressure, instead of the rule in properties/component-roles); `cooling` (see cooling.ts).
 * Balance: gas and liquid add up to the inlet; the duty is the enthalpy that leaves less the one that enters.
 */
export const condenser: BlockKind<Settings> = {
  kind: 'condenser',
  summary: 'cools a stream and takes out what condenses',
  settings,
  models: (setting) =>
    setting.cooling ? ['refrigeration: Carnot times a second-law efficiency (common practice)'] : [],
  ports: () => ({ inlets: ['in'], outlets: ['gas', 'liquid'] }),
  check: (setting, { components }) => [
    ...exactlyOne(setting, { temperature: 'temperature: -5 degC', duty: 'duty: -12 MW' }),
    ...knownComponents(setting.condense ?? [], components, (_, index) => ['condense', index]),
    ...withoutVapourPressure(setting.condense ?? [], components),
    ...coolingFaults(setting.cooling, setting.temperature),
  ],
  passes: (setting, outlet, component, role) => {
    const actual = setting.condense ? (setting.condense.includes(component.id) ? 'condensable' : role) : role;
    if (actual === 'solid') return outlet === 'liquid';
    return outlet === 'gas' || actual !== 'gas';
  },
  mayHoldBack: ({ cooling }) => cooling !== undefined,
  asksForHeat: ({ temperature }) => temperature === undefined,
  create(setting, context) {
    const mixture = setting.condense ? context.mixture.withCondensables(setting.condense) : context.mixture;
    const mixed = emptyStream(mixture.size);
    const mixedSlopes = new Float64Array((mixture.size + 2) ** 2);
    const duty = createDutySlopes(mixture, context.mixture);
    const cooling = createCoolingSplit(mixture);

    function passFlows([inlet]: readonly StreamState[], [gas, liquid]: readonly StreamState[]): void {
      mixed.flowsMolPerS.set(inlet!.flowsMolPerS);
      mixed.pressurePa = pressureAfterDrop(inlet!.pressurePa, setting.pressure_drop);
      mixed.temperatureK = setting.temperature!;
      mixture.settleLiquid(mixed);
      partFlows(mixed, gas!, liquid!);
    }

    return {
      pass([inlet], [gas, liquid]) {
        mixed.flowsMolPerS.set(inlet!.flowsMolPerS);
        mixed.pressurePa = pressureAfterDrop(inlet!.pressurePa, setting.pressure_drop);
        if (setting.temperature !== undefined) {
          mixed.temperatureK = setting.temperature;
          mixture.settle(mixed);
        } else {
          settleWithDuty(mixture, mixed, inlet!.enthalpyW, setting.duty!);
        }
        partPhases(mixed, gas!, liquid!, mixture);
      },
      ...(setting.temperature === undefined ? {} : { passFlows }),
      slopes([inlet], _, { of: [[gas], [liquid]] }) {
        const temperatureIsSet = setting.temperature !== undefined;
        mixedSlopes.fill(0);
        if (!duty.fill(inlet!, mixed, { temperatureIsSet, pressureIsSet: false }, true, mixedSlopes))
          return false;
        partSlopes(duty.liquid, mixture.size, mixedSlopes, gas, liquid);
        return true;
      },
      report(inlets, outlets) {
        const [inlet] = inlets;
        const [gas, liquid] = outlets;
        const dutyW = enthalpyAdded(inlets, outlets);
        const split = setting.cooling ? cooling(inlet!, mixed, dutyW, setting.cooling) : null;
        const condensed = mixture.total(liquid!);
        const warnings = [];
        if (condensed === 0 && mixture.total(inlet!) > 0) {
          warnings.push({
            code: 'no-condensate',
            message: 'nothing condenses at this temperature and pressure',
          });
        }
        if (dutyW > 0 && gas!.temperatureK > inlet!.temperatureK) {
          warnings.push({
            code: 'condenser-heats',
            message: `it heats from ${(inlet!.temperatureK - 273.15).toFixed(1)} to ${(gas!.temperatureK - 273.15).toFixed(1)} degC instead of cooling`,
          });
        }
        if (!setting.cooling && mixed.temperatureK < NEEDS_REFRIGERATION_K && dutyW < 0) {
          warnings.push(notCounted(mixed.temperatureK));
        }
        return quietReport({
          dutyW,
          refrigerationW: split?.powerW ?? 0,
          details: {
            temperature_K: gas!.temperatureK,
            condensed_kmol_h: condensed * 3.6,
            gas_fraction: mixed.vapourFraction,
            ...split?.details,
          },
          warnings: [...warnings, ...mixture.cautions(mixed)],
          faults: split?.faults ?? [],
          assumptions: split?.assumptions ?? [],
          curves: () => ({ heat_curve: heatCurve(inlet!, mixed, mixture) }),
        });
      },
    };
  },
};

function notCounted(T: number): { code: string; message: string } {
  return {
    code: 'refrigeration-not-counted',
    message: `cooling water does not reach ${(T - 273.15).toFixed(1)} degC, and the power of the refrigeration is not counted; set cooling, e.g. cooling: {water: 25 degC, approach: 10 K}`,
  };
}

function withoutVapourPressure(ids: readonly string[], components: readonly Component[]): SettingsFault[] {
  return ids.flatMap((id, index) => {
    const component = components.find((c) => c.id === id);
    if (!component || (!component.solid && vapourPressureRange(component))) return [];
    return [
      {
        path: ['condense', index],
        code: 'no-vapour-pressure',
        what: `${id} cannot be named under condense.`,
        why: component.solid
          ? 'a solid is in neither gas nor liquid, and leaves with the liquid anyway'
          : `no vapour pressure of ${id} is known`,
        mend: component.solid ? 'take it out' : `give ${id} an Antoine set under components, or take it out`,
      },
    ];
  });
}
