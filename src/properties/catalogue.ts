import type { Component } from '../model/component.ts';
import { builtInComponent, builtInIds } from './components.ts';
import { antoine } from './data/antoine.ts';
import type { HenryRow } from './data/henry-constants.ts';
import { henryConstants } from './data/henry-constants.ts';
import { liquids } from './data/liquids.ts';
import { nasa9 } from './data/nasa9.ts';
import { saturatedVolumes } from './data/saturated-volumes.ts';
import { FORMATION_ATCT_SOURCE, HEATING_VALUE_SOURCE, species } from './data/species.ts';
import { wideVapourPressure } from './data/wide-vapour-pressure.ts';
import { createIdealGas } from './ideal-gas.ts';

/** One datum of a component, or one set of coefficients, as the `data` command shows it. */
export interface CatalogueRow {
  /** the kind of data the row belongs to: identity, ideal gas, vapour pressure, liquid, Henry constants */
  readonly group: string;
  readonly quantity: string;
  readonly value: number | string | Readonly<Record<string, number>>;
  readonly unit: string;
  /** temperatures between which it holds, null where that has no meaning */
  readonly range: { readonly fromK: number; readonly toK: number } | null;
  readonly source: string;
  readonly note: string;
}

/** Everything Looptally knows of one component. */
export interface CatalogueEntry {
  readonly id: string;
  readonly name: string;
  readonly formula: string;
  readonly cas: string;
  readonly note: string;
  readonly rows: readonly CatalogueRow[];
}

/** One line of the list of components. */
export interface CatalogueLine {
  readonly id: string;
  readonly name: string;
  readonly formula: string;
  readonly cas: string;
  readonly molarMassGPerMol: number;
  readonly boilingK: number | null;
  readonly criticalK: number | null;
  readonly note: string;
}

/** The components Looptally knows. */
export function catalogueList(): readonly CatalogueLine[] {
  return builtInIds.map((id) => {
    const c = builtInComponent(id)!;
    return {
      id,
      name: c.name,
      formula: c.formula,
      cas: c.cas!,
      molarMassGPerMol: grams(c),
      boilingK: c.boilingK,
      criticalK: c.critical?.temperatureK ?? null,
      note: c.note,
    };
  });
}

/** The data of one component with their sources; undefined for an unknown id. */
export function catalogueEntry(id: string): CatalogueEntry | undefined {
  const c = builtInComponent(id);
  if (!c) return undefined;
  const rows = [
    ...identityRows(c),
    ...idealGasRows(c),
    ...vapourPressureRows(id),
    ...liquidRows(id),
    ...henryRows(id),
  ];
  return { id, name: c.name, formula: c.formula, cas: c.cas!, note: c.note, rows };
}

/** Collects the rows of one group; a value of null leaves the row out. */
function group(name: string) {
  const rows: CatalogueRow[] = [];
  const add = (
    quantity: string,
    value: CatalogueRow['value'] | null | undefined,
    unit: string,
    source: string,
    extra: Partial<Pick<CatalogueRow, 'range' | 'note'>> = {},
  ) => {
    if (value === null || value === undefined) return;
    rows.push({ group: name, quantity, value, unit, range: null, source, note: '', ...extra });
  };
  return { rows, add };
}

function identityRows(c: Component): readonly CatalogueRow[] {
  const { rows, add } = group('identity');
  const row = species[c.id];
  const critical = row.critical;
  add('molar mass', grams(c), 'g/mol', c.sources['molar mass']);
  add('critical temperature', critical?.temperatureK, 'K', critical?.source ?? '');
  add('critical pressure', critical && critical.pressurePa / 1e5, 'bar', critical?.source ?? '');
  add('critical volume', critical && critical.volumeM3PerMol * 1e6, 'cm3/mol', critical?.source ?? '');
  add('acentric factor', critical?.acentricFactor, '-', critical?.source ?? '');
  add('boiling point at 1.01325 bar', row.boilingK, 'K', row.boilingSource);
  if (row.lowerHeatingJPerMol > 0) {
    add('lower heating value', row.lowerHeatingJPerMol / 1000, 'kJ/mol', HEATING_VALUE_SOURCE);
    add('higher heating value', row.higherHeatingJPerMol / 1000, 'kJ/mol', HEATING_VALUE_SOURCE);
  }
  return rows;
}

function idealGasRows(c: Component): readonly CatalogueRow[] {
  const { rows, add } = group('ideal gas');
  const { source } = nasa9[c.id];
  const row = species[c.id];
  const gas = createIdealGas([c], 'nasa');
  const out = new Float64Array(1);
  const at298 = (property: 'enthalpies' | 'entropies' | 'heatCapacities') => {
    gas[property](298.15, out);
    return out[0];
  };
  add('formation enthalpy, NASA', rounded(at298('enthalpies') / 1000, 3), 'kJ/mol', source);
  add(
    'formation enthalpy, used',
    row.formationAtctJPerMol === null ? null : row.formationAtctJPerMol / 1000,
    'kJ/mol',
    FORMATION_ATCT_SOURCE,
    { note: `uncertainty ${(row.formationAtctUncertaintyJPerMol ?? 0) / 1000} kJ/mol` },
  );
  add('entropy at 298.15 K, 1 bar', rounded(at298('entropies'), 3), 'J/(mol K)', source);
  add('heat capacity at 298.15 K', rounded(at298('heatCapacities'), 3), 'J/(mol K)', source);
  for (const interval of c.idealGas) {
    const [a1, a2, a3, a4, a5, a6, a7] = interval.a;
    const { b1, b1Atct, b2 } = interval;
    const shifted = b1Atct !== null && b1Atct !== b1 ? { 'b1 used': b1Atct } : {};
    add('NASA nine coefficients', { a1, a2, a3, a4, a5, a6, a7, b1, b2, ...shifted }, 'T in K', source, {
      range: { fromK: interval.fromK, toK: interval.toK },
      note: 'Cp/R = a1/T² + a2/T + a3 + a4 T + a5 T² + a6 T³ + a7 T⁴, R = 8.314510 J/(mol K)',
    });
  }
  return rows;
}

