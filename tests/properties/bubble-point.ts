import { emptyStream } from '../../src/model/stream.ts';
import type { Mixture } from '../../src/properties/mixture.ts';
import { gasFractions } from './mixture-of.ts';

/** Bubble temperature [K] of a liquid [mole fractions] at a pressure [bar], and the vapour's first fraction. */
export function bubblePoint(
  mixture: Mixture,
  x: readonly number[],
  bar: number,
): { readonly T: number; readonly y: number } {
  const stream = emptyStream(mixture.size);
  stream.flowsMolPerS.set(x);
  stream.pressurePa = bar * 1e5;
  const boilsAt = (T: number) => {
    stream.temperatureK = T;
    mixture.settle(stream);
    // a trace of vapour, large enough for its composition to be told from the difference of two flows
    return stream.vapourFraction > 1e-7;
  };
  let low = 170;
  let high = 560;
  for (let step = 0; step < 50; step++) {
    const T = 0.5 * (low + high);
    if (boilsAt(T)) high = T;
    else low = T;
  }
  boilsAt(high);
  return { T: high, y: gasFractions(stream)[0]! };
}
