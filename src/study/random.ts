/** Uniform random numbers from a seed: the same seed gives the same numbers on every machine. */
export interface Random {
  /** a whole number from 0 to 2³² − 1 */
  bits(): number;
  /** a number between 0 and 1, neither of them, on a grid of 2⁻³² */
  uniform(): number;
  /** a whole number from 0 to n − 1, n at most 2³² */
  below(n: number): number;
}

/**
 * xoshiro128**, its state filled by SplitMix32 from the seed.
 *
 * @param seed  a whole number; it counts modulo 2³²
 * @param stream  tells apart the numbers drawn for different purposes from one seed
 * @source D. Blackman & S. Vigna, Scrambled linear pseudorandom number generators, ACM Trans. Math. Softw. 47 (2021) 36;
 *   seeding: the authors' advice, with the 32-bit finaliser of MurmurHash3 (A. Appleby, 2011)
 */
export function createRandom(seed: number, stream = 0): Random {
  const next = splitMix(seed ^ Math.imul(stream, 0x85ebca6b));
  return fromState(next(), next(), next(), next());
}

/** The generator from its four words of state, not all of them zero. */
export function fromState(s0: number, s1: number, s2: number, s3: number): Random {
  let [a, b, c, d] = [s0 | 0, s1 | 0, s2 | 0, s3 | 0];
  const bits = (): number => {
    const result = Math.imul(rotate(Math.imul(b, 5), 7), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = rotate(d, 11);
    return result;
  };
  return {
    bits,
    uniform: () => (bits() + 0.5) / 2 ** 32,
    // Numbers above the last whole multiple of n are drawn again, so that none of the n is favoured.
    below(n) {
      const limit = 2 ** 32 - (2 ** 32 % n);
      for (;;) {
        const drawn = bits();
        if (drawn < limit) return drawn % n;
      }
    },
  };
}

function rotate(x: number, k: number): number {
  return (x << k) | (x >>> (32 - k));
}

function splitMix(seed: number): () => number {
  let state = seed | 0;
  return () => {
    state = (state + 0x9e3779b9) | 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return (z ^ (z >>> 16)) >>> 0;
  };
}
