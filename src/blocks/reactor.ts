import { z } from 'zod';
import { emptyStream, type StreamState } from '../model/stream.ts';
import { solveState } from '../properties/solve-state.ts';
import { fraction, quantity } from '../units/schema.ts';
import { bedFaults, bedSettings, shotPorts } from './bed-settings.ts';
import type { BlockContext, BlockKind, SettingsFault, Unit } from './block.ts';
import { createCarbonReport } from './carbon-report.ts';
import { exactlyOne, pressureAfterDrop } from './checks.ts';
import { createConverterBeds } from './converter-beds.ts';
import { createEnthalpySlopes } from './enthalpy-slopes.ts';
import { createReactionRun } from './reaction-run.ts';
import { reactionFaults } from './reactor-checks.ts';
import { liquidWarnings } from './reactor-warnings.ts';
import { enthalpyAdded, lazily, quietReport } from './report.ts';
import { raiseSteam, STEAM, steamFaults, steamSettings } from './steam-raising.ts';

const settings = z.strictObject({
  reactions: z
    .record(
      z.string(),
      z.strictObject({
        approach: quantity('temperatureDifference', {
          min: 0,
          description: 'temperature approach to equilibrium, 0 K if left out',
        }).optional(),
        fraction_of_equilibrium: fraction({
          description: 'share of the extent at equilibrium that is run, in place of an approach',
        }).optional(),
        conversion: fraction({
          description: 'share of the key reactant that this reaction takes',
        }).optional(),
        of: z
          .string()
          .meta({ description: 'the key reactant of a conversion', examples: ['H2'] })
          .optional(),
      }),
    )
    .meta({
      description:
        'reactions of the flowsheet that run here, by name: to equilibrium by approach or fraction_of_equilibrium, or to a set conversion',
      examples: [{ synthesis: { approach: '10 K' } }, { shift: { conversion: '95 %', of: 'CO' } }],
    }),
  temperature: quantity('temperature', { description: 'outlet temperature; the duty follows' }).optional(),
  adiabatic: z
    .literal(true)
    .meta({ description: 'no heat is exchanged; one of temperature, adiabatic, duty and beds' })
    .optional(),
  duty: quantity('power', {
    description: 'heat added; negative for cooling',
    examples: ['-20 MW'],
  }).optional(),
  beds: z
    .array(bedSettings)
    .meta({
      description: 'adiabatic beds in series, each cooled, heated or quenched before it',
      examples: [[{ inlet_temperature: '400 degC' }, { inlet_temperature: '420 degC' }]],
    })
    .optional(),
  pressure_drop: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost, none if left out',
  }).optional(),
  steam: steamSettings.meta({ description: STEAM }).optional(),
});
type Settings = z.infer<typeof settings>;

/**
 * Reactor: one inlet (and one for each cold shot), one outlet. Each reaction named runs either to equilibrium at
 * the outlet, all equilibria at once, short of it by a temperature approach or a fraction of the way, or to a
 * set conversion; conversions are taken first, in the order written.
 *
 * Settings: `reactions` {name: {approach [K]} or {fraction_of_equilibrium [0–1]} or {conversion [0–1], of}}; one
 * of `temperature` [K, isothermal outlet], `adiabatic`, `duty` [W, positive heats], `beds` (adiabatic beds with
 * cooling or quench between them, see bed-settings.ts); `pressure_drop` [Pa]; `steam`
 * (what the heat given off could raise, see steam-raising.ts; changes no stream).
 * Balance: atoms are kept by every reaction; enthalpy out = enthalpy in + duty, formation enthalpies included.
 */
export const reactor: BlockKind<Settings> = {
  kind: 'reactor',
  summary: 'runs reactions to equilibrium or to a set conversion',
  settings,
  ports: (setting) => ({ inlets: ['in', ...shotPorts(setting.beds)], outlets: ['out'] }),
  check: (setting, known) => [
    ...exactlyOne(setting, {
      temperature: 'temperature: 450 degC',
      adiabatic: 'adiabatic: true',
      duty: 'duty: -20 MW',
      beds: 'beds: [{inlet_temperature: 400 degC}, {inlet_temperature: 420 degC}]',
    }),
    ...reactionFaults(setting.reactions, known),
    ...bedFaults(setting.beds, setting.pressure_drop, setting.reactions),
    ...steamFaults(setting.steam),
    ...steamWithoutHeat(setting),
  ],
  reactionsIn: (setting) => Object.keys(setting.reactions),
  models: (setting) =>
    Object.entries(setting.reactions).flatMap(([name, one]) =>
      one.conversion === undefined ? [] : [`${name}: set conversion of ${one.of}`],
    ),
  equilibriaIn: (setting) =>
    Object.entries(setting.reactions).flatMap(([name, one]) => (one.conversion === undefined ? [name] : [])),
  asksForHeat: ({ temperature }) => temperature === undefined,
  create: (setting, context) => {
    const { beds } = setting;
    return beds === undefined
      ? createReactor(setting, context)
      : createConverterBeds(setting as typeof setting & { beds: typeof beds }, context);
  },
};