function vapourPressureRows(id: string): readonly CatalogueRow[] {
  const { rows, add } = group('vapour pressure');
  const row = antoine[id];
  for (const { A, B, C, fromK, toK, maxDeviationPercent } of row?.sets ?? []) {
    add('Antoine set', { A, B, C }, 'bar, K', row!.source, {
      range: { fromK, toK },
      note: notes('log10(P/bar) = A − B/(T + C)', deviation(maxDeviationPercent), row!.note),
    });
  }
  const wide = wideVapourPressure[id];
  if (wide) {
    const [c1, c2, c3, c4] = wide.curve.c;
    const reduced =
      wide.curve.form === 'wagner25'
        ? { Tc: wide.curve.criticalK, 'Pc/bar': wide.curve.criticalPa / 1e5 }
        : { c5: wide.curve.c[4] };
    const equation =
      wide.curve.form === 'wagner25'
        ? 'ln(P/Pc) = (Tc/T)(c1 t + c2 t^1.5 + c3 t^2.5 + c4 t^5), t = 1 − T/Tc'
        : 'ln(P/Pa) = c1 + c2/T + c3 ln T + c4 T^c5';
    add('wide-range equation, for the slope', { c1, c2, c3, c4, ...reduced }, '-', wide.source, {
      range: { fromK: wide.curve.fromK, toK: wide.curve.toK },
      note: notes(equation, deviation(wide.maxDeviationPercent, wide.comparedWith)),
    });
  }
  return rows;
}

function liquidRows(id: string): readonly CatalogueRow[] {
  const { rows, add } = group('liquid');
  const row = liquids[id];
  if (!row) return rows;
  const { source, rackett, note } = row;
  const scaled = (value: number | null, factor: number) => (value === null ? null : value * factor);
  const volume = (value: number | null) => (value === null ? null : rounded(value * 1e6, 3));
  const table = saturatedVolumes[id];
  if (table) {
    add('molar volume, table', `${table.temperatureK.length} points`, 'cm3/mol', table.source, {
      range: { fromK: table.temperatureK[0], toK: table.temperatureK.at(-1)! },
    });
  }
  add('molar volume at the boiling point', volume(row.volumeAtBoilingM3PerMol), 'cm3/mol', source);
  add('molar volume at 298.15 K', volume(row.volumeAt298M3PerMol), 'cm3/mol', source);
  add('Rackett parameter', rackett?.z, '-', source, {
    range: rackett && { fromK: rackett.fromK, toK: rackett.toK },
    note: notes(deviation(rackett?.maxDeviationPercent ?? null), note),
  });
  add(
    'heat of vaporisation at the boiling point',
    scaled(row.vaporisationAtBoilingJPerMol, 1e-3),
    'kJ/mol',
    source,
  );
  add('heat of vaporisation at 298.15 K', scaled(row.vaporisationAt298JPerMol, 1e-3), 'kJ/mol', source);
  add('Watson exponent', row.watsonExponent, '-', source);
  add('heat capacity at the boiling point', row.heatCapacityAtBoilingJPerMolK, 'J/(mol K)', source);
  add('heat capacity at 298.15 K', row.heatCapacityAt298JPerMolK, 'J/(mol K)', source, { note });
  return rows;
}

function henryRows(id: string): readonly CatalogueRow[] {
  const { rows, add } = group('Henry constants');
  const show = (h: HenryRow, quantity: string) => {
    const [v0, v1, v2] = (h.v ?? [0, 0, 0]).map((v) => rounded(v * 1e6, 6));
    add(
      quantity,
      { A: h.A, B: h.B, C: h.C, D: h.D, v0: v0!, v1: v1!, v2: v2! },
      'bar, K, cm3/mol',
      h.source,
      {
        range: { fromK: h.fromK, toK: h.toK },
        note: notes('ln(H/bar) = A + B/T + C ln T + D T', h.confidence, h.note),
      },
    );
  };
  for (const h of henryConstants.filter((each) => each.solute === id)) show(h, `dissolved in ${h.solvent}`);
  for (const h of henryConstants.filter((each) => each.solvent === id)) show(h, `as solvent of ${h.solute}`);
  return rows;
}

function grams(c: Component): number {
  return rounded(c.molarMassKgPerMol * 1000, 4);
}

function deviation(percent: number | null, from = 'the source'): string {
  return percent === null ? '' : `within ${percent} % of ${from}`;
}

function notes(...parts: readonly string[]): string {
  return parts.filter(Boolean).join('; ');
}

function rounded(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}
