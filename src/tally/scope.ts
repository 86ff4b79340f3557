import type { BlockReport } from '../blocks/block.ts';
import { figureReaders } from './figures.ts';
import { count } from './ledger.ts';
import type { Plant } from './plant.ts';
import { KMOL_H } from './stream-results.ts';

/**
 * What formulas may name (see flowsheet/formula-scope.ts), read from the plant as it stands when it is asked for:
 *   streams.S2.n.Ar [kmol/h], y, m [kg/h], w, T [K], P [bar], flow [kmol/h], mass [kg/h], enthalpy [kW]
 *   blocks.condenser.duty [kW], power [kW] and the block's details
 *   figures, the user's own under figures.user
 *
 * A formula costs what it names and no more: a study evaluates two or three of them in thousands of cases, and all
 * that a plant can be asked takes several times the passes of a case.
 */
export interface PlantScope {
  readonly scope: Readonly<Record<string, unknown>>;
  /** what a block says of the last pass */
  readonly reportOf: (block: number) => BlockReport;
  /**
   * To be called when the plant has been calculated again.
   *
   * @param renewed  the plant to read from now on, where it has been renewed (`Plant.renewed`)
   */
  refresh(renewed?: Plant): void;
}

/** @param known  what the blocks say, when that has been asked already; good until `refresh` */
export function createPlantScope(first: Plant, known?: readonly BlockReport[]): PlantScope {
  const { flowsheet, mixture, blocks } = first;
  let plant = first;
  const forget: (() => void)[] = [];
  const kept = <T>(work: () => T, before?: T): (() => T) => {
    let value = before;
    forget.push(() => {
      value = undefined;
    });
    return () => (value ??= work());
  };
  const byBlock = blocks.map((_, b) =>
    kept(() => plant.units[b]!.report(plant.inlets[b]!, plant.outlets[b]!), known?.[b]),
  );
  const reportOf = (b: number) => byBlock[b]!();
  const reports = kept(() => byBlock.map((report) => report()));
  const source = { plant, tallied: kept(() => count(plant)), reports };
  const ids = mixture.components.map((c) => c.id);

  function streamScope(s: number): object {
    const state = () => plant.streams[s]!;
    const flow = (i: number) => state().flowsMolPerS[i]!;
    const kgPerH = (i: number) => flow(i) * KMOL_H * 1e3 * mixture.components[i]!.molarMassKgPerMol;
    const share = (part: number, whole: number) => (whole > 0 ? part / whole : 0);
    const byComponent = (value: (i: number) => number) => {
      const parts = getters(ids.map((id, i) => [id, () => value(i)]));
      return () => parts;
    };
    return getters([
      ['n', byComponent((i) => flow(i) * KMOL_H)],
      ['y', byComponent((i) => share(flow(i), mixture.total(state())))],
      ['m', byComponent(kgPerH)],
      ['w', byComponent((i) => share(kgPerH(i), mixture.mass(state()) * 3600))],
      ['T', () => state().temperatureK],
      ['P', () => state().pressurePa / 1e5],
      ['flow', () => mixture.total(state()) * KMOL_H],
      ['mass', () => mixture.mass(state()) * 3600],
      ['vapour_fraction', () => state().vapourFraction],
      ['enthalpy', () => state().enthalpyW / 1e3],
    ]);
  }

  const blockScope = (b: number) => {
    const { details, dutyW, powerW } = reportOf(b);
    return { ...details, duty: dutyW / 1e3, power: powerW / 1e3 };
  };
  const user = getters(flowsheet.figures.map(({ name, formula }) => [name, () => formula.evaluate(scope)]));
  const scope: Readonly<Record<string, unknown>> = {
    streams: Object.fromEntries(flowsheet.streams.map(({ tag }, s) => [tag, streamScope(s)])),
    blocks: getters(blocks.map(({ name }, b) => [name, kept(() => blockScope(b))])),
    figures: getters([
      ...Object.entries(figureReaders).map(([name, read]): [string, () => unknown] => [
        name,
        kept(() => read(source)),
      ]),
      ['user', () => user],
    ]),
  };
  return {
    scope,
    reportOf,
    refresh(renewed = plant) {
      plant = renewed;
      source.plant = renewed;
      for (const drop of forget) drop();
    },
  };
}

/** An object whose entries are worked out when they are read. */
function getters(entries: readonly (readonly [string, () => unknown])[]): Record<string, unknown> {
  const object = {};
  for (const [name, get] of entries) Object.defineProperty(object, name, { get, enumerable: true });
  return object;
}
