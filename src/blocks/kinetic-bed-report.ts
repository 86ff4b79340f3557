import type { RateLaw } from '../chemistry/rate-laws/rate-law.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { emptyStream, type StreamState } from '../model/stream.ts';
import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';
import { solveState } from '../properties/solve-state.ts';
import type { BlockContext, BlockReport } from './block.ts';
import { createCarbonReport } from './carbon-report.ts';
import type { BedChemistry } from './kinetic-bed-chemistry.ts';
import type { BedPath } from './kinetic-bed-path.ts';
import { type BedProfile, profileOf } from './kinetic-bed-profile.ts';
import { bedMass, bedVolume, type KineticBedSettings } from './kinetic-bed-settings.ts';
import { createReactionRun } from './reaction-run.ts';
import { liquidWarnings } from './reactor-warnings.ts';
import { enthalpyAdded, quietReport } from './report.ts';

/**
 * What a kinetic bed says of itself: the way through the bed in points to be drawn, its hottest place, and how near
 * to equilibrium the outlet is: `approach_K` and `fraction_of_equilibrium` are those that a reactor at equilibrium
 * needs to give the same outlet.
 */
export function createBedReport(
  setting: KineticBedSettings,
  law: RateLaw,
  chemistry: BedChemistry,
  path: BedPath,
  context: BlockContext,
): (inlet: StreamState, out: StreamState) => BlockReport {
  const { mixture } = context;
  const { reactions } = chemistry;
  const atEquilibrium = createReactionRun(
    Object.fromEntries(reactions.map(({ name }) => [name, {}])),
    context,
  );
  const carbon = createCarbonReport(mixture);

  const byReaction = <V>(of: (k: number) => V): Record<string, V> =>
    Object.fromEntries(reactions.map(({ name }, k) => [name, of(k)]));

  /** Share of the extent that equilibrium at the outlet's temperature and pressure would have. */
  function fractions(inlet: StreamState, out: StreamState): Record<string, number | null> {
    const product = new Float64Array(mixture.size);
    const wanted = tried(() => {
      atEquilibrium.react(out.temperatureK, out.pressurePa, inlet.flowsMolPerS, product);
      return atEquilibrium.extents();
    });
    const least = 1e-9 * mixture.total(inlet);
    return byReaction((k) => {
      const full = wanted?.[reactions[k].name] ?? 0;
      return Math.abs(full) > least ? path.extents[k] / full : null;
    });
  }

  /** Where an adiabatic bed would end with any amount of catalyst [K]. */
  function endless(inlet: StreamState, out: StreamState): number | null {
    const end = emptyStream(mixture.size);
    end.pressurePa = out.pressurePa;
    end.temperatureK = out.temperatureK;
    end.flowsMolPerS.set(out.flowsMolPerS);
    const react = (state: StreamState) => {
      atEquilibrium.react(state.temperatureK, state.pressurePa, inlet.flowsMolPerS, state.flowsMolPerS);
      mixture.settle(state);
    };
    return tried(() => {
      solveState(end, inlet.enthalpyW, 'enthalpy', react, (state) => state.enthalpyW);
      return end.temperatureK;
    });
  }

  function conversions(inlet: StreamState, out: StreamState): Record<string, number> {
    return Object.fromEntries(
      mixture.components.flatMap(({ id }, i) => {
        const fed = inlet.flowsMolPerS[i];
        const takes = reactions.some(({ coefficients }) => coefficients[i] < 0);
        return takes && fed > 0 ? [[id, (fed - out.flowsMolPerS[i]) / fed]] : [];
      }),
    );
  }

  return (inlet, out) => {
    const flow = mixture.total(inlet);
    const volume = bedVolume(setting);
    const profile = flow > 0 ? tried(() => profileOf(path, inlet, law, chemistry, mixture)) : null;
    const standing = reactions.map((_, k) =>
      chemistry.standing(k, out.temperatureK, out.pressurePa, out.flowsMolPerS),
    );
    const places = [
      { name: 'inlet', stream: inlet },
      { name: 'outlet', stream: out },
    ];
    return quietReport({
      dutyW: setting.adiabatic ? 0 : enthalpyAdded([inlet], [out]),
      details: {
        rate_law: law.name,
        inlet_K: inlet.temperatureK,
        outlet_K: out.temperatureK,
        outlet_bar: out.pressurePa / 1e5,
        hottest_K: profile?.hottestK ?? null,
        hottest_position: profile?.hottestPosition ?? null,
        volume_m3: volume,
        catalyst_kg: bedMass(setting),
        space_velocity_per_h:
          volume === null || volume === 0 ? null : (flow * NORMAL_VOLUME_M3_PER_MOL * 3600) / volume,
        extent_kmol_h: byReaction((k) => path.extents[k] * 3.6),
        conversion: conversions(inlet, out),
        approach_K: byReaction((k) => standing[k].approachK),
        equilibrium_K: byReaction((k) => standing[k].equilibriumK),
        fraction_of_equilibrium: flow > 0 ? fractions(inlet, out) : {},
        equilibrium_outlet_K: setting.adiabatic && flow > 0 ? endless(inlet, out) : null,
        effectiveness_inlet: profile?.effectivenessInlet ?? null,
        effectiveness_outlet: profile?.effectivenessOutlet ?? null,
        ...carbon.details(inlet, out),
        profile: profile?.columns ?? null,
      },
      warnings: [
        ...carbon.warnings(places),
        ...(profile ? rangeWarnings(law, profile, inlet, out) : []),
        ...liquidWarnings(places),
        ...mixture.cautions(out),
      ],
      assumptions: assumptionsOf(setting, law),
    });
  };
}

