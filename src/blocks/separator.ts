import { z } from 'zod';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { fraction, quantity } from '../units/schema.ts';
import type { BlockKind, SettingsFault } from './block.ts';
import { knownComponents } from './checks.ts';
import { followPressure, keepTemperature } from './outlet-slopes.ts';
import { portName } from './port-name.ts';
import { enthalpyAdded, quietReport } from './report.ts';

const settings = z.strictObject({
  recover: z
    .record(
      portName,
      z
        .record(z.string(), fraction({ description: 'share of the component that leaves by this outlet' }))
        .meta({
          description: 'shares by component that leave by this outlet',
          examples: [{ H2: '90 %', N2: '5 %' }],
        }),
    )
    .meta({
      description: 'by outlet the share of each component; what is left leaves by the outlet rest',
      examples: [{ permeate: { H2: '90 %', N2: '5 %' } }],
    }),
  pressures: z
    .record(
      z.string(),
      quantity('pressure', { description: 'pressure of this outlet, that of the inlet if left out' }),
    )
    .optional()
    .meta({
      description: 'pressures by outlet, rest among them; that of the inlet if left out',
      examples: [{ permeate: '30 bar' }],
    }),
});
type Settings = z.infer<typeof settings>;

/**
 * Separator by stated recoveries (membrane, adsorption, absorber, drier): one inlet, the named outlets and `rest`.
 *
 * Settings: `recover` {outlet: {component: 0–1}}; `pressures` [Pa] by outlet, default that of the inlet.
 * Balance: the outlets add up to the inlet, component by component; every outlet has the inlet's temperature,
 * and the heat this takes is reported as the duty.
 */
export const separator: BlockKind<Settings> = {
  kind: 'separator',
  summary: 'shares components between outlets by stated recoveries',
  settings,
  ports: (setting) => ({ inlets: ['in'], outlets: [...Object.keys(setting.recover), 'rest'] }),
  check: (setting, { components }) => [
    ...Object.entries(setting.recover).flatMap(([outlet, shares]) =>
      knownComponents(Object.keys(shares), components, (id) => ['recover', outlet, id]),
    ),
    ...recoveredTwice(setting),
    ...pressureOfNoOutlet(setting),
  ],
  passes: (setting, outlet, component) =>
    outlet === 'rest'
      ? recoveredShare(setting, component.id) < 1
      : (setting.recover[outlet]?.[component.id] ?? 0) > 0,
  create(setting, { mixture }) {
    const names = Object.keys(setting.recover);
    const ids = mixture.components.map((c) => c.id);
    return {
      pass(inlets, outlets) {
        const inlet = inlets[0];
        const rest = outlets[names.length];
        rest.flowsMolPerS.set(inlet.flowsMolPerS);
        for (let k = 0; k < names.length; k++) {
          const shares = setting.recover[names[k]];
          const out = outlets[k];
          for (let i = 0; i < mixture.size; i++) {
            const flow = (shares[ids[i]] ?? 0) * inlet.flowsMolPerS[i];
            out.flowsMolPerS[i] = flow;
            rest.flowsMolPerS[i] = Math.max(rest.flowsMolPerS[i] - flow, 0);
          }
        }
        for (let k = 0; k < outlets.length; k++) {
          const out = outlets[k];
          const name = names[k] ?? 'rest';
          out.temperatureK = inlet.temperatureK;
          out.pressurePa = setting.pressures?.[name] ?? inlet.pressurePa;
          if (out.pressurePa > inlet.pressurePa * (1 + 1e-9))
            throw raisesPressure(name, out.pressurePa, inlet.pressurePa);
          mixture.settle(out);
        }
      },
      slopes(_, outlets, { width, of }) {
        for (let k = 0; k < outlets.length; k++) {
          const name = names[k] ?? 'rest';
          const [matrix] = of[k];
          for (let i = 0; i < mixture.size; i++) matrix[i * width + i] = shareOf(setting, name, ids[i]);
          keepTemperature(matrix, mixture.size);
          if (setting.pressures?.[name] === undefined) followPressure(matrix, mixture.size);
        }
        return true;
      },
      report(inlets, outlets) {
        return quietReport({
          dutyW: enthalpyAdded(inlets, outlets),
          details: {
            outlet_kmol_h: Object.fromEntries(
              [...names, 'rest'].map((name, k) => [name, mixture.total(outlets[k]) * 3.6]),
            ),
          },
          assumptions: ['Its outlets leave at the temperature of its inlet.'],
        });
      },
    };
  },
};

function shareOf(setting: Settings, outlet: string, id: string): number {
  if (outlet === 'rest') return Math.max(1 - recoveredShare(setting, id), 0);
  return setting.recover[outlet]?.[id] ?? 0;
}

function recoveredShare(setting: Settings, id: string): number {
  return Object.values(setting.recover).reduce((sum, shares) => sum + (shares[id] ?? 0), 0);
}

function recoveredTwice(setting: Settings): SettingsFault[] {
  const ids = new Set(Object.values(setting.recover).flatMap((shares) => Object.keys(shares)));
  return [...ids]
    .filter((id) => recoveredShare(setting, id) > 1 + 1e-12)
    .map((id) => ({
      path: ['recover'],
      code: 'split-above-one',
      what: `The recoveries of ${id} add up to ${(100 * recoveredShare(setting, id)).toFixed(4).replace(/\.?0+$/, '')} %.`,
      why: 'a separator cannot give out more than it takes in',
      mend: `lower them until ${id} adds up to 100 % or less; what is left leaves by the outlet rest`,
    }));
}

function pressureOfNoOutlet(setting: Settings): SettingsFault[] {
  const outlets = [...Object.keys(setting.recover), 'rest'];
  return Object.keys(setting.pressures ?? {})
    .filter((name) => !outlets.includes(name))
    .map((name) => ({
      path: ['pressures', name],
      code: 'unknown-port',
      what: `A pressure is given for "${name}", which is no outlet of this separator.`,
      why: `its outlets are ${outlets.join(', ')}`,
      mend: 'name one of them',
    }));
}

function raisesPressure(name: string, wantedPa: number, inletPa: number): PassTrouble {
  return new PassTrouble(
    'pressure-rise',
    `The outlet ${name} is set to ${(wantedPa / 1e5).toFixed(3)} bar, above the inlet of ${(inletPa / 1e5).toFixed(3)} bar.`,
    'a separator cannot raise the pressure of a stream',
    'lower the pressure of that outlet, or put a compressor or pump behind it',
  );
}
