import type { Component } from '../model/component.ts';
import type { Reaction } from '../model/reaction.ts';
import { R, R_NASA, STANDARD_PRESSURE_PA } from '../properties/constants.ts';
import type { IdealGas } from '../properties/ideal-gas.ts';
import { isPublishedFault, matchPublished } from './published-constants.ts';
import { formatTerms } from './reaction-format.ts';
import { stoichiometryOf } from './reaction-text.ts';

/** ln K of one reaction as a function of temperature, and where it comes from. */
export interface LnK {
  /** T in K; activities f/standardPressurePa, solids 1 */
  lnK(T: number): number;
  readonly standardPressurePa: number;
  /** in words, for the result */
  readonly source: string;
  /** where the source holds; null where it says nothing */
  readonly range: { readonly fromK: number; readonly toK: number } | null;
}

/**
 * The equilibrium constant of a reaction, times the factor that a study has moved (`reaction.moved`):
 *   Gibbs:      ln K = Σ ν (S°/R − H°/(R T))
 *   published:  factor × the published ln K, factor −1 for the reverse reaction and so on
 *   formula:    as the user wrote it
 *
 * @throws Error when a published constant does not fit the reaction: check with `matchPublished` on reading
 */
export function createLnK(reaction: Reaction, idealGas: IdealGas): LnK {
  const { moved } = reaction;
  const plain = asTheSourceSays(reaction, idealGas);
  return moved === undefined ? plain : { ...plain, lnK: (T) => plain.lnK(T) + moved.lnFactor };
}

function asTheSourceSays(reaction: Reaction, idealGas: IdealGas): LnK {
  const { constant } = reaction;
  switch (constant.kind) {
    case 'gibbs':
      return {
        lnK: gibbsLnK(reaction.coefficients, idealGas),
        standardPressurePa: STANDARD_PRESSURE_PA,
        source: 'Gibbs energies of the components',
        range: null,
      };
    case 'published':
      return publishedLnK(constant.name, stoichiometryOf(reaction.equation));
    case 'formula':
      return {
        lnK: constant.lnK,
        standardPressurePa: constant.standardPressurePa,
        source: `formula of the user: lnK = ${constant.text}`,
        range: null,
      };
  }
}

/** ΔH of a reaction per extent in the ideal gas (solids as such) [J/mol]. */
export function createReactionEnthalpy(
  coefficients: Float64Array,
  idealGas: IdealGas,
): (T: number) => number {
  const h = new Float64Array(idealGas.size);
  return (T) => {
    idealGas.enthalpies(T, h);
    return dot(coefficients, h);
  };
}

/**
 * K in terms of concentrations: Kc = K (P°/(R T))^Δν, P°/(R T) in mol/L, Δν over the gas species.
 * @returns ln Kc, Kc in (mol/L)^Δν
 */
export function lnKcMolPerL(
  lnK: number,
  standardPressurePa: number,
  coefficients: Float64Array,
  components: readonly Component[],
  T: number,
): number {
  let change = 0;
  components.forEach((c, i) => {
    if (!c.solid) change += coefficients[i];
  });
  const molPerL = standardPressurePa / (R * T) / 1000;
  return lnK + change * Math.log(molPerL);
}

function gibbsLnK(coefficients: Float64Array, idealGas: IdealGas): (T: number) => number {
  const h = new Float64Array(idealGas.size);
  const s = new Float64Array(idealGas.size);
  return (T) => {
    idealGas.enthalpies(T, h);
    idealGas.entropies(T, s);
    // the gas constant of the polynomials: their H/(R T) and S/R are what was fitted
    return (dot(coefficients, s) - dot(coefficients, h) / T) / R_NASA;
  };
}

/** Σ ν x over the species that take part: one without data that takes no part must not spoil the sum. */
function dot(coefficients: Float64Array, x: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < coefficients.length; i++) {
    const v = coefficients[i];
    if (v !== 0) sum += v * x[i];
  }
  return sum;
}

function publishedLnK(name: string, stoichiometry: Record<string, number>): LnK {
  const match = matchPublished(name, stoichiometry);
  if (isPublishedFault(match)) throw new Error(`${match.code}: ${match.what}`);
  const { constant, factor } = match;
  const scaled = factor === 1 ? '' : `, from that of ${formatTerms(constant.stoichiometry)}`;
  return {
    lnK: (T) => factor * constant.lnK(T),
    standardPressurePa: constant.standardPressurePa,
    source: `${name}: ${constant.source}${scaled}`,
    range: constant.range,
  };
}