/** What a calculation gives, null where it cannot be done: a report does not fail. */
function tried<V>(calculation: () => V): V | null {
  try {
    return calculation();
  } catch (trouble) {
    if (trouble instanceof PassTrouble) return null;
    throw trouble;
  }
}

function rangeWarnings(
  { name, range }: RateLaw,
  { coldestK, hottestK }: BedProfile,
  inlet: StreamState,
  out: StreamState,
): BlockReport['warnings'] {
  const celsius = (T: number) => `${(T - 273.15).toFixed(0)}`;
  const bar = (P: number) => `${(P / 1e5).toFixed(0)}`;
  const beyond: string[] = [];
  if (coldestK < range.fromK || hottestK > range.toK) {
    beyond.push(
      `at ${celsius(coldestK)} to ${celsius(hottestK)} degC, measured at ${celsius(range.fromK)} to ${celsius(range.toK)} degC`,
    );
  }
  if (out.pressurePa < range.fromPa || inlet.pressurePa > range.toPa) {
    beyond.push(
      `at ${bar(inlet.pressurePa)} bar, measured at ${bar(range.fromPa)} to ${bar(range.toPa)} bar`,
    );
  }
  return beyond.map((how) => ({
    code: 'rate-law-out-of-range',
    message: `the rate law ${name} is used ${how}`,
  }));
}

function assumptionsOf(setting: KineticBedSettings, law: RateLaw): string[] {
  const activities = {
    one: 'partial pressures',
    'gas model': "the gas model's fugacities",
    own: "the authors' fugacities",
  }[law.fugacity];
  const brackets =
    setting.equilibrium === 'authors'
      ? "their equilibrium is the authors' own"
      : 'they stop where the constants and fugacities of the flowsheet say';
  const effectiveness =
    setting.effectiveness === 'published'
      ? [law.effectiveness!.note]
      : setting.effectiveness === undefined
        ? [
            `Effectiveness 1: the intrinsic rate${law.effectiveness ? ' (effectiveness: published takes that of the authors)' : ''}.`,
          ]
        : [];
  return [
    `Rates by ${law.name} (${law.source}) with ${activities}; ${brackets}. ${law.note}`,
    ...effectiveness,
    'Plug flow without radial or axial mixing, gas and catalyst at one temperature.',
  ];
}
