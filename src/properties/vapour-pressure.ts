import type { AntoineSet, Component, WideVapourPressure } from '../model/component.ts';

const LN10 = Math.log(10);
/** Antoine sets count in bar. */
const LN_BAR = Math.log(1e5);
/** A step between adjoining sets below this [-] is rounding of printed coefficients. */
const ROUNDING_STEP = 1e-4;

/**
 * Natural logarithm of the vapour pressure, ln(P/Pa):
 *   log10(P/bar) = A − B/(T + C), by the set whose range holds T.
 * Beyond the known range ln P goes on linear in 1/T from the range's end (Clausius-Clapeyron with a constant
 * heat of vaporisation); ask `vapourPressureRange` before relying on it. A component that has only a
 * wide-range equation is computed from that one; NaN where no vapour pressure is known.
 */
export function lnVapourPressure(c: Component, T: number): number {
  const curve = curveOf(c);
  if (!curve) return Number.NaN;
  if (T < curve.fromK) return curve.lnFrom + curve.steepnessFrom * (1 / curve.fromK - 1 / T);
  if (T > curve.toK) return curve.lnTo + curve.steepnessTo * (1 / curve.toK - 1 / T);
  return curve.sets.length > 0 ? lnAntoine(curve.sets, T) : lnWide(curve.wide!, T);
}

/**
 * d ln P/dT [1/K], in closed form.
 *
 * Taken from the wide-range equation where there is one, not from Antoine: adjoining Antoine sets meet in
 * pressure, but their slopes differ by 1–2 % at the joint and stray by up to 4 % from the true slope within a
 * set. Heats of vaporisation follow from this slope, and a step of 1 % in them (some 200 J/mol) would stop a
 * solver that looks for a temperature by its enthalpy. The wide form is smooth up to the critical point.
 */
export function lnVapourPressureSlope(c: Component, T: number): number {
  const curve = curveOf(c);
  if (!curve) return Number.NaN;
  return steepness(curve, Math.min(Math.max(T, curve.slopeFromK), curve.slopeToK)) / (T * T);
}

/** Range over which the vapour pressure of a component is known [K]; null where nothing is known. */
export function vapourPressureRange(c: Component): { readonly fromK: number; readonly toK: number } | null {
  const curve = curveOf(c);
  return curve && { fromK: curve.fromK, toK: curve.toK };
}

/** ln(P/Pa) = lnA − lnB/(T + C) up to toK: an Antoine set in natural units. */
interface LnSet {
  readonly lnA: number;
  readonly lnB: number;
  readonly C: number;
  readonly toK: number;
}

/** The curve of one component, worked out once. */
interface Curve {
  readonly sets: readonly LnSet[];
  readonly wide: WideVapourPressure | null;
  readonly fromK: number;
  readonly toK: number;
  readonly slopeFromK: number;
  readonly slopeToK: number;
  lnFrom: number;
  lnTo: number;
  /** T² d ln P/dT = −d ln P/d(1/T) at the ends [K] */
  steepnessFrom: number;
  steepnessTo: number;
}

const curves = new WeakMap<Component, Curve>();

function curveOf(c: Component): Curve | null {
  const known = curves.get(c);
  if (known) return known;
  const wide = c.wideVapourPressure;
  if (c.antoine.length === 0 && !wide) return null;
  const fromK = c.antoine[0]?.fromK ?? wide!.fromK;
  const toK = c.antoine.at(-1)?.toK ?? wide!.toK;
  const curve: Curve = {
    sets: closeJoints(c.antoine, c.boilingK),
    wide,
    fromK,
    toK,
    slopeFromK: Math.max(fromK, wide?.fromK ?? fromK),
    slopeToK: Math.min(toK, wide?.toK ?? toK),
    lnFrom: 0,
    lnTo: 0,
    steepnessFrom: 0,
    steepnessTo: 0,
  };
  const at = (T: number) => (curve.sets.length > 0 ? lnAntoine(curve.sets, T) : lnWide(wide!, T));
  curve.lnFrom = at(fromK);
  curve.lnTo = at(toK);
  curve.steepnessFrom = steepness(curve, curve.slopeFromK);
  curve.steepnessTo = steepness(curve, curve.slopeToK);
  curves.set(c, curve);
  return curve;
}

