import type { HenryRow } from './data/henry-constants.ts';
import { henryConstants } from './data/henry-constants.ts';

/** The Henry constants of a file count in bar. */
const LN_BAR = Math.log(1e5);
/** Reference temperature of the partial molar volume [K]. */
const VOLUME_REFERENCE_K = 298.15;

/** Henry constant of one gas in one liquid, with its values at the ends of its range worked out. */
export interface HenryConstant extends HenryRow {
  readonly lnFrom: number;
  readonly lnTo: number;
  /** T² d ln H/dT at the ends [K] */
  readonly steepnessFrom: number;
  readonly steepnessTo: number;
}

const bySolvent = new Map<string, Map<string, HenryConstant>>();

/** Henry constant of `soluteId` in `solventId`; undefined where none is known. */
export function henryConstant(solventId: string, soluteId: string): HenryConstant | undefined {
  if (bySolvent.size === 0) fill();
  return bySolvent.get(solventId)?.get(soluteId);
}

/**
 * ln(H/Pa), H = lim f/x at the solvent's saturation pressure: ln(H/bar) = A + B/T + C ln T + D T inside the
 * range, linear in 1/T from the range's end beyond it.
 *
 * @param lnT  ln(T/K), for a caller that asks many constants at one temperature
 */
export function lnHenry(h: HenryConstant, T: number, lnT = Math.log(T)): number {
  if (T < h.fromK) return h.lnFrom + h.steepnessFrom * (1 / h.fromK - 1 / T);
  if (T > h.toK) return h.lnTo + h.steepnessTo * (1 / h.toK - 1 / T);
  return lnInside(h, T, lnT);
}

/** d ln H/dT [1/K]; continuous over the ends of the range. */
export function lnHenrySlope(h: HenryConstant, T: number): number {
  if (T < h.fromK) return h.steepnessFrom / (T * T);
  if (T > h.toK) return h.steepnessTo / (T * T);
  return steepnessInside(h, T) / (T * T);
}

/**
 * Partial molar volume of the dissolved gas [m3/mol], for H(T,P) = H(T) exp(v (P − Psat)/(R T)):
 *   v = v0 + v1 (T − 298.15) + v2 (T − 298.15)²,
 * straight on from the ends of the range, because the parabola turns round outside it. 0 where no volume is
 * known: pressure then leaves H as it is.
 * @source I. R. Krichevsky & J. S. Kasarnovsky, J. Am. Chem. Soc. 57, 2168 (1935), for the correction
 */
export function partialVolume(h: HenryConstant, T: number): number {
  if (!h.v) return 0;
  const inside = Math.min(Math.max(T, h.fromK), h.toK);
  const d = inside - VOLUME_REFERENCE_K;
  return h.v[0] + d * (h.v[1] + d * h.v[2]) + partialVolumeSlope(h, inside) * (T - inside);
}

/** dv/dT [m3/(mol K)] */
export function partialVolumeSlope(h: HenryConstant, T: number): number {
  if (!h.v) return 0;
  const inside = Math.min(Math.max(T, h.fromK), h.toK);
  return h.v[1] + 2 * h.v[2] * (inside - VOLUME_REFERENCE_K);
}

function fill(): void {
  for (const row of henryConstants) {
    const solutes = bySolvent.get(row.solvent) ?? new Map<string, HenryConstant>();
    bySolvent.set(row.solvent, solutes);
    solutes.set(row.solute, {
      ...row,
      lnFrom: lnInside(row, row.fromK, Math.log(row.fromK)),
      lnTo: lnInside(row, row.toK, Math.log(row.toK)),
      steepnessFrom: steepnessInside(row, row.fromK),
      steepnessTo: steepnessInside(row, row.toK),
    });
  }
}

function lnInside(row: HenryRow, T: number, lnT: number): number {
  return LN_BAR + row.A + row.B / T + row.C * lnT + row.D * T;
}

/** T² d ln H/dT [K] */
function steepnessInside(row: HenryRow, T: number): number {
  return -row.B + T * (row.C + T * row.D);
}
