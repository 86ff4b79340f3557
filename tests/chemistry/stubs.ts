import type { Component } from '../../src/model/component.ts';
import type { GasModel } from '../../src/properties/gas-model.ts';

/** A component of which only id, atoms and state matter. */
export function species(id: string, elements: Record<string, number>, solid = false): Component {
  return {
    id,
    name: id,
    formula: id,
    cas: null,
    elements,
    molarMassKgPerMol: 0.02,
    solid,
    idealGas: [],
    critical: null,
    boilingK: null,
    antoine: [],
    wideVapourPressure: null,
    liquid: null,
    lowerHeatingJPerMol: 0,
    higherHeatingJPerMol: 0,
    note: '',
    sources: {},
    custom: false,
  };
}

/** The gas of a synthesis loop, graphite last. */
export const loopGas: readonly Component[] = [
  species('H2', { H: 2 }),
  species('N2', { N: 2 }),
  species('NH3', { N: 1, H: 3 }),
  species('CO', { C: 1, O: 1 }),
  species('CO2', { C: 1, O: 2 }),
  species('H2O', { H: 2, O: 1 }),
  species('CH4', { C: 1, H: 4 }),
  species('CH3OH', { C: 1, H: 4, O: 1 }),
  species('Ar', { Ar: 1 }),
  species('O2', { O: 2 }),
  species('C_gr', { C: 1 }, true),
];

export function idealGasModel(size: number): GasModel {
  return {
    name: 'ideal',
    size,
    lnPhi: (_T, _P, _y, out) => {
      out.fill(0);
    },
    lnPhiSlopes: (_T, _P, _y, perKelvin, perPascal) => {
      perKelvin.fill(0);
      perPascal.fill(0);
    },
    lnPhiByAmount: (_T, _P, _y, out) => {
      out.fill(0);
    },
    compressibility: () => 1,
    isLiquidLike: () => false,
    enthalpyDeparture: () => 0,
    enthalpyDepartureSlopes: (_T, _P, _y, out) => {
      out.perKelvin = 0;
      out.perPascal = 0;
    },
    entropyDeparture: () => 0,
    pureLnPhi: () => 0,
    pureCompressibility: () => 1,
    pureEnthalpyDeparture: () => 0,
  };
}

/** Coefficients by id, in the order of the components. */
export function coefficients(parts: Record<string, number>, components = loopGas): Float64Array {
  return Float64Array.from(components, (c) => parts[c.id] ?? 0);
}
