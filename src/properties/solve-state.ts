import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import { R } from './constants.ts';

const LOWEST_K = 20;
const HIGHEST_K = 3500;
const MAX_STEPS = 200;
/**
 * A step is at most this share of the temperature: a leap from 300 K to 100 K would land where the data of most
 * liquids end, and what is found there need not be the root nearest to the start.
 */
const LONGEST_STEP = 0.2;
const MAX_SECANTS = 8;
/** A secant that leaves more of the error than this has met a kink or a jump [-]. */
const SECANT_LEAVES = 0.25;
/**
 * A gas is not settled again after a step of less than this share of T: what the curve of its heat capacity leaves of it
 * is below the tolerance, even where that changes by a tenth per kelvin.
 */
const LAST_STEP = 2e-7;
/** Points closer together than this share of T tell rounding, not the slope. */
const LEAST_SPAN = 1e-7;

/**
 * One search, kept for the next one of the same stream, so that a pass allocates nothing: numbers are its fields, for a
 * variable that a closure shares is allocated anew at each change.
 */
interface Search {
  settle: (stream: StreamState) => void;
  value: (stream: StreamState) => number;
  clearHeatCapacity: (stream: StreamState) => number;
  isEntropy: boolean;
  wanted: number;
  tolerance: number;
  /** where the answer lies: below it `low`, above it `high`, NaN before one is met */
  low: number;
  errorLow: number;
  high: number;
  errorHigh: number;
  /** that of the last secant */
  slope: number;
  /** what a mole takes up per kelvin, reaction and condensation included, 0 before it is known [J/(mol K)] */
  heatCapacity: number;
}

const searches = new WeakMap<StreamState, Search>();

/**
 * Find the temperature at which a state function that rises with temperature (enthalpy or entropy at fixed
 * pressure) has a wanted value, starting from the stream's own temperature: by Newton's steps in a gas whose heat
 * capacity is known, and by secants elsewhere while they close in fast, the first with the heat capacity of the stream's
 * last search; otherwise a bracket is found by growing
 * steps and closed by regula falsi with halving of the stale end (Illinois). Where the function jumps (a pure
 * component boils) the two sides are mixed so that the value is met.
 *
 * @param stream  changed in place: temperature and whatever `settle` sets
 * @param wanted  value to reach, in the unit of `value`
 * @param settle  from T, P, flows to phases and enthalpy
 * @param value  the state function of a settled stream
 * @param clearHeatCapacity  heat capacity of the stream settled last [W/K] where it is gas that stays gas 1e-6 of the
 *   temperature lower, NaN elsewhere; the last step then only moves its temperature and enthalpy
 * @throws PassTrouble when the value lies outside 20–3500 K
 * @source Dowell & Jarratt, BIT 11 (1971) 168–174 (the Illinois rule)
 */
export function solveState(
  stream: StreamState,
  wanted: number,
  name: 'enthalpy' | 'entropy',
  settle: (stream: StreamState) => void,
  value: (stream: StreamState) => number,
  clearHeatCapacity: (stream: StreamState) => number = unknown,
): void {
  const { flowsMolPerS } = stream;
  let total = 0;
  for (let i = 0; i < flowsMolPerS.length; i++) total += flowsMolPerS[i];
  if (total === 0) {
    settle(stream);
    return;
  }
  const search = searchOf(stream);
  search.settle = settle;
  search.value = value;
  search.clearHeatCapacity = clearHeatCapacity;
  search.isEntropy = name === 'entropy';
  search.wanted = wanted;
  const start = Math.min(Math.max(stream.temperatureK, LOWEST_K), HIGHEST_K);
  // A kelvin of any stream holds at least the heat of a monatomic gas: this is 1e-12 of the temperature.
  search.tolerance = 1e-12 * 2.5 * R * total * (name === 'enthalpy' ? start : 1);
  const error = errorAt(stream, search, start);
  if (Number.isNaN(error)) throw outOfReach(name, start);
  // The step of a gas costs no settling: it is taken within the tolerance as well.
  if (takesLastStep(stream, search, start, error) || Math.abs(error) <= search.tolerance) return;
  const perHeatCapacity = name === 'enthalpy' ? total : total / start;
  search.low = Number.NaN;
  search.high = Number.NaN;
  narrow(search, start, error);
  if (Number.isNaN(search.slope)) {
    search.slope = search.heatCapacity * perHeatCapacity || slopeAt(stream, search, start, error);
  }
  if (closesBySecants(stream, search, start, error)) {
    if (search.slope > 0) search.heatCapacity = search.slope / perHeatCapacity;
    return;
  }
  if (!findsBracket(stream, search, name)) close(stream, search);
}

function searchOf(stream: StreamState): Search {
  const known = searches.get(stream);
  if (known) return known;
  const search: Search = {
    settle: () => {},
    value: unknown,
    clearHeatCapacity: unknown,
    isEntropy: false,
    wanted: Number.NaN,
    tolerance: Number.NaN,
    low: Number.NaN,
    errorLow: Number.NaN,
    high: Number.NaN,
    errorHigh: Number.NaN,
    slope: Number.NaN,
    heatCapacity: 0,
  };
  searches.set(stream, search);
  return search;
}

function unknown(): number {
  return Number.NaN;
}

/**
 * Where the stream just settled is clear gas, takes its slope, and the step along it where no other need follow.
 * Leaves NaN as the slope elsewhere.
 */
function takesLastStep(stream: StreamState, search: Search, T: number, error: number): boolean {
  const heatCapacity = search.clearHeatCapacity(stream);
  search.slope = search.isEntropy ? heatCapacity / T : heatCapacity;
  const way = -error / search.slope;
  if (!(search.slope > 0 && Math.abs(way) <= LAST_STEP * T)) return false;
  stream.temperatureK = T + way;
  stream.enthalpyW += heatCapacity * way;
  return true;
}

