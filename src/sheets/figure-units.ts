import type { Flowsheet } from '../model/flowsheet.ts';

/** Units of the user's own figures by name. */
export function figureUnits(flowsheet: Flowsheet): Record<string, string> {
  return Object.fromEntries(flowsheet.figures.map((figure) => [figure.name, figure.unit]));
}
