/** More steps than this are taken only towards a double root, where the closed form is the shorter way. */
const FEW_STEPS = 10;

/**
 * Largest real root of the compressibility cubic
 *   Z³ + ((u − 1) B − 1) Z² + (A + w B² − u B (B + 1)) Z − (A B + w B² (B + 1)) = 0,  u = δ1 + δ2, w = δ1 δ2,
 * which is the vapour's. At 1 + B the cubic is not below zero and beyond it has no root; Newton's steps come down from
 * there to the largest root without passing it as long as the cubic is convex. Where they cannot, the closed form
 * (Cardano, trigonometric where there are three real roots) is polished by Newton. Where only one real root
 * exists it is returned, whatever the density it stands for.
 *
 * @param A  aP/(RT)² [-], at least 0
 * @param B  bP/(RT) [-], above 0
 * @param u,w  sum and product of the two constants of the equation of state
 * @throws nothing; the root is above B for every A ≥ 0, B > 0
 */
export function vapourRoot(A: number, B: number, u: number, w: number): number {
  const c2 = (u - 1) * B - 1;
  const c1 = A + w * B * B - u * B * (B + 1);
  const c0 = -(A * B + w * B * B * (B + 1));
  let Z = 1 + B;
  for (let step = 0; step < FEW_STEPS; step++) {
    const slope = (3 * Z + 2 * c2) * Z + c1;
    if (!(slope > 0) || 3 * Z + c2 <= 0) break;
    const next = Z - (((Z + c2) * Z + c1) * Z + c0) / slope;
    if (!(next < Z)) return Z;
    Z = next;
  }
  return polish(closedForm(c2, c1, c0), c2, c1, c0, B);
}

/**
 * Smallest real root above B of the same cubic, which is the liquid's; where only one root lies above B, that one.
 * The closed form loses a root that is small beside the others. Newton's steps do not: at Z = B the cubic is −2B²
 * and it is concave up to the liquid's root, so that they come up to it from below without passing it; where
 * there is none, they pass the hill or the point of inflection.
 *
 * @param A,B,u,w  as for vapourRoot
 */
export function liquidRoot(A: number, B: number, u: number, w: number): number {
  const c2 = (u - 1) * B - 1;
  const c1 = A + w * B * B - u * B * (B + 1);
  const c0 = -(A * B + w * B * B * (B + 1));
  let Z = B;
  // Beside a double root each step halves the way.
  for (let step = 0; step < 60; step++) {
    const slope = (3 * Z + 2 * c2) * Z + c1;
    if (!(slope > 0) || 3 * Z + c2 > 0) return vapourRoot(A, B, u, w);
    const next = Z - (((Z + c2) * Z + c1) * Z + c0) / slope;
    if (!(next > Z)) break;
    Z = next;
  }
  return Z;
}

/**
 * How a root Z of the cubic moves along a variable in which A and B have the given slopes.
 *
 * @param A,B,u,w  as for vapourRoot
 */
export function slopeOfRoot(
  A: number,
  B: number,
  Z: number,
  u: number,
  w: number,
  slopeA: number,
  slopeB: number,
): number {
  const c2 = (u - 1) * B - 1;
  const c1 = A + w * B * B - u * B * (B + 1);
  const moved =
    (u - 1) * slopeB * Z * Z +
    (slopeA + 2 * w * B * slopeB - u * slopeB * (2 * B + 1)) * Z -
    (slopeA * B + A * slopeB + w * slopeB * (3 * B + 2) * B);
  return -moved / ((3 * Z + 2 * c2) * Z + c1);
}

function closedForm(c2: number, c1: number, c0: number): number {
  const p = c1 - (c2 * c2) / 3;
  const halfQ = (c2 * c2 * c2) / 27 - (c2 * c1) / 6 + c0 / 2;
  const discriminant = halfQ * halfQ + (p * p * p) / 27;
  if (discriminant < 0) {
    const radius = Math.sqrt(-p / 3);
    const cosine = Math.min(1, Math.max(-1, -halfQ / (radius * radius * radius)));
    return 2 * radius * Math.cos(Math.acos(cosine) / 3) - c2 / 3;
  }
  // the larger of the two cube roots is free of cancellation, the other follows from their product −p/3
  const root = Math.sqrt(discriminant);
  const larger = Math.cbrt(halfQ > 0 ? -halfQ - root : -halfQ + root);
  const t = larger === 0 ? 0 : larger - p / (3 * larger);
  // a double root counts twice: −t/2 is then the vapour's where t is the liquid's
  const double = discriminant === 0 && t < 0 ? -t / 2 : t;
  return double - c2 / 3;
}

/** At most eight Newton steps; a step that would not lessen the residual ends it (a multiple root). */
function polish(start: number, c2: number, c1: number, c0: number, B: number): number {
  let Z = Math.max(start, B);
  let f = ((Z + c2) * Z + c1) * Z + c0;
  for (let step = 0; step < 8 && f !== 0; step++) {
    const slope = (3 * Z + 2 * c2) * Z + c1;
    const next = Z - f / slope;
    if (!(next > B)) break;
    const fNext = ((next + c2) * next + c1) * next + c0;
    if (!(Math.abs(fNext) < Math.abs(f))) break;
    Z = next;
    f = fNext;
  }
  return Z;
}
