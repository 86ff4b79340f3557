import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Component } from '../model/component.ts';

/** A reaction whose extent the catalyst sets. */
export interface ConversionReaction {
  name: string;
  /** in component order, products positive */
  coefficients: Float64Array;
  /** share of the key reactant that this reaction takes, 0–1 */
  conversion: number;
  /** index of the key reactant; its coefficient is negative */
  of: number;
}

/** Shortfall taken for rounding, as a share of what there was. */
const rounding = 1e-12;

/**
 * Conversion reactions in the order written:
 *   extent = conversion × (key reactant fed + key reactant formed by reactions written before) / |ν_key|
 *
 * The conversion is a share of the reactor feed. What an earlier reaction consumed is not taken off, so
 * several reactions of one key reactant state a selectivity: 60 % to the product and 5 % to the by-product
 * leave 35 %, in whichever order they are written. What an earlier reaction formed is added, so a
 * consecutive reaction can take its share of an intermediate that is not in the feed.
 *
 * @param feed amounts or flows, not negative
 * @param product written; may not be `feed`
 * @param extents one per reaction, written
 * @throws PassTrouble `reactant-used-up` when a reaction asks for more of a component than there is left
 */
export function applyConversions(
  reactions: readonly ConversionReaction[],
  components: readonly Component[],
  feed: Float64Array,
  product: Float64Array,
  extents: Float64Array,
): void {
  product.set(feed);
  for (let r = 0; r < reactions.length; r++) {
    const reaction = reactions[r];
    const key = reaction.of;
    let base = feed[key];
    for (let k = 0; k < r; k++) base += Math.max(0, reactions[k].coefficients[key] * extents[k]);
    const extent = (reaction.conversion * base) / -reaction.coefficients[key];
    extents[r] = extent;
    for (let i = 0; i < product.length; i++) {
      const change = reaction.coefficients[i] * extent;
      if (change === 0) continue;
      const left = product[i] + change;
      if (left >= 0) product[i] = left;
      else if (-left <= rounding * Math.max(product[i], -change)) product[i] = 0;
      else throw usedUp(reaction, components, i, product[i], -change);
    }
  }
}

/**
 * Derivatives of what `applyConversions` makes of a feed: it is linear, as every extent is a share of amounts.
 * @param product written: ∂product_i/∂feed_j, row by row
 * @param extents written: the same, one row per reaction
 */
export function conversionSlopes(
  reactions: readonly ConversionReaction[],
  size: number,
  product: Float64Array,
  extents: Float64Array,
): void {
  product.fill(0);
  extents.fill(0);
  for (let i = 0; i < size; i++) product[i * size + i] = 1;
  for (let r = 0; r < reactions.length; r++) {
    const { coefficients, conversion, of: key } = reactions[r];
    const share = conversion / -coefficients[key];
    for (let j = 0; j < size; j++) {
      let base = j === key ? 1 : 0;
      for (let k = 0; k < r; k++) base += Math.max(0, reactions[k].coefficients[key]) * extents[k * size + j];
      const extent = share * base;
      extents[r * size + j] = extent;
      for (let i = 0; i < size; i++) product[i * size + j] += coefficients[i] * extent;
    }
  }
}

function usedUp(
  reaction: ConversionReaction,
  components: readonly Component[],
  i: number,
  available: number,
  wanted: number,
): PassTrouble {
  const short = components[i].id;
  const key = components[reaction.of].id;
  const percent = (100 * reaction.conversion).toPrecision(4).replace(/\.?0+$/, '');
  const most = (100 * reaction.conversion * available) / wanted;
  return new PassTrouble(
    'reactant-used-up',
    `Reaction ${reaction.name} runs out of ${short}.`,
    `${percent} % conversion of ${key} takes ${wanted.toPrecision(6)} mol/s of ${short}, and ${available.toPrecision(6)} mol/s are left for it`,
    i === reaction.of
      ? `the conversions of ${key} may not add up to more than 100 %: lower that of ${reaction.name} to ${most.toPrecision(4)} % or less`
      : `lower the conversion of ${reaction.name} to ${most.toPrecision(4)} % or less, or feed more ${short}`,
  );
}
