const PRIMES = [2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37] as const;

/**
 * Points that fill the unit box evenly, the same each time: the radical inverses of 1, 2, 3, ...
 *
 * @param size  at most twelve
 * @source J. H. Halton, Numerische Mathematik 2 (1960) 84-90
 */
export function haltonPoints(count: number, size: number): Float64Array[] {
  return Array.from({ length: count }, (_, k) =>
    Float64Array.from({ length: size }, (_, d) => radicalInverse(k + 1, PRIMES[d]!)),
  );
}

function radicalInverse(index: number, base: number): number {
  let value = 0;
  let share = 1 / base;
  for (let rest = index; rest > 0; rest = Math.floor(rest / base)) {
    value += (rest % base) * share;
    share /= base;
  }
  return value;
}
