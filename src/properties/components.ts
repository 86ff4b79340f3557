import type { Component, LiquidData } from '../model/component.ts';
import { molarMass } from './chemical-formula.ts';
import { antoine } from './data/antoine.ts';
import { liquids } from './data/liquids.ts';
import { nasa9 } from './data/nasa9.ts';
import { saturatedVolumes } from './data/saturated-volumes.ts';
import { FORMATION_ATCT_SOURCE, HEATING_VALUE_SOURCE, species } from './data/species.ts';
import { wideVapourPressure } from './data/wide-vapour-pressure.ts';

/** Ids of the components Looptally knows, in the order they are listed. */
export const builtInIds: readonly string[] = Object.keys(species);

const assembled = new Map<string, Component>();

/**
 * A component with everything the tables know about it; undefined for an unknown id. It is put together at
 * the first request and the same object afterwards, so that a flowsheet pays for its own components only.
 */
export function builtInComponent(id: string): Component | undefined {
  const known = assembled.get(id);
  if (known || !Object.hasOwn(species, id)) return known;
  const component = assemble(id);
  assembled.set(id, component);
  return component;
}

function assemble(id: string): Component {
  const row = species[id];
  const gas = nasa9[id];
  return {
    id,
    name: row.name,
    formula: row.formula,
    cas: row.cas,
    elements: row.elements,
    molarMassKgPerMol: molarMass(row.elements),
    solid: row.solid,
    idealGas: gas.intervals,
    critical: row.critical && {
      temperatureK: row.critical.temperatureK,
      pressurePa: row.critical.pressurePa,
      acentricFactor: row.critical.acentricFactor,
    },
    boilingK: row.boilingK,
    antoine: antoine[id]?.sets ?? [],
    wideVapourPressure: wideVapourPressure[id]?.curve ?? null,
    liquid: liquidOf(id),
    lowerHeatingJPerMol: row.lowerHeatingJPerMol,
    higherHeatingJPerMol: row.higherHeatingJPerMol,
    note: row.note,
    sources: sourcesOf(id),
    custom: false,
  };
}

function liquidOf(id: string): LiquidData | null {
  const row = liquids[id];
  if (!row) return null;
  const table = saturatedVolumes[id];
  return {
    rackettZ: row.rackett?.z ?? null,
    tableK: table?.temperatureK ?? [],
    tableVolumeM3PerMol: table?.volumeM3PerMol ?? [],
    tableGasCompressibility: table?.gasCompressibility ?? [],
    vaporisationAtBoilingJPerMol: row.vaporisationAtBoilingJPerMol,
    watsonExponent: row.watsonExponent,
    fixedVolumeM3PerMol: table || row.rackett ? null : row.volumeAt298M3PerMol,
  };
}

function sourcesOf(id: string): Record<string, string> {
  const row = species[id];
  const found: Record<string, string | undefined> = {
    'molar mass': 'IUPAC abridged standard atomic weights 2021',
    critical: row.critical?.source,
    'boiling point': row.boilingSource,
    'ideal gas': nasa9[id].source,
    'formation enthalpy': row.formationAtctJPerMol === null ? undefined : FORMATION_ATCT_SOURCE,
    'vapour pressure': antoine[id] && `Antoine sets fitted to: ${antoine[id].source}`,
    'vapour pressure slope': wideVapourPressure[id]?.source,
    liquid: liquids[id]?.source,
    'liquid volume': saturatedVolumes[id]?.source ?? liquids[id]?.source,
    'heating value': row.lowerHeatingJPerMol > 0 ? HEATING_VALUE_SOURCE : undefined,
  };
  return Object.fromEntries(Object.entries(found).filter((e): e is [string, string] => Boolean(e[1])));
}
