import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';
import type { Mixture } from '../properties/mixture.ts';
import { flow, fraction } from '../units/schema.ts';
import type { BlockKind, SettingsFault } from './block.ts';
import { exactlyOne } from './checks.ts';
import { followPressure, keepFlows, keepTemperature } from './outlet-slopes.ts';
import { portName } from './port-name.ts';
import { quietReport } from './report.ts';

const settings = z.strictObject({
  fractions: z
    .record(portName, fraction({ description: 'share of the inlet that leaves by this outlet' }))
    .optional()
    .meta({
      description: 'shares by outlet; what is left leaves by the outlet rest. One of fractions and flows',
      examples: [{ bleed: '3 %' }],
    }),
  flows: z
    .record(portName, flow({ description: 'flow that leaves by this outlet' }))
    .optional()
    .meta({
      description: 'flows by outlet; what is left leaves by the outlet rest. One of fractions and flows',
      examples: [{ bleed: '120 kmol/h' }],
    }),
});
type Settings = z.infer<typeof settings>;

/**
 * Splitter: one inlet, the named outlets and `rest`; all outlets have the state of the inlet.
 *
 * Settings: `fractions` [0–1 of the inlet by name] or `flows` [mol/s, kg/s or normal m3/s by name].
 * Balance: the outlets add up to the inlet, component by component.
 */
export const splitter: BlockKind<Settings> = {
  kind: 'splitter',
  summary: 'divides a stream, e.g. the purge from the recycle',
  settings,
  ports: (setting) => ({ inlets: ['in'], outlets: [...outletNames(setting), 'rest'] }),
  check: (setting) => [
    ...exactlyOne(setting, { fractions: 'fractions: {bleed: 3 %}', flows: 'flows: {bleed: 120 kmol/h}' }),
    ...sumAboveOne(setting),
  ],
  passes: (setting, outlet) => share(setting, outlet) > 0,
  asksForHeat: (_, asked) => asked,
  create(setting, { mixture }) {
    const names = outletNames(setting);
    return {
      pass(inlets, outlets) {
        const inlet = inlets[0];
        let left = 1;
        for (let k = 0; k < names.length; k++) {
          const part = setting.fractions
            ? setting.fractions[names[k]]
            : partOfFlow(setting, names[k], inlet, mixture);
          left -= part;
          takeShare(inlet, part, outlets[k]);
        }
        if (left < -1e-12) throw tooMuch(left);
        takeShare(inlet, Math.max(left, 0), outlets[names.length]);
        // The rest is what the others leave, so that nothing is lost to rounding.
        const rest = outlets[names.length];
        for (let i = 0; i < mixture.size; i++) {
          let flows = inlet.flowsMolPerS[i];
          for (let k = 0; k < names.length; k++) flows -= outlets[k].flowsMolPerS[i];
          rest.flowsMolPerS[i] = Math.max(flows, 0);
          rest.liquidMolPerS[i] = Math.min(rest.liquidMolPerS[i], rest.flowsMolPerS[i]);
        }
      },
      slopes([inlet], outlets, { width, of }) {
        const { size } = mixture;
        const total = mixture.total(inlet!);
        if (setting.flows && total === 0) return false;
        const rest = of[names.length][0];
        keepFlows(rest, size);
        for (let k = 0; k < outlets.length; k++) {
          const [matrix] = of[k];
          keepTemperature(matrix, size);
          followPressure(matrix, size);
          if (k === names.length) continue;
          keepFlows(
            matrix,
            size,
            setting.fractions ? setting.fractions[names[k]] : mixture.total(outlets[k]) / total,
          );
          if (setting.flows) keepFlowOf(setting.flows[names[k]].per, inlet!, outlets[k], mixture, matrix);
          for (let entry = 0; entry < size * width; entry++) rest[entry] -= matrix[entry];
        }
        return true;
      },
      report(inlets, outlets) {
        const total = mixture.total(inlets[0]);
        const shares = Object.fromEntries(
          [...names, 'rest'].map((name, k) => [name, total > 0 ? mixture.total(outlets[k]) / total : 0]),
        );
        return quietReport({ details: { fractions: shares } });
      },
    };
  },
};

function outletNames(setting: Settings): string[] {
  return Object.keys(setting.fractions ?? setting.flows ?? {});
}

/** The share that is known before solving; 0.5 stands for "some" where a flow is set. */
function share(setting: Settings, outlet: string): number {
  const { fractions } = setting;
  if (!fractions) return 0.5;
  if (outlet !== 'rest') return fractions[outlet] ?? 0;
  return 1 - Object.values(fractions).reduce((sum, part) => sum + part, 0);
}

function sumAboveOne(setting: Settings): SettingsFault[] {
  const sum = Object.values(setting.fractions ?? {}).reduce((total, part) => total + part, 0);
  if (sum <= 1 + 1e-12) return [];
  return [
    {
      path: ['fractions'],
      code: 'split-above-one',
      what: `The fractions add up to ${(100 * sum).toFixed(4).replace(/\.?0+$/, '')} %.`,
      why: 'a splitter cannot give out more than it takes in',
      mend: 'lower them until they add up to 100 % or less; what is left leaves by the outlet rest',
    },
  ];
}

function partOfFlow(setting: Settings, name: string, inlet: StreamState, mixture: Mixture): number {
  const wanted = setting.flows![name];
  const moles = mixture.total(inlet);
  if (moles === 0) return 0;
  const inletFlow = {
    molar: moles,
    mass: mixture.mass(inlet),
    normalVolume: moles * NORMAL_VOLUME_M3_PER_MOL,
  }[wanted.per];
  return wanted.value / inletFlow;
}

/** More of a component in the inlet leaves a smaller share of it for an outlet whose flow is set. */
function keepFlowOf(
  per: 'molar' | 'mass' | 'normalVolume',
  inlet: StreamState,
  outlet: StreamState,
  mixture: Mixture,
  matrix: Float64Array,
): void {
  const { size, components } = mixture;
  const whole = per === 'mass' ? mixture.mass(inlet) : mixture.total(inlet);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      const counts = per === 'mass' ? components[j].molarMassKgPerMol : 1;
      matrix[i * (size + 2) + j] -= (outlet.flowsMolPerS[i] * counts) / whole;
    }
  }
}

function takeShare(from: StreamState, part: number, to: StreamState): void {
  to.temperatureK = from.temperatureK;
  to.pressurePa = from.pressurePa;
  to.vapourFraction = from.vapourFraction;
  to.enthalpyW = part * from.enthalpyW;
  for (let i = 0; i < from.flowsMolPerS.length; i++) {
    to.flowsMolPerS[i] = part * from.flowsMolPerS[i];
    to.liquidMolPerS[i] = part * from.liquidMolPerS[i];
  }
}

function tooMuch(left: number): PassTrouble {
  return new PassTrouble(
    'split-above-one',
    `The flows set in the splitter are ${(100 * (1 - left)).toFixed(2)} % of what enters it.`,
    'a splitter cannot give out more than it takes in',
    'lower the flows, or set fractions instead',
  );
}