/**
 * Antoine sets in natural units. The printed coefficients of adjoining sets leave steps of about 1e-6 in
 * ln P; they are closed by moving A, starting from the set that holds the boiling point. A larger step is
 * not rounding and is left as given.
 */
function closeJoints(sets: readonly AntoineSet[], boilingK: number | null): LnSet[] {
  const anchor = Math.max(
    sets.findIndex((set) => boilingK !== null && set.fromK <= boilingK && boilingK <= set.toK),
    0,
  );
  const plain = sets.map((set) => ({
    lnA: LN10 * set.A + LN_BAR,
    lnB: LN10 * set.B,
    C: set.C,
    toK: set.toK,
  }));
  const join = (T: number, inner: number, outer: number) => {
    const step = lnSet(plain[inner], T) - lnSet(plain[outer], T);
    if (Math.abs(step) < ROUNDING_STEP) plain[outer].lnA += step;
  };
  for (let k = anchor + 1; k < plain.length; k++) join(plain[k - 1].toK, k - 1, k);
  for (let k = anchor - 1; k >= 0; k--) join(plain[k].toK, k + 1, k);
  return plain;
}

function setAt(sets: readonly LnSet[], T: number): LnSet {
  let k = 0;
  while (k < sets.length - 1 && T > sets[k].toK) k++;
  return sets[k];
}

function lnAntoine(sets: readonly LnSet[], T: number): number {
  return lnSet(setAt(sets, T), T);
}

function lnSet(set: LnSet, T: number): number {
  return set.lnA - set.lnB / (T + set.C);
}

/** T² d ln P/dT [K] at T inside the range. */
function steepness(curve: Curve, T: number): number {
  if (curve.wide) return T * T * wideSlope(curve.wide, T);
  const set = setAt(curve.sets, T);
  const ratio = T / (T + set.C);
  return set.lnB * ratio * ratio;
}

/**
 * wagner25: ln(P/Pc) = (Tc/T)(c1 t + c2 t^1.5 + c3 t^2.5 + c4 t^5), t = 1 − T/Tc
 * dippr101: ln(P/Pa) = c1 + c2/T + c3 ln T + c4 T^c5
 * @source W. Wagner, Cryogenics 13, 470 (1973), exponents 2.5 and 5; DIPPR equation 101
 */
function lnWide(wide: WideVapourPressure, T: number): number {
  if (wide.form === 'dippr101') {
    const [c1, c2, c3, c4, c5] = wide.c;
    return c1 + c2 / T + c3 * Math.log(T) + c4 * T ** c5;
  }
  const [c1, c2, c3, c4] = wide.c;
  const t = Math.max(1 - T / wide.criticalK, 0);
  const root = Math.sqrt(t);
  const sum = t * (c1 + root * (c2 + t * (c3 + t * t * root * c4)));
  return Math.log(wide.criticalPa) + (wide.criticalK / T) * sum;
}

/** d ln P/dT [1/K] of both forms. */
function wideSlope(wide: WideVapourPressure, T: number): number {
  if (wide.form === 'dippr101') {
    const [, c2, c3, c4, c5] = wide.c;
    return -c2 / (T * T) + c3 / T + c4 * c5 * T ** (c5 - 1);
  }
  const [c1, c2, c3, c4] = wide.c;
  const t = Math.max(1 - T / wide.criticalK, 0);
  const root = Math.sqrt(t);
  const sum = t * (c1 + root * (c2 + t * (c3 + t * t * root * c4)));
  const derivative = c1 + root * (1.5 * c2 + t * (2.5 * c3 + 5 * t * t * root * c4));
  return -(derivative + (wide.criticalK / T) * sum) / T;
}
