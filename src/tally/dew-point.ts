import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { emptyStream } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';

/** Colder than this no loop condenses anything [K]. */
const COLDEST_K = 150;
const STEP_K = 5;
const WITHIN_K = 0.01;

/**
 * The warmest temperature below `fromK` at which a stream begins to condense at its pressure [K]: steps of 5 K down
 * to 150 K, then halving to 0.01 K; null where no liquid forms.
 *
 * @param flowsMolPerS  per component, all phases together
 */
export function dewPointK(
  mixture: Mixture,
  pressurePa: number,
  flowsMolPerS: Float64Array,
  fromK: number,
): number | null {
  const stream = emptyStream(mixture.size);
  stream.flowsMolPerS.set(flowsMolPerS);
  stream.pressurePa = pressurePa;
  const isWet = (temperatureK: number): boolean => {
    stream.temperatureK = temperatureK;
    try {
      mixture.settle(stream);
    } catch (trouble) {
      // No split where the two phases are nearly one (near the critical point): no dew point is told from there.
      if (trouble instanceof PassTrouble) return false;
      throw trouble;
    }
    return stream.liquidMolPerS.some((flow, i) => flow > 0 && mixture.roles[i] !== 'solid');
  };
  if (isWet(fromK)) return fromK;
  let dry = fromK;
  let wet = fromK - STEP_K;
  while (!isWet(wet)) {
    dry = wet;
    wet -= STEP_K;
    if (wet < COLDEST_K) return null;
  }
  while (dry - wet > WITHIN_K) {
    const middle = 0.5 * (dry + wet);
    if (isWet(middle)) wet = middle;
    else dry = middle;
  }
  return wet;
}
