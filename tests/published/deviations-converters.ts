import { createMixture } from '../../src/properties/mixture.ts';
import {
  liquidWaterEnthalpy,
  saturationPressurePa,
  saturationTemperatureK,
  steamEnthalpy,
} from '../../src/properties/steam.ts';
import { components, mixtureOf, reaction, streamOf, trial } from '../blocks/helpers.ts';
import type { Row } from './deviations-row.ts';
import { percent } from './deviations-statistics.ts';
import { benchReactor } from './kinetics.ts';
import {
  liquidEnthalpy,
  saturationTemperatureK as saturationK,
  saturationPressureMPa,
  steamEnthalpy as steam,
} from './steam.ts';
import { fourBeds } from './sulphur-dioxide-beds.ts';

/** Converters in beds, the kinetic bed, and steam. */
export function converterRows(): Row[] {
  return [
    {
      what: 'kinetic bed: temperature along the adiabatic bench reactor of Vanden Bussche & Froment',
      source: 'inlet published (J. Catal. 161 (1996) 1); profile derived from the rate law independently',
      unit: 'K',
      deviations: benchProfile().map(({ at, ours, theirs }) => ({ at, value: ours - theirs })),
      remark: 'printed to 0.1 K; with the heats of the NASA tables, as the profile was derived',
    },
    {
      what: 'four adiabatic SO2 beds with coolers, outlet temperatures',
      source: 'derived independently from the Gibbs energies of King, Moats & Davenport 2013',
      unit: 'K',
      deviations: beds().map(({ outlet }, k) => ({
        at: `bed ${k + 1}`,
        value: outlet - 273.15 - fourBeds.rows[k][1],
      })),
      remark: 'K from our Gibbs energies',
    },
    {
      what: 'the same, conversion after each bed',
      source: 'as above',
      unit: '%',
      deviations: beds().map(({ conversion }, k) => percent(`bed ${k + 1}`, conversion, fourBeds.rows[k][2])),
    },
    {
      what: 'water and steam: saturation pressure and temperature, enthalpies',
      source: 'IAPWS R7-97(2012), test values',
      unit: '%',
      deviations: [
        ...saturationPressureMPa.map(([T, p]) => percent(`${T} K`, saturationPressurePa(T) / 1e6, p)),
        ...saturationK.map(([p, T]) => percent(`${p} MPa`, saturationTemperatureK(p * 1e6), T)),
        ...liquidEnthalpy.map(([T, p, h]) =>
          percent(`${T} K, ${p} MPa`, liquidWaterEnthalpy(T, p * 1e6) / 1e3, h),
        ),
        ...steam.map(([T, p, h]) => percent(`${T} K, ${p} MPa`, steamEnthalpy(T, p * 1e6) / 1e3, h)),
      ],
      remark: 'the formulation itself; nine digits printed',
    },
  ];
}

function benchProfile(): { at: string; ours: number; theirs: number }[] {
  const ids = ['H2', 'CO', 'CO2', 'N2', 'CH3OH', 'H2O'];
  const list = components(...ids);
  const graaf = { kind: 'published', name: 'graaf-1986' } as const;
  const reactions = [
    reaction('methanol', 'CO2 + 3 H2 <=> CH3OH + H2O', list, graaf),
    reaction('reverse_shift', 'CO2 + H2 <=> CO + H2O', list, graaf),
  ];
  const mixture = createMixture({ components: list, gas: 'ideal', dissolvedGases: true, basis: 'nasa' });
  const share = (id: string) => (benchReactor.feed as Readonly<Record<string, number>>)[id] ?? 0;
  const molarMass = list.reduce((sum, c) => sum + c.molarMassKgPerMol * share(c.id), 0);
  const flows = Object.fromEntries(ids.map((id) => [id, (benchReactor.feedKgPerS / molarMass) * share(id)]));
  const inlet = streamOf(mixture, { kelvin: benchReactor.kelvin, bar: benchReactor.bar, flows });
  const settings = {
    rate_law: 'vanden-bussche-froment-1996',
    reactions: ['methanol', 'reverse_shift'],
    catalyst_mass: `${benchReactor.catalystKg} kg`,
    adiabatic: true,
  };
  const { report } = trial('kinetic_bed', settings, mixture, [inlet], reactions);
  const profile = report.details['profile'] as { position: number[]; temperature_K: number[] };
  return benchReactor.profile.map(([position, kelvin]) => ({
    at: `${100 * position} % of the catalyst`,
    ours: profile.temperature_K[profile.position.findIndex((z) => Math.abs(z - position) < 1e-9)],
    theirs: kelvin,
  }));
}

function beds(): { outlet: number; conversion: number }[] {
  const ids = ['SO2', 'O2', 'SO3', 'N2'];
  const oxidation = [reaction('oxidation', 'SO2 + 1/2 O2 <=> SO3', components(...ids))];
  const mixture = mixtureOf(ids, { gas: 'ideal', reactions: oxidation });
  const feed = streamOf(mixture, {
    celsius: fourBeds.rows[0][0],
    bar: fourBeds.bar,
    flows: fourBeds.feedPercent,
  });
  const settings = {
    reactions: { oxidation: {} },
    beds: fourBeds.rows.map(([celsius]) => ({ inlet_temperature: `${celsius} degC` })),
  };
  const { report } = trial('reactor', settings, mixture, [feed], oxidation);
  const details = report.details['beds'] as Record<string, { outlet_K: number; conversion: { SO2: number } }>;
  return Object.values(details).map((bed) => ({ outlet: bed.outlet_K, conversion: bed.conversion.SO2 }));
}
