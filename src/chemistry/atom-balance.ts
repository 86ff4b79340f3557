import type { Component } from '../model/component.ts';

/** Atoms of one element that a reaction makes (positive) or loses per extent. */
export interface AtomGap {
  readonly element: string;
  readonly gap: number;
}

/** Elements that a reaction does not keep, in order of first appearance; empty when it is balanced. */
export function atomGaps(coefficients: Float64Array, components: readonly Component[]): AtomGap[] {
  const gaps = new Map<string, { gap: number; size: number }>();
  components.forEach((component, i) => {
    const v = coefficients[i];
    if (v === 0) return;
    for (const [element, atoms] of Object.entries(component.elements)) {
      const sum = gaps.get(element) ?? { gap: 0, size: 0 };
      gaps.set(element, { gap: sum.gap + v * atoms, size: sum.size + Math.abs(v * atoms) });
    }
  });
  // rounding of 1/3 passes; a coefficient written as 0.3333 does not, it would leak atoms in every pass
  return [...gaps].flatMap(([element, { gap, size }]) =>
    Math.abs(gap) > 1e-12 * size ? [{ element, gap }] : [],
  );
}

/** A fraction in lowest terms, denominator positive; whole numbers small enough to stay exact. */
interface Fraction {
  readonly top: number;
  readonly bottom: number;
}

/**
 * Smallest whole coefficients that balance a reaction between the given species, all positive on their side;
 * null where none exist or where more than one independent choice is possible.
 *
 * The null space of the matrix (elements × species, right side negative) is found in exact fractions.
 */
export function balancingCoefficients(
  left: readonly Component[],
  right: readonly Component[],
): { left: number[]; right: number[] } | null {
  const species = [...left, ...right];
  const elements = [...new Set(species.flatMap((c) => Object.keys(c.elements)))];
  const counts = elements.map((e) =>
    species.map((c, j) => (j < left.length ? 1 : -1) * (c.elements[e] ?? 0)),
  );
  if (counts.some((row) => row.some((x) => !Number.isInteger(x)))) return null;
  const rows = counts.map((row) => row.map((x) => fraction(x, 1)));
  const pivots = reduceFractions(rows, species.length);
  const free = species.map((_, j) => j).filter((j) => !pivots.includes(j));
  if (free.length !== 1) return null;
  const values = species.map((_, j) => {
    if (j === free[0]) return fraction(1, 1);
    const entry = rows[pivots.indexOf(j)][free[0]];
    return fraction(-entry.top, entry.bottom);
  });
  if (values.some((x) => x.top <= 0)) return null;
  const common = values.reduce((m, x) => (m * x.bottom) / gcd(m, x.bottom), 1);
  const whole = values.map((x) => (x.top * common) / x.bottom);
  const shared = whole.reduce((g, x) => gcd(g, x), 0);
  const smallest = whole.map((x) => x / shared);
  return { left: smallest.slice(0, left.length), right: smallest.slice(left.length) };
}

/** Reduced row echelon form in place; returns the pivot columns, one per leading row. */
function reduceFractions(rows: Fraction[][], columns: number): number[] {
  const pivots: number[] = [];
  for (let column = 0; column < columns && pivots.length < rows.length; column++) {
    const at = pivots.length;
    const found = rows.findIndex((row, r) => r >= at && row[column].top !== 0);
    if (found < 0) continue;
    [rows[at], rows[found]] = [rows[found], rows[at]];
    const head = rows[at][column];
    rows[at] = rows[at].map((x) => fraction(x.top * head.bottom, x.bottom * head.top));
    rows.forEach((row, r) => {
      if (r === at || row[column].top === 0) return;
      const factor = row[column];
      rows[r] = row.map((x, j) => subtract(x, factor, rows[at][j]));
    });
    pivots.push(column);
  }
  return pivots;
}

/** a − factor·b */
function subtract(a: Fraction, factor: Fraction, b: Fraction): Fraction {
  const product = fraction(factor.top * b.top, factor.bottom * b.bottom);
  return fraction(a.top * product.bottom - product.top * a.bottom, a.bottom * product.bottom);
}

function fraction(top: number, bottom: number): Fraction {
  const g = gcd(top, bottom) * (bottom < 0 ? -1 : 1);
  return { top: top / g, bottom: bottom / g };
}

function gcd(a: number, b: number): number {
  let x = Math.abs(a);
  let y = Math.abs(b);
  while (y > 0) [x, y] = [y, x % y];
  return x === 0 ? 1 : x;
}