/** Settles the stream at a temperature; its value there less the one wanted. */
function errorAt(stream: StreamState, search: Search, T: number): number {
  stream.temperatureK = T;
  search.settle(stream);
  return search.value(stream) - search.wanted;
}

function narrow(search: Search, T: number, error: number): void {
  if (error < 0 && !(T <= search.low)) {
    search.low = T;
    search.errorLow = error;
  } else if (error > 0 && !(T >= search.high)) {
    search.high = T;
    search.errorHigh = error;
  }
}

/** The slope over 0.1 K towards the answer. */
function slopeAt(stream: StreamState, search: Search, T: number, error: number): number {
  const probe = error < 0 ? T + 0.1 : T - 0.1;
  return (errorAt(stream, search, probe) - error) / (probe - T);
}

/** True when the value is met; false leaves what was learnt in `search`. */
function closesBySecants(stream: StreamState, search: Search, start: number, errorAtStart: number): boolean {
  let T = start;
  let error = errorAtStart;
  for (let step = 0; step < MAX_SECANTS && search.slope > 0; step++) {
    const longest = LONGEST_STEP * T;
    const way = Math.min(Math.max(-error / search.slope, -longest), longest);
    const next = Math.min(Math.max(T + way, LOWEST_K), HIGHEST_K);
    if (next <= search.low || next >= search.high) return false;
    const errorNext = errorAt(stream, search, next);
    const slope = search.slope;
    if (takesLastStep(stream, search, next, errorNext) || Math.abs(errorNext) <= search.tolerance)
      return true;
    const isKnown = !Number.isNaN(search.slope);
    if (!isKnown) search.slope = slope;
    narrow(search, next, errorNext);
    // The first slope may be that of another pressure or composition: the second secant mends it.
    if (!(Math.abs(errorNext) < (step === 0 ? 1 : SECANT_LEAVES) * Math.abs(error))) return false;
    if (!isKnown && Math.abs(next - T) > LEAST_SPAN * T) search.slope = (errorNext - error) / (next - T);
    T = next;
    error = errorNext;
  }
  return false;
}

/** Goes on from the known end by growing steps until the other is met; true when a step happens to meet the value. */
function findsBracket(stream: StreamState, search: Search, name: 'enthalpy' | 'entropy'): boolean {
  const missing = Number.isNaN(search.high) ? search.errorLow : search.errorHigh;
  const first = 1.02 * Math.abs(missing / search.slope);
  let step = search.slope > 0 ? Math.max(first, 1e-6) : 1;
  while (Number.isNaN(search.low) || Number.isNaN(search.high)) {
    const from = Number.isNaN(search.high) ? search.low : search.high;
    const way = Math.min(step, LONGEST_STEP * from);
    const T = Math.min(Math.max(from === search.low ? from + way : from - way, LOWEST_K), HIGHEST_K);
    if (T === from) throw outOfReach(name, T);
    const error = errorAt(stream, search, T);
    if (Number.isNaN(error)) throw outOfReach(name, T);
    if (Math.abs(error) <= search.tolerance) return true;
    narrow(search, T, error);
    step *= 2;
  }
  return false;
}

function close(stream: StreamState, search: Search): void {
  let { low, errorLow, high, errorHigh } = search;
  let weightLow = errorLow;
  let weightHigh = errorHigh;
  let stale = 0;
  for (let step = 0; step < MAX_STEPS && high - low > 1e-13 * high; step++) {
    let T = low - (weightLow * (high - low)) / (weightHigh - weightLow);
    // Every fourth step halves the bracket, so that a jump is closed in as fast as a slope.
    if (!(T > low && T < high) || step % 4 === 3) T = 0.5 * (low + high);
    if (T === low || T === high) break;
    const error = errorAt(stream, search, T);
    if (Math.abs(error) <= search.tolerance) return;
    if (error < 0) {
      low = T;
      errorLow = error;
      weightLow = error;
      weightHigh = stale < 0 ? 0.5 * weightHigh : errorHigh;
      stale = -1;
    } else {
      high = T;
      errorHigh = error;
      weightHigh = error;
      weightLow = stale > 0 ? 0.5 * weightLow : errorLow;
      stale = 1;
    }
  }
  mixSides(stream, search, low, high);
}

/**
 * The bracket has shrunk to rounding and the value still jumps across it: find the share of each side. Their
 * errors are taken anew with their states, because in so steep a place the last digit of T decides both.
 */
function mixSides(stream: StreamState, search: Search, low: number, high: number): void {
  const errorLow = errorAt(stream, search, low);
  const cold = stream.liquidMolPerS.slice();
  const coldFraction = stream.vapourFraction;
  const coldEnthalpy = stream.enthalpyW;
  const errorHigh = errorAt(stream, search, high);
  const share = Math.min(Math.max(-errorLow / (errorHigh - errorLow), 0), 1) || 0;
  for (let i = 0; i < cold.length; i++) {
    stream.liquidMolPerS[i] = (1 - share) * cold[i] + share * stream.liquidMolPerS[i];
  }
  stream.vapourFraction = (1 - share) * coldFraction + share * stream.vapourFraction;
  stream.enthalpyW = (1 - share) * coldEnthalpy + share * stream.enthalpyW;
}

function outOfReach(name: string, T: number): PassTrouble {
  return new PassTrouble(
    'temperature-bound',
    `No temperature between ${LOWEST_K} and ${HIGHEST_K} K gives the ${name} that the balance asks for.`,
    `the search ended at ${T.toFixed(1)} K`,
    'check the duty, the inlet temperatures and the reactions of this block',
  );
}
