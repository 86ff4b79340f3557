import type { RateLaw } from '../chemistry/rate-laws/rate-law.ts';
import { rateLaws } from '../chemistry/rate-laws/rate-laws.ts';
import type { BlockContext, BlockKind, Unit } from './block.ts';
import { kineticBedFaults } from './kinetic-bed-checks.ts';
import { createBedChemistry } from './kinetic-bed-chemistry.ts';
import { createBedPath } from './kinetic-bed-path.ts';
import { createBedReport } from './kinetic-bed-report.ts';
import { type KineticBedSettings, kineticBedSettings } from './kinetic-bed-settings.ts';

/**
 * Kinetic bed: one inlet, one outlet. A fixed bed of catalyst in plug flow with a published rate law, to see what
 * an equilibrium reactor hides: how far the gas gets with the catalyst there is, and with which approach.
 *
 * Settings: `rate_law`; `reactions` [names of the flowsheet's reactions that the law runs]; `volume` [m3] or
 * `catalyst_mass` [kg], with `bulk_density` [kg/m3] where the law counts the other way; `activity`;
 * `effectiveness` [0–1, or `published`] with `conversion_before`; `equilibrium` (`flowsheet`, or `authors`); one of
 * `adiabatic`, `temperature` [K, of the whole bed], `cooling` {temperature [K], heat_transfer [W/(m3 K)]};
 * `pressure_drop` [Pa, even along the bed].
 * Balance: dξ/dV = rate(T, P, n); at every point of the bed the enthalpy is that of the inlet and the heat
 * exchanged up to there.
 *
 * By default the reactions stop where the constants and fugacities of the flowsheet say, so that with catalyst
 * enough the outlet is that of a reactor at equilibrium; `equilibrium: authors` keeps the law as printed.
 */
export const kineticBed: BlockKind<KineticBedSettings> = {
  kind: 'kinetic_bed',
  summary: 'runs a published rate law along a bed of catalyst',
  settings: kineticBedSettings,
  ports: () => ({ inlets: ['in'], outlets: ['out'] }),
  check: kineticBedFaults,
  reactionsIn: (setting) => setting.reactions,
  models: (setting) => [`rate law: ${rateLaws.get(setting.rate_law)?.source ?? setting.rate_law}`],
  equilibriaIn: (setting) => (setting.equilibrium === 'authors' ? [] : setting.reactions),
  create: (setting, context) => createKineticBed(setting, context),
};

function createKineticBed(setting: KineticBedSettings, context: BlockContext): Unit {
  const { mixture, reactions } = context;
  const law: RateLaw = rateLaws.get(setting.rate_law)!;
  const named = setting.reactions.map((name) => reactions.find((one) => one.name === name)!);
  const chemistry = createBedChemistry(law, named, mixture, setting);
  const path = createBedPath(setting, law, chemistry, mixture);
  const report = createBedReport(setting, law, chemistry, path, context);
  return {
    pass: ([inlet], [out]) => path.pass(inlet!, out!),
    evaluations: path.evaluations,
    report: ([inlet], [out]) => report(inlet!, out!),
  };
}
