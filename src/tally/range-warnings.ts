import type { BlockReport } from '../blocks/block.ts';
import type { Warning } from '../model/result.ts';
import type { UseOutside } from '../properties/ranges.ts';
import type { Plant } from './plant.ts';

/** Streams that a warning names; of more it says how many. */
const NAMED = 4;

interface Uses {
  readonly use: UseOutside;
  readonly tags: string[];
  lowestK: number;
  highestK: number;
}

/**
 * One warning for every correlation that some stream is computed with outside its range: the streams, their
 * temperatures and the range. What a block has said of the same vapour pressure already is not said again.
 */
export function rangeWarnings(plant: Plant, reports: readonly BlockReport[]): Warning[] {
  const { mixture, flowsheet, streams } = plant;
  const found = new Map<string, Uses>();
  streams.forEach((stream, s) => {
    for (const use of mixture.usesOutside(stream)) {
      const T = stream.temperatureK;
      const uses = found.get(use.correlation) ?? { use, tags: [], lowestK: T, highestK: T };
      found.set(use.correlation, uses);
      uses.tags.push(flowsheet.streams[s].tag);
      uses.lowestK = Math.min(uses.lowestK, T);
      uses.highestK = Math.max(uses.highestK, T);
    }
  });
  const said = reports.flatMap((report) => report.warnings.map(({ message }) => message));
  return [...found.values()]
    .filter(({ use }) => !said.some((message) => message.includes(`the ${use.correlation} ends`)))
    .map(({ use, tags, lowestK, highestK }) => {
      const named = tags.slice(0, NAMED).join(', ');
      const more = tags.length > NAMED ? ` and ${tags.length - NAMED} more` : '';
      const at =
        celsius(lowestK) === celsius(highestK)
          ? celsius(lowestK)
          : `${celsius(lowestK)} to ${celsius(highestK)}`;
      return {
        code: use.code,
        where: `${named}${more}`,
        message: `the ${use.correlation} is used at ${at} degC, outside its ${celsius(use.fromK)} to ${celsius(use.toK)} degC; ${use.goesOn}`,
      };
    });
}

function celsius(T: number): string {
  return (T - 273.15).toFixed(1);
}
