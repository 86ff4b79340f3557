/**
 * The standard normal quantile, algorithm PPND16: relative error about 1e-16 (coefficients rounded to doubles).
 *
 * @param p  between 0 and 1; 0 and 1 themselves give -Infinity and Infinity
 * @source M. J. Wichura, Algorithm AS 241, Appl. Statist. 37 (1988) 477
 */
export function normalQuantile(p: number): number {
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (q * polynomial(A, r)) / polynomial(B, r);
  }
  const tail = q < 0 ? p : 1 - p;
  if (tail <= 0) return q < 0 ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
  const r = Math.sqrt(-Math.log(tail));
  const z =
    r <= 5 ? polynomial(C, r - 1.6) / polynomial(D, r - 1.6) : polynomial(E, r - 5) / polynomial(F, r - 5);
  return q < 0 ? -z : z;
}

/**
 * The standard normal distribution function: absolute error below 1e-15.
 *
 * @source J. F. Hart et al., Computer Approximations, Wiley 1968, no. 5666, as given by G. West, Better approximations to
 *   cumulative normal functions, Wilmott Magazine, May 2005, 70
 */
export function normalDistribution(z: number): number {
  const x = Math.abs(z);
  const lower =
    x > 38
      ? 0
      : Math.exp(-0.5 * x * x) * (x < 7.07106781186547 ? polynomial(N, x) / polynomial(M, x) : farTail(x));
  return z > 0 ? 1 - lower : lower;
}

/** What stands before exp(−x²/2) far out: a continued fraction. */
function farTail(x: number): number {
  let f = x + 0.65;
  for (let k = 4; k >= 1; k--) f = x + k / f;
  return 1 / (f * Math.sqrt(2 * Math.PI));
}

/** c0 + c1 x + c2 x² + ... */
function polynomial(c: readonly number[], x: number): number {
  let sum = 0;
  for (let k = c.length - 1; k >= 0; k--) sum = sum * x + c[k];
  return sum;
}

const A = [
  3.3871328727963665, 133.14166789178438, 1971.5909503065513, 13731.69376550946, 45921.95393154987,
  67265.7709270087, 33430.57558358813, 2509.0809287301227,
];
const B = [
  1, 42.31333070160091, 687.1870074920579, 5394.196021424751, 21213.794301586597, 39307.89580009271,
  28729.085735721943, 5226.495278852546,
];
const C = [
  1.4234371107496835, 4.630337846156546, 5.769497221460691, 3.6478483247632045, 1.2704582524523684,
  0.2417807251774506, 0.022723844989269184, 0.0007745450142783414,
];
const D = [
  1, 2.053191626637759, 1.6763848301838038, 0.6897673349851, 0.14810397642748008, 0.015198666563616457,
  0.0005475938084995345, 1.0507500716444169e-9,
];
const E = [
  6.657904643501103, 5.463784911164114, 1.7848265399172913, 0.29656057182850487, 0.026532189526576124,
  0.0012426609473880784, 2.7115555687434876e-5, 2.0103343992922881e-7,
];
const F = [
  1, 0.599832206555888, 0.1369298809227358, 0.014875361290850615, 0.0007868691311456133,
  1.8463183175100548e-5, 1.421511758316446e-7, 2.0442631033899397e-15,
];
const N = [
  220.206867912376, 221.213596169931, 112.079291497871, 33.912866078383, 6.37396220353165, 0.700383064443688,
  0.0352624965998911,
];
const M = [
  440.413735824752, 793.826512519948, 637.333633378831, 296.564248779674, 86.7807322029461, 16.064177579207,
  1.75566716318264, 0.0883883476483184,
];
