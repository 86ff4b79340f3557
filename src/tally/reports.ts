import type { BlockReport } from '../blocks/block.ts';
import type { Plant } from './plant.ts';

/** What every block says of the last pass, in the order of the file. */
export function reportsOf(plant: Plant): readonly BlockReport[] {
  return plant.units.map((unit, b) => unit.report(plant.inlets[b], plant.outlets[b]));
}
