import { joeKuo2008 } from './data/joe-kuo-2008.ts';
import type { Random } from './random.ts';

const BITS = 32;
/** More dimensions than this have no direction numbers here. */
export const SOBOL_DIMENSIONS = joeKuo2008.length + 1;

/**
 * The points of a Sobol sequence, each a row of 32-bit whole numbers (a coordinate times 2³²), in the order of the Gray
 * code, beginning with the origin.
 *
 * With `random`, each dimension is scrambled by a random lower triangular matrix and a digital shift, which keeps the even
 * spread of the points and makes every one of them uniform by itself: no point lies at the origin, and means over the sample
 * are without bias.
 *
 * @throws RangeError beyond SOBOL_DIMENSIONS
 * @source I. M. Sobol, USSR Comput. Math. Math. Phys. 7 (1967) 86; P. Bratley & B. L. Fox, ACM Trans. Math. Softw. 14 (1988)
 *   88; Gray code: I. A. Antonov & V. M. Saleev, same 19 (1979) 252; scrambling: J. Matoušek, J. Complexity 14 (1998) 527
 */
export function createSobol(dimensions: number, random: Random | null): { next(out: Uint32Array): void } {
  const directions = Array.from({ length: dimensions }, (_, d) => {
    const plain = directionNumbers(d);
    return random === null ? plain : scramble(plain, random);
  });
  const state = Uint32Array.from(directions, () => (random === null ? 0 : random.bits()));
  let index = 0;
  return {
    next(out) {
      out.set(state);
      // The next Gray code differs from this one in one bit: that of the lowest zero of the index.
      const bit = Math.min(31 - Math.clz32(~index & (index + 1)), BITS - 1);
      for (let d = 0; d < dimensions; d++) state[d] ^= directions[d][bit];
      index += 1;
    },
  };
}

/** v1 ... v32 of a dimension (0 is the first), the leading bit standing for one half. */
function directionNumbers(dimension: number): Uint32Array {
  const v = new Uint32Array(BITS);
  if (dimension === 0) return v.map((_, i) => 2 ** (BITS - 1 - i));
  const row = joeKuo2008[dimension - 1];
  if (row === undefined) throw new RangeError(`no direction numbers for dimension ${dimension + 1}`);
  const [s, a, ...m] = row;
  for (let i = 0; i < BITS; i++) {
    if (i < s) {
      v[i] = m[i] * 2 ** (BITS - 1 - i);
      continue;
    }
    v[i] = v[i - s] ^ (v[i - s] >>> s);
    for (let k = 1; k < s; k++) if ((a >>> (s - 1 - k)) & 1) v[i] ^= v[i - k];
  }
  return v;
}

/** Every digit of a point plus a random sum of the digits before it, modulo 2. */
function scramble(v: Uint32Array, random: Random): Uint32Array {
  // Row r of the matrix: ones at r, chance above it, zeros below, counted from the leading digit.
  const rows = Array.from({ length: BITS }, (_, r) => {
    const unit = 2 ** (BITS - 1 - r);
    return ((random.bits() & -(2 * unit)) | unit) >>> 0;
  });
  return v.map((number) => {
    let digits = 0;
    for (let r = 0; r < BITS; r++) digits |= parity(number & rows[r]) << (BITS - 1 - r);
    return digits >>> 0;
  });
}

function parity(x: number): number {
  let bits = x ^ (x >>> 16);
  bits ^= bits >>> 8;
  bits ^= bits >>> 4;
  bits ^= bits >>> 2;
  return (bits ^ (bits >>> 1)) & 1;
}
