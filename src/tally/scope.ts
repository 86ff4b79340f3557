import type { BlockResult, Figures, StreamResult } from '../model/result.ts';

/**
 * What formulas may name (see flowsheet/formula-scope.ts): streams by tag, blocks by name, figures.
 *   streams.S2.n.Ar [kmol/h], y, m [kg/h], w, T [K], P [bar], flow [kmol/h], mass [kg/h], enthalpy [kW]
 *   blocks.condenser.duty [kW], power [kW] and the block's details
 */
export function formulaScope(
  streams: Readonly<Record<string, StreamResult>>,
  blocks: Readonly<Record<string, BlockResult>>,
  figures: Figures,
  molarMassKgPerMol: Readonly<Record<string, number>>,
): Record<string, unknown> {
  return {
    streams: mapValues(streams, (s) => streamScope(s, molarMassKgPerMol)),
    blocks: mapValues(blocks, (b) => ({ ...b.details, duty: b.duty_kW, power: b.power_kW })),
    figures,
  };
}

function streamScope(s: StreamResult, molarMass: Readonly<Record<string, number>>): Record<string, unknown> {
  const m = mapValues(s.components_kmol_h, (n, id) => n * 1e3 * molarMass[id]);
  return {
    n: s.components_kmol_h,
    y: s.mole_fraction,
    m,
    w: mapValues(m, (mass) => (s.mass_kg_h > 0 ? mass / s.mass_kg_h : 0)),
    T: s.temperature_K,
    P: s.pressure_bar,
    flow: s.flow_kmol_h,
    mass: s.mass_kg_h,
    vapour_fraction: s.vapour_fraction,
    enthalpy: s.enthalpy_kW,
  };
}

function mapValues<A, B>(
  record: Readonly<Record<string, A>>,
  change: (value: A, key: string) => B,
): Record<string, B> {
  return Object.fromEntries(Object.entries(record).map(([key, value]) => [key, change(value, key)]));
}
