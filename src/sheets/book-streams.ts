import type { Result, StreamResult } from '../model/result.ts';
import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';
import type { ComponentCells } from './book-components.ts';
import { plainText } from './plain.ts';
import { amountFormat, formatFor, heads, looks, number, text } from './xlsx-looks.ts';
import { type Cell, type Page, put, type Style } from './xlsx-model.ts';
import type { Names } from './xlsx-names.ts';
import { agreed, cellTerm, constant, live, share, type Term, times, total } from './xlsx-term.ts';

/** Where the numbers of one stream stand. */
export interface StreamCells {
  readonly flow: Term;
  readonly mass: Term;
  readonly enthalpy: Term;
  /** kmol/h */
  readonly amounts: ReadonlyMap<string, Term>;
  /** kg/h */
  readonly masses: ReadonlyMap<string, Term>;
}

/** Columns before the first stream: what the row shows, its unit. */
const BEFORE = 2;

/**
 * The stream table, streams as columns. The flows of the components are numbers; masses, totals, compositions and normal
 * volumes follow from them by formulas.
 */
export function fillStreams(
  page: Page,
  result: Result,
  components: ComponentCells,
  names: Names,
): Map<string, StreamCells> {
  const streams = Object.entries(result.streams);
  const ids = [...components.molarMass.keys()];
  const row = (head: string, unit: string, cellOf: (stream: StreamResult, s: number) => Cell) =>
    put(page, [text(head), text(unit), ...streams.map(([, stream], s) => cellOf(stream, s))]);
  const section = (title: string) =>
    put(
      page,
      [title, '', ...streams.map(() => '')].map((word) => text(word, looks.section)),
    );
  const values = (
    head: string,
    unit: string,
    read: (stream: StreamResult) => number | null,
    least: number,
  ) => {
    const format = formatFor(present(streams.map(([, stream]) => read(stream))), least);
    return row(head, unit, (stream) => number(read(stream), { format }));
  };

  put(page, heads(['stream', 'unit', ...streams.map(([tag]) => plainText(tag))], BEFORE));
  row('from', '', ({ from }) => text(from, looks.right));
  row('to', '', ({ to }) => text(to, looks.right));
  values('temperature', 'degC', (stream) => stream.temperature_K - 273.15, 2);
  values('pressure', 'bar', (stream) => stream.pressure_bar, 2);
  row('phase', '', ({ phase }) => text(phase, looks.right));
  values('vapour fraction', 'mol/mol', (stream) => stream.vapour_fraction, 4);

  // The totals stand above what they are the totals of; their rows are kept free until the components are written.
  const flowRow = put(page, []);
  const massRow = put(page, []);
  const volumeRow = put(page, []);
  const enthalpyRow = values('enthalpy', 'kW', (stream) => stream.enthalpy_kW, 1);
  values('entropy', 'kW/K', (stream) => stream.entropy_kW_K, 2);
  values('density', 'kg/m3', (stream) => stream.density_kg_m3, 2);

  const amountStyle = {
    format: amountFormat(streams.flatMap(([, s]) => Object.values(s.components_kmol_h))),
  };
  const table = (title: string, unit: string, cellOf: (id: string, s: number) => Cell): number => {
    section(`${title}, ${unit}`);
    const first = page.rows.length;
    for (const id of ids) row(id, unit, (_, s) => cellOf(id, s));
    return first;
  };
  const amountsFrom = table('mole flows', 'kmol/h', (id, s) =>
    number(streams[s]![1].components_kmol_h[id] ?? 0, amountStyle),
  );
  const at = (first: number, id: string, s: number) => cellTerm(page, first + ids.indexOf(id), BEFORE + s);
  const sumOf = (first: number, s: number) =>
    total({ page, from: [first, BEFORE + s], to: [first + ids.length - 1, BEFORE + s] });
  const molarMass = (id: string) => components.molarMass.get(id)!;
  const massStyle = {
    format: amountFormat(
      streams.map(([, stream]) => stream.mass_kg_h),
      1,
    ),
  };
  const massesFrom = page.rows.length + ids.length + 2;

  const fill = (
    at: number,
    head: string,
    unit: string,
    cellOf: (stream: StreamResult, s: number) => Cell,
  ) => {
    page.rows[at] = [text(head), text(unit), ...streams.map(([, stream], s) => cellOf(stream, s))];
  };
  fill(flowRow, 'flow', 'kmol/h', ({ flow_kmol_h }, s) =>
    agreed(sumOf(amountsFrom, s), flow_kmol_h, amountStyle),
  );
  const part = (id: string, s: number) => share(at(amountsFrom, id, s), cellTerm(page, flowRow, BEFORE + s));
  table('composition', 'mol %', (id, s) =>
    agreed(percent(part(id, s)), 100 * (streams[s]![1].mole_fraction[id] ?? 0), PERCENT),
  );
  table('mass flows', 'kg/h', (id, s) => live(times(at(amountsFrom, id, s), molarMass(id)), massStyle));
  fill(massRow, 'mass', 'kg/h', ({ mass_kg_h }, s) => agreed(sumOf(massesFrom, s), mass_kg_h, massStyle));
  const weight = (id: string, s: number) => share(at(massesFrom, id, s), cellTerm(page, massRow, BEFORE + s));
  table('composition', 'mass %', (id, s) => live(percent(weight(id, s)), PERCENT));
  // The trade gives it for gas only.
  const volumeStyle = {
    format: formatFor(
      streams.map(([, stream]) => stream.normal_m3_h),
      0,
      2,
    ),
  };
  fill(volumeRow, 'normal volume (0 degC, 1.01325 bar)', 'Nm3/h', ({ phase, normal_m3_h }, s) => {
    if (phase !== 'gas') return null;
    const volume = times(cellTerm(page, flowRow, BEFORE + s), constant(1e3 * NORMAL_VOLUME_M3_PER_MOL));
    return agreed(volume, normal_m3_h, volumeStyle);
  });

  return new Map(
    streams.map(([tag], s): [string, StreamCells] => [
      tag,
      {
        flow: names.define(`flow_${tag}`, cellTerm(page, flowRow, BEFORE + s)),
        mass: names.define(`mass_${tag}`, cellTerm(page, massRow, BEFORE + s)),
        enthalpy: cellTerm(page, enthalpyRow, BEFORE + s),
        amounts: new Map(ids.map((id) => [id, at(amountsFrom, id, s)])),
        masses: new Map(ids.map((id) => [id, at(massesFrom, id, s)])),
      },
    ]),
  );
}

const PERCENT: Style = { format: '[=0]0;[<0.0005]0.0E+00;0.000' };

function percent(fraction: Term): Term {
  return times(constant(100), fraction);
}

function present(values: readonly (number | null)[]): number[] {
  return values.filter((value) => value !== null);
}
