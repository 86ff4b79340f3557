import type { Result, StreamResult } from '../../src/model/result.ts';

function stream(
  from: string,
  to: string,
  state: {
    T: number;
    P: number;
    phase: StreamResult['phase'];
    vapour: number;
    H: number;
    S: number;
    density: number;
  },
  kmolPerH: Record<string, number>,
): StreamResult {
  const molarMass: Record<string, number> = { H2: 2.016, N2: 28.014, NH3: 17.031, Ar: 39.95 };
  const flow = Object.values(kmolPerH).reduce((sum, value) => sum + value, 0);
  const mass = Object.entries(kmolPerH).reduce((sum, [id, value]) => sum + value * molarMass[id]!, 0);
  return {
    from,
    to,
    temperature_K: state.T,
    pressure_bar: state.P,
    phase: state.phase,
    vapour_fraction: state.vapour,
    flow_kmol_h: flow,
    mass_kg_h: mass,
    normal_m3_h: flow * 22.413969545,
    enthalpy_kW: state.H,
    entropy_kW_K: state.S,
    density_kg_m3: state.density,
    components_kmol_h: kmolPerH,
    mole_fraction: Object.fromEntries(Object.entries(kmolPerH).map(([id, value]) => [id, value / flow])),
  };
}

/** An invented result with one of everything that a sheet has to show; its figures are no solution of a loop. */
export const exampleResult: Result = {
  looptally: 1,
  title: 'Ammonia loop, "condenser" study',
  case: 'cold condenser',
  convergence: {
    converged: true,
    method: 'anderson',
    passes: 9,
    residual: 1.234e-11,
    tears: ['S8'],
    history: [
      { pass: 1, residual: 0.81, worst: 'S8.H2', method: 'direct', note: '' },
      { pass: 2, residual: 0.0123, worst: 'S8.Ar', method: 'direct', note: '' },
      {
        pass: 3,
        residual: 1.234e-11,
        worst: 'S8.Ar',
        method: 'anderson',
        note: 'changed over: direct creeps',
      },
    ],
  },
  streams: {
    S1: stream(
      'makeup',
      'mixer',
      { T: 308.15, P: 200, phase: 'gas', vapour: 1, H: 401.5, S: -99.25, density: 60.1 },
      { H2: 4836, N2: 1612, NH3: 0, Ar: 52 },
    ),
    S2: stream(
      'mixer',
      'converter',
      { T: 301.4, P: 200, phase: 'gas', vapour: 1, H: -9120.4, S: -420.1, density: 71.3 },
      { H2: 17200.123, N2: 5733.4, NH3: 812.5, Ar: 2801 },
    ),
    S3: stream(
      'converter',
      'condenser',
      { T: 723.15, P: 196, phase: 'mixed', vapour: 0.99871, H: 51200, S: 12.5, density: 33.9 },
      { H2: 12400.5, N2: 4133.6, NH3: 4012, Ar: 2801 },
    ),
    S4: stream(
      'condenser.gas',
      'purge',
      { T: 248.15, P: 192, phase: 'gas', vapour: 1, H: -9000, S: -300, density: 80 },
      { H2: 12388.2, N2: 4125.5, NH3: 801, Ar: 2790 },
    ),
    S5: stream(
      'condenser.liquid',
      'out',
      { T: 248.15, P: 192, phase: 'liquid', vapour: 0, H: -61000.5, S: -200, density: 671 },
      { H2: 12.3, N2: 8.1, NH3: 3211, Ar: 11 },
    ),
    S6: stream(
      'purge.bleed',
      'out',
      { T: 248.15, P: 192, phase: 'gas', vapour: 1, H: -180, S: -6, density: 80 },
      { H2: 24.4, N2: 8.9, NH3: 1.6, Ar: 5.6 },
    ),
    S7: stream(
      'purge.rest',
      'circulator',
      { T: 248.15, P: 192, phase: 'gas', vapour: 1, H: -8820, S: -294, density: 80 },
      { H2: 12364.1, N2: 4121.4, NH3: 812.5, Ar: 2749 },
    ),
    S8: stream(
      'circulator',
      'mixer',
      { T: 252.9, P: 200, phase: 'gas', vapour: 1, H: -8500, S: -293.5, density: 81 },
      { H2: 12364.1, N2: 4121.4, NH3: 812.5, Ar: 1.2e-7 },
    ),
  },
  blocks: {
    mixer: { kind: 'mixer', duty_kW: 0, power_kW: 0, details: {} },
    converter: {
      kind: 'reactor',
      duty_kW: -48210.4,
      power_kW: 0,
      details: {
        carbon_activity: null,
        extents_kmol_h: { synthesis: 1599.75 },
        heat_of_reaction_kW: -42000.2,
        constant: 'Gibbs energies',
      },
    },
    condenser: {
      kind: 'condenser',
      duty_kW: -31044,
      power_kW: 0,
      details: { refrigeration_duty_kW: -12000, condensed: true },
    },
    purge: { kind: 'splitter', duty_kW: 0, power_kW: 0, details: {} },
    circulator: { kind: 'compressor', duty_kW: 0, power_kW: 812.34, details: {} },
  },
  figures: {
    per_pass_conversion: { converter: { H2: 0.27903, N2: 0.27905 } },
    overall_conversion: { H2: 0.99241, N2: 0.98945 },
    overall_yield: { product: 'NH3', reactant: 'H2', value: 0.9958 },
    production_t_d: 1312.5,
    recycle_ratio: 2.66124,
    inerts: { converter: 0.10553 },
    purge: {
      streams: ['S6'],
      flow_kmol_h: 40.5,
      fraction_of_makeup: 0.00623,
      lost_kmol_h: { H2: 24.4, N2: 8.9, NH3: 1.6, Ar: 5.6 },
      lost_fraction: { H2: 0.00505, N2: 0.00552, Ar: 0.10769 },
      lhv_MW: 1.78,
    },
    power_kW: { circulator: 812.34, refrigeration: 4100, total: 4912.34 },
    specific_power_kWh_t: 89.83,
    duty_kW: { mixer: 0, converter: -48210.4, condenser: -31044 },
    user: { hydrogen_slip: 0.00505, 'reactor outlet': 450, 'no value': null },
  },
  ledger: {
    H2: { in: 4836, formed: 0, consumed: 4799.3, out: { S5: 12.3, S6: 24.4 }, closure: 1.1e-12 },
    N2: { in: 1612, formed: 0, consumed: 1599.75, out: { S5: 8.1, S6: 8.9 }, closure: -2.94e-3 },
    NH3: { in: 0, formed: 3199.5, consumed: 0, out: { S5: 3211, S6: 1.6 }, closure: 4.1e-13 },
    Ar: { in: 52, formed: 0, consumed: 0, out: { S5: 11, S6: 5.6 }, closure: 0 },
  },
  closure: { mass: 3.2e-13, atoms: { H: 1.1e-12, N: 2.2e-12, Ar: 0 }, energy: 4.6e-12 },
  aims: {
    'inert cap': {
      reached: true,
      setting: 'purge.fractions.bleed',
      value: 0.00251,
      unit: '',
      target: 12,
      until: 'streams.S2.y.Ar = 12',
      achieved: 12.0000001,
      note: null,
    },
    'full yield': {
      reached: false,
      setting: 'condenser.temperature',
      value: 233.15,
      unit: 'K',
      target: 0.999,
      until: 'streams.S2.y.Ar = 0.999',
      achieved: 0.9958,
      note: 'the bound of -40 degC is in the way',
    },
  },
  warnings: [
    {
      code: 'below-range',
      where: 'condenser',
      message:
        'the vapour pressure of NH3 is used below the range it was fitted in, which is far from where this study works and makes this a long line',
    },
  ],
  assumptions: [
    'K(T) of synthesis from Gibbs energies (NASA polynomials, ATcT formation enthalpies).',
    'Gas <phase> by Soave-Redlich-Kwong with binary parameters | none for NH3-Ar.',
  ],
};
