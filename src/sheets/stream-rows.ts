import type { Result, StreamResult } from '../model/result.ts';
import { decimalsFor, fixed } from './numbers.ts';
import { plainText } from './plain.ts';

/** One line of a stream table: its head with the unit, then one cell per stream. */
export interface StreamRow {
  readonly head: string;
  readonly cells: readonly string[];
  /** the head where the row stands without the rows around it; left out where that is the same */
  readonly alone?: string;
  /** true for the head of a group of rows, which has no cells */
  readonly section: boolean;
}

const KELVIN_AT_0_DEGC = 273.15;
/** Flows below this part of the largest are the noise of the arithmetic, not traces. */
const NOISE = 1e-14;

/** The stream table with streams as columns: where from, where to, state, flows, amounts, composition. */
export function streamRows(result: Result): StreamRow[] {
  const streams = Object.values(result.streams);
  const components = Object.keys(result.ledger);
  return [
    textRow('stream', Object.keys(result.streams)),
    ...endRows(
      'from',
      streams.map((stream) => stream.from),
    ),
    ...endRows(
      'to',
      streams.map((stream) => stream.to),
    ),
    numberRow(
      'temperature, degC',
      streams.map((stream) => stream.temperature_K - KELVIN_AT_0_DEGC),
      2,
      2,
    ),
    numberRow(
      'pressure, bar',
      streams.map((stream) => stream.pressure_bar),
      2,
      3,
      5,
    ),
    textRow(
      'phase',
      streams.map((stream) => stream.phase),
    ),
    ...vapourFraction(streams),
    numberRow(
      'flow, kmol/h',
      streams.map((stream) => stream.flow_kmol_h),
      2,
      4,
    ),
    massRow(streams),
    numberRow(
      'normal volume, Nm3/h',
      // The trade gives it for gas only.
      streams.map((stream) => (stream.phase === 'gas' ? stream.normal_m3_h : null)),
      0,
      2,
    ),
    enthalpyRow(streams),
    ...componentRows(
      'components',
      'kmol/h',
      components,
      streams,
      (stream, id) => stream.components_kmol_h[id] ?? 0,
    ),
    ...componentRows(
      'composition',
      'mol %',
      components,
      streams,
      (stream, id) => 100 * (stream.mole_fraction[id] ?? 0),
      3,
    ),
  ];
}

function textRow(head: string, cells: readonly string[]): StreamRow {
  return { head, cells: cells.map(plainText), section: false };
}

/** Block and port on two lines, which keeps the columns narrow; the line of ports only where there is one. */
function endRows(head: string, ends: readonly string[]): StreamRow[] {
  const parts = ends.map((end) => /^([^.]*)\.?(.*)$/s.exec(end) ?? [end, end, '']);
  const ports = parts.map((part) => part[2] ?? '');
  const blocks = textRow(
    head,
    parts.map((part) => part[1] ?? ''),
  );
  return ports.every((port) => port === '')
    ? [blocks]
    : [blocks, { ...textRow('  port', ports), alone: `${head}, port` }];
}

/** A row of numbers with the same decimals; null leaves its cell empty. */
function numberRow(
  head: string,
  values: readonly (number | null)[],
  least: number,
  most: number,
  digits = 6,
): StreamRow {
  const numbers = values.filter((value) => value !== null);
  const decimals = decimalsFor(numbers, digits, least, most);
  const noise = noiseOf(numbers);
  return {
    head,
    cells: values.map((value) => (value === null ? '' : fixed(value, decimals, noise))),
    section: false,
  };
}

function vapourFraction(streams: readonly StreamResult[]): StreamRow[] {
  if (streams.every((stream) => stream.phase !== 'mixed')) return [];
  return [
    {
      head: 'vapour, mol/mol',
      cells: streams.map((stream) => fixed(stream.vapour_fraction, 4, 1e-12)),
      section: false,
    },
  ];
}

/** t/h for a plant of some size, kg/h for a small one; the same for all streams. */
function massRow(streams: readonly StreamResult[]): StreamRow {
  const kgPerH = streams.map((stream) => stream.mass_kg_h);
  const large = Math.max(0, ...kgPerH) >= 1e4;
  return large
    ? numberRow(
        'mass, t/h',
        kgPerH.map((mass) => mass / 1000),
        3,
        3,
      )
    : numberRow('mass, kg/h', kgPerH, 1, 4);
}

function enthalpyRow(streams: readonly StreamResult[]): StreamRow {
  const kW = streams.map((stream) => stream.enthalpy_kW);
  const large = kW.some((enthalpy) => Math.abs(enthalpy) >= 1e4);
  return large
    ? numberRow(
        'enthalpy, MW',
        kW.map((enthalpy) => enthalpy / 1000),
        3,
        3,
      )
    : numberRow('enthalpy, kW', kW, 1, 3);
}

function componentRows(
  head: string,
  unit: string,
  components: readonly string[],
  streams: readonly StreamResult[],
  amountOf: (stream: StreamResult, id: string) => number,
  most = 4,
): StreamRow[] {
  const values = components.map((id) => streams.map((stream) => amountOf(stream, id)));
  const all = values.flat();
  const decimals = decimalsFor(all, 6, 2, most);
  return [
    { head: `${head}, ${unit}`, cells: [], section: true },
    ...components.map((id, index) => ({
      head: `  ${id}`,
      alone: `${id}, ${unit}`,
      cells: values[index]!.map((value) => fixed(value, decimals, noiseOf(all))),
      section: false,
    })),
  ];
}

function noiseOf(values: readonly number[]): number {
  return NOISE * values.reduce((largest, value) => Math.max(largest, Math.abs(value)), 0);
}
