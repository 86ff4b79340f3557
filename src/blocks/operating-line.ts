import { stoichiometryOf } from '../chemistry/reaction-text.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Reaction } from '../model/reaction.ts';
import { emptyStream, type StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import type { ReactionRun } from './reaction-run.ts';

/** One point of conversion against temperature. */
export interface LinePoint {
  readonly temperature_K: number;
  /** share of the key reactant fed up to here that is converted */
  readonly conversion: number;
}

/** The way of the gas through one adiabatic bed, in points that can be drawn. */
export interface BedPoint extends LinePoint {
  readonly bed: number;
}

/** Points along a bed, its two ends included. */
const POINTS_PER_BED = 11;
const POINTS_OF_EQUILIBRIUM = 21;
/** The equilibrium line reaches this far beyond the operating line on either side [K]. */
const MARGIN_K = 20;

/** The reactant that stands first in the equation of a reaction, by index. */
export function keyReactant(reaction: Reaction, mixture: Mixture): number {
  const [id] = Object.entries(stoichiometryOf(reaction.equation)).find(([, v]) => v < 0)!;
  return mixture.components.findIndex((c) => c.id === id);
}

/** Share of a component fed that is gone; null where none was fed. */
export function conversionOf(component: number, fed: Float64Array, left: Float64Array): number | null {
  return fed[component] > 0 ? (fed[component] - left[component]) / fed[component] : null;
}

/**
 * The operating line of an adiabatic bed: the gas is changed from its inlet to its outlet composition along a
 * straight line, and each point has the temperature of its enthalpy.
 *
 * @param into,out  settled, of equal enthalpy @param fed  what the reactor was fed up to this bed [mol/s]
 */
export function bedLine(
  bed: number,
  into: StreamState,
  out: StreamState,
  key: number,
  fed: Float64Array,
  mixture: Mixture,
): BedPoint[] {
  if (!(fed[key] > 0)) return [];
  const here = emptyStream(mixture.size);
  return Array.from({ length: POINTS_PER_BED }, (_, point) => {
    const way = point / (POINTS_PER_BED - 1);
    const between = (from: number, to: number) => (1 - way) * from + way * to;
    for (let i = 0; i < mixture.size; i++) {
      here.flowsMolPerS[i] = between(into.flowsMolPerS[i], out.flowsMolPerS[i]);
    }
    here.pressurePa = between(into.pressurePa, out.pressurePa);
    here.temperatureK = between(into.temperatureK, out.temperatureK);
    mixture.settleAtEnthalpy(here, between(into.enthalpyW, out.enthalpyW));
    return {
      bed,
      temperature_K: here.temperatureK,
      conversion: conversionOf(key, fed, here.flowsMolPerS)!,
    };
  });
}

/**
 * The equilibrium line: conversion at equilibrium against temperature, from a little below the coldest point of
 * the operating line to a little above its hottest. Temperatures without an equilibrium are left out.
 *
 * @param run  the reactions without approach @param fed  all that is fed [mol/s] @param P  [Pa]
 */
export function equilibriumLine(
  run: ReactionRun,
  operating: readonly LinePoint[],
  key: number,
  fed: Float64Array,
  P: number,
): LinePoint[] {
  if (operating.length === 0) return [];
  const temperatures = operating.map((point) => point.temperature_K);
  const from = Math.min(...temperatures) - MARGIN_K;
  const to = Math.max(...temperatures) + MARGIN_K;
  const product = new Float64Array(fed.length);
  return Array.from({ length: POINTS_OF_EQUILIBRIUM }, (_, point) => point).flatMap((point) => {
    const T = from + ((to - from) * point) / (POINTS_OF_EQUILIBRIUM - 1);
    try {
      run.react(T, P, fed, product);
    } catch (trouble) {
      if (trouble instanceof PassTrouble) return [];
      throw trouble;
    }
    return [{ temperature_K: T, conversion: conversionOf(key, fed, product)! }];
  });
}
