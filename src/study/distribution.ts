import type { Shape } from '../model/spread.ts';
import { normalDistribution, normalQuantile } from './normal.ts';

/** Bounds of a setting; infinite where it has none. */
export interface Bounds {
  readonly low: number;
  readonly high: number;
}

/** A shape within the bounds of its setting. */
export interface Distribution {
  /** the value below which the share u of all values lies, 0 < u < 1; never outside the bounds */
  quantile(u: number): number;
  /** shares of the shape as written that lie beyond the bounds and are cut off; the rest is scaled up to one */
  readonly cutBelow: number;
  readonly cutAbove: number;
}

/** No number of samples shows that a share below this was cut off: it counts as none. */
const NO_SHARE = 1e-12;

/** Cut a shape off at the bounds of its setting. */
export function createDistribution(shape: Shape, { low, high }: Bounds): Distribution {
  const { share, quantile } = functionsOf(shape);
  const below = low === Number.NEGATIVE_INFINITY ? 0 : share(low);
  const cutBelow = below < NO_SHARE ? 0 : below;
  const above = high === Number.POSITIVE_INFINITY ? 0 : 1 - share(high);
  const cutAbove = above < NO_SHARE ? 0 : above;
  const kept = 1 - cutAbove - cutBelow;
  return {
    quantile: (u) => Math.min(Math.max(quantile(cutBelow + u * kept), low), high),
    cutBelow,
    cutAbove,
  };
}

/** Distribution function and its inverse. */
function functionsOf(shape: Shape): { share(x: number): number; quantile(u: number): number } {
  switch (shape.kind) {
    case 'normal':
      return {
        share: (x) => normalDistribution((x - shape.mean) / shape.sd),
        quantile: (u) => shape.mean + shape.sd * normalQuantile(u),
      };
    case 'log-normal': {
      const sd = Math.log(shape.factor);
      return {
        share: (x) => (x <= 0 ? 0 : normalDistribution(Math.log(x / shape.median) / sd)),
        quantile: (u) => shape.median * Math.exp(sd * normalQuantile(u)),
      };
    }
    case 'uniform': {
      const width = shape.high - shape.low;
      return {
        share: (x) => Math.min(Math.max((x - shape.low) / width, 0), 1),
        quantile: (u) => shape.low + u * width,
      };
    }
    case 'triangular':
      return triangular(shape.low, shape.mode, shape.high);
  }
}

function triangular(low: number, mode: number, high: number) {
  const width = high - low;
  const turn = (mode - low) / width;
  return {
    share(x: number) {
      if (x <= low) return 0;
      if (x >= high) return 1;
      return x < mode
        ? (x - low) ** 2 / (width * (mode - low))
        : 1 - (high - x) ** 2 / (width * (high - mode));
    },
    quantile: (u: number) =>
      u < turn
        ? low + Math.sqrt(u * width * (mode - low))
        : high - Math.sqrt((1 - u) * width * (high - mode)),
  };
}