function createReactor(setting: Settings, context: BlockContext): Unit {
  const { mixture } = context;
  const run = createReactionRun(setting.reactions, context);
  const carbon = createCarbonReport(mixture);
  const feed = emptyStream(mixture.size);
  const carrying = createEnthalpySlopes(mixture);
  let started = false;

  /** Outlet composition, phases and enthalpy at the outlet's temperature. */
  function reactAndSettle(out: StreamState): void {
    run.react(out.temperatureK, out.pressurePa, feed.flowsMolPerS, out.flowsMolPerS);
    mixture.settle(out);
  }

  function take(inlet: StreamState, out: StreamState): void {
    feed.flowsMolPerS.set(inlet.flowsMolPerS);
    out.flowsMolPerS.set(inlet.flowsMolPerS);
    out.pressurePa = pressureAfterDrop(inlet.pressurePa, setting.pressure_drop);
  }

  function passFlows([inlet]: readonly StreamState[], [out]: readonly StreamState[]): void {
    take(inlet!, out!);
    out!.temperatureK = setting.temperature!;
    run.react(out!.temperatureK, out!.pressurePa, feed.flowsMolPerS, out!.flowsMolPerS);
  }

  return {
    ...(setting.temperature === undefined ? {} : { passFlows }),
    pass([inlet], [out]) {
      take(inlet!, out!);
      if (setting.temperature !== undefined) {
        out!.temperatureK = setting.temperature;
        reactAndSettle(out!);
        return;
      }
      if (!started) out!.temperatureK = inlet!.temperatureK;
      started = true;
      const wantedW = inlet!.enthalpyW + (setting.duty ?? 0);
      solveState(out!, wantedW, 'enthalpy', reactAndSettle, (state) => state.enthalpyW);
      // As in Mixture.settleAtEnthalpy: the balance closes exactly, and nothing holds no enthalpy.
      if (mixture.total(out!) > 0) out!.enthalpyW = wantedW;
    },
    slopes([inlet], [out], { width, of }) {
      const [matrix] = of[0];
      if (setting.temperature === undefined) {
        return carrying.enter(inlet!, matrix) && carrying.reactAndLeave(run, out!, of[0]);
      }
      if (!run.slopes(out!.temperatureK, out!.pressurePa, matrix)) return false;
      for (let i = 0; i < mixture.size; i++) matrix[i * width + mixture.size] = 0;
      matrix[width * width - 1] = 1;
      return true;
    },
    report(inlets, outlets) {
      const inlet = inlets[0];
      const outlet = outlets[0];
      // Temperatures of equilibrium take many times a pass: worked out when they are asked for.
      let told: ReturnType<typeof run.report> | null = null;
      const ofReactions = () => (told ??= run.report(outlet.temperatureK));
      const atInlet = { name: 'inlet', stream: inlet };
      const atOutlet = { name: 'outlet', stream: outlet };
      const dutyW = setting.adiabatic ? 0 : enthalpyAdded(inlets, outlets);
      // The heat of reaction is given off at the temperature that the catalyst is held at.
      const steam = setting.steam && raiseSteam(setting.steam, dutyW, () => outlet.temperatureK);
      const report = quietReport({ dutyW });
      return Object.defineProperties(report, {
        details: lazily(() => ({
          inlet_K: inlet.temperatureK,
          outlet_K: outlet.temperatureK,
          outlet_bar: outlet.pressurePa / 1e5,
          ...ofReactions().details,
          ...carbon.details(inlet, outlet),
          ...(steam && { steam: steam.details }),
        })),
        warnings: lazily(() => [
          ...carbon.warnings([atInlet, atOutlet]),
          ...ofReactions().warnings,
          ...(steam?.warnings ?? []),
          ...liquidWarnings([atOutlet]),
          ...mixture.cautions(outlet),
        ]),
        assumptions: lazily(() => [...ofReactions().assumptions, ...(steam?.assumptions ?? [])]),
      });
    },
  };
}

function steamWithoutHeat(setting: Settings): SettingsFault[] {
  if (!setting.steam || !(setting.adiabatic || setting.beds)) return [];
  return [
    {
      path: ['steam'],
      code: 'idle-setting',
      what: `Steam is set on a reactor ${setting.beds ? 'of several beds' : 'without cooling'}.`,
      why: setting.beds
        ? 'it is counted for one cooler at a time'
        : 'an adiabatic reactor gives off no heat; its effluent carries it along',
      mend: 'put a heater that cools the effluent behind the reactor, and set steam there',
    },
  ];
}
