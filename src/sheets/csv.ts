import type { Result } from '../model/result.ts';
import { exitTags } from './ledger-rows.ts';
import { plainText } from './plain.ts';
import type { SheetOptions } from './sheet.ts';
import { feedStreams } from './story.ts';

type Cell = string | number | null;

/** Numbers of a CSV file are those of the result: what the sheets show in per cent is 0 to 1 here. */
export const FRACTION = 'fraction';

/** The tables a CSV file may hold; each is one rectangle with one line of heads, ready to filter and to join. */
export const csvTables = {
  streams: streamTable,
  ledger: ledgerTable,
  figures: figureTable,
} as const;

export type CsvTableName = keyof typeof csvTables;

/**
 * One table of a result as CSV: one line per stream (or component, or figure), units in the heads, numbers in
 * full. Lines end with CR LF; text that a spreadsheet would take for a formula is made plain by an apostrophe.
 *
 * @source format: RFC 4180 (2005); guard against formulas: OWASP, CSV Injection
 */
export function csvSheet(result: Result, name: CsvTableName = 'streams', options: SheetOptions = {}): string {
  return csvTables[name](result, options)
    .map((row) => `${row.map(csvCell).join(',')}\r\n`)
    .join('');
}

/** One cell: a number in full, text quoted where it must be and never a formula. */
export function csvCell(cell: Cell): string {
  if (cell === null || (typeof cell === 'number' && !Number.isFinite(cell))) return '';
  if (typeof cell === 'number') return String(cell === 0 ? 0 : Number(cell.toPrecision(12)));
  const text = plainText(cell);
  const guarded = /^[=+\-@\uff1d\uff0b\uff0d\uff20]/.test(text) ? `'${text}` : text;
  return /[",;\r\n]|^\s|\s$/.test(guarded) ? `"${guarded.replaceAll('"', '""')}"` : guarded;
}

function streamTable(result: Result): Cell[][] {
  const components = Object.keys(result.ledger);
  return [
    [
      'stream',
      'from',
      'to',
      'temperature [degC]',
      'pressure [bar]',
      'phase',
      'vapour fraction [mol/mol]',
      'flow [kmol/h]',
      'mass [kg/h]',
      'normal volume [Nm3/h]',
      'enthalpy [kW]',
      'entropy [kW/K]',
      'density [kg/m3]',
      ...components.map((id) => `${id} [kmol/h]`),
      ...components.map((id) => `${id} [mol %]`),
    ],
    ...Object.entries(result.streams).map(([tag, stream]) => [
      tag,
      stream.from,
      stream.to,
      stream.temperature_K - 273.15,
      stream.pressure_bar,
      stream.phase,
      stream.vapour_fraction,
      stream.flow_kmol_h,
      stream.mass_kg_h,
      stream.normal_m3_h,
      stream.enthalpy_kW,
      stream.entropy_kW_K,
      stream.density_kg_m3,
      ...components.map((id) => stream.components_kmol_h[id] ?? 0),
      ...components.map((id) => 100 * (stream.mole_fraction[id] ?? 0)),
    ]),
  ];
}

function ledgerTable(result: Result): Cell[][] {
  const exits = exitTags(result);
  return [
    [
      'component',
      'in [kmol/h]',
      'formed [kmol/h]',
      'consumed [kmol/h]',
      ...exits.map((tag) => `out ${tag} [kmol/h]`),
      'closure [relative]',
    ],
    ...Object.entries(result.ledger).map(([id, entry]) => [
      id,
      entry.in,
      entry.formed,
      entry.consumed,
      ...exits.map((tag) => entry.out[tag] ?? 0),
      entry.closure,
    ]),
  ];
}

function figureTable(result: Result, { figureUnits = {} }: SheetOptions): Cell[][] {
  const { figures, closure } = result;
  const feed = feedStreams(result).reduce((sum, [, stream]) => sum + stream.flow_kmol_h, 0);
  const rows: Cell[][] = [
    ['figure', 'of', 'value', 'unit'],
    ['closed', '', result.convergence.converged ? 'yes' : 'no', ''],
    ['fresh feed', '', feed, 'kmol/h'],
    ['recycle ratio', '', figures.recycle_ratio, 'mol/mol'],
  ];
  for (const [block, values] of Object.entries(figures.per_pass_conversion)) {
    for (const [id, value] of Object.entries(values))
      rows.push(['conversion per pass', `${id} in ${block}`, value, FRACTION]);
  }
  rows.push(...each('overall conversion', figures.overall_conversion, FRACTION));
  const { overall_yield: overallYield, purge } = figures;
  if (overallYield)
    rows.push([
      'yield',
      `${overallYield.product} per ${overallYield.reactant}`,
      overallYield.value,
      FRACTION,
    ]);
  rows.push(['production', overallYield?.product ?? '', figures.production_t_d, 't/d']);
  rows.push(...each('inerts at inlet', figures.inerts, 'mol/mol'));
  if (purge) {
    rows.push(
      ['purge', '', purge.flow_kmol_h, 'kmol/h'],
      ['purge per fresh feed', '', purge.fraction_of_makeup, 'mol/mol'],
    );
    rows.push(...each('lost in purge', purge.lost_kmol_h, 'kmol/h'));
    rows.push(...each('lost in purge, part of feed', purge.lost_fraction, FRACTION));
    rows.push(['lower heating value of purge', '', purge.lhv_MW, 'MW']);
  }
  rows.push(...each('power', figures.power_kW, 'kW'));
  rows.push(['specific power', '', figures.specific_power_kWh_t, 'kWh/t']);
  rows.push(...each('heat added', figures.duty_kW, 'kW'));
  for (const [own, value] of Object.entries(figures.user)) {
    const unit = figureUnits[own] ?? '';
    rows.push(['own figure', own, value, unit === '%' ? FRACTION : unit]);
  }
  rows.push(['closure', 'mass', closure.mass, 'relative'], ['closure', 'energy', closure.energy, 'relative']);
  rows.push(...each('closure of atoms', closure.atoms, 'relative'));
  return rows;
}

function each(figure: string, values: Readonly<Record<string, number | null>>, unit: string): Cell[][] {
  return Object.entries(values).map(([name, value]) => [figure, name, value, unit]);
}
