import type { Component } from '../model/component.ts';

/** Coefficients in component order as text: 'N2 + 3 H2 <=> 2 NH3'. */
export function formatReaction(coefficients: Float64Array, components: readonly Component[]): string {
  return formatSides(components.map((c, i) => [c.id, coefficients[i]]));
}

/** The same for coefficients by component id. */
export function formatTerms(stoichiometry: Readonly<Record<string, number>>): string {
  return formatSides(Object.entries(stoichiometry));
}

function formatSides(terms: readonly (readonly [string, number])[]): string {
  const left = terms.filter(([, v]) => v < 0).map(([id, v]) => formatTerm(-v, id));
  const right = terms.filter(([, v]) => v > 0).map(([id, v]) => formatTerm(v, id));
  return `${left.join(' + ')} <=> ${right.join(' + ')}`;
}

function formatTerm(coefficient: number, id: string): string {
  return coefficient === 1 ? id : `${formatCoefficient(coefficient)} ${id}`;
}

/** 2 -> '2', 0.5 -> '1/2', 1.37 -> '1.37': small fractions as such, all else in up to twelve digits. */
export function formatCoefficient(x: number): string {
  for (let bottom = 1; bottom <= 6; bottom++) {
    const top = Math.round(x * bottom);
    if (top !== 0 && Math.abs(x * bottom - top) < 1e-12 * Math.abs(top)) {
      return bottom === 1 ? String(top) : `${top}/${bottom}`;
    }
  }
  return String(Number(x.toPrecision(12)));
}
