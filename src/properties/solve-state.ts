import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import { R } from './constants.ts';

const LOWEST_K = 20;
const HIGHEST_K = 3500;
const MAX_STEPS = 200;

/**
 * Find the temperature at which a state function that rises with temperature (enthalpy or entropy at fixed
 * pressure) has a wanted value, starting from the stream's own temperature. The bracket is found by growing
 * steps and closed by regula falsi with halving of the stale end (Illinois). Where the function jumps (a pure
 * component boils) the two sides are mixed so that the value is met.
 *
 * @param stream  changed in place: temperature and whatever `settle` sets
 * @param wanted  value to reach, in the unit of `value`
 * @param settle  from T, P, flows to phases and enthalpy
 * @param value  the state function of a settled stream
 * @throws PassTrouble when the value lies outside 20–3500 K
 * @source Dowell & Jarratt, BIT 11 (1971) 168–174 (the Illinois rule)
 */
export function solveState(
  stream: StreamState,
  wanted: number,
  name: 'enthalpy' | 'entropy',
  settle: (stream: StreamState) => void,
  value: (stream: StreamState) => number,
): void {
  const total = stream.flowsMolPerS.reduce((sum, flow) => sum + flow, 0);
  if (total === 0) {
    settle(stream);
    return;
  }
  const errorAt = (T: number): number => {
    stream.temperatureK = T;
    settle(stream);
    return value(stream) - wanted;
  };
  const start = Math.min(Math.max(stream.temperatureK, LOWEST_K), HIGHEST_K);
  // A kelvin of any stream holds at least the heat of a monatomic gas: this is 1e-12 of the temperature.
  const tolerance = 1e-12 * 2.5 * R * total * (name === 'enthalpy' ? start : 1);
  let low = start;
  let errorLow = errorAt(low);
  if (Number.isNaN(errorLow)) throw outOfReach(name, start);
  if (Math.abs(errorLow) <= tolerance) return;
  let high = low;
  let errorHigh = errorLow;
  // First step from a slope over 0.1 K: most states lie within a few kelvins of their start.
  const probe = errorLow < 0 ? start + 0.1 : start - 0.1;
  const slope = (errorAt(probe) - errorLow) / (probe - start);
  let step = slope > 0 ? Math.min(Math.max(1.02 * Math.abs(errorLow / slope), 1e-6), 200) : 1;
  while (errorLow > 0 || errorHigh < 0) {
    if (errorLow > 0) {
      if (low <= LOWEST_K) throw outOfReach(name, LOWEST_K);
      high = low;
      errorHigh = errorLow;
      low = Math.max(low - step, LOWEST_K);
      errorLow = errorAt(low);
    } else {
      if (high >= HIGHEST_K) throw outOfReach(name, HIGHEST_K);
      low = high;
      errorLow = errorHigh;
      high = Math.min(high + step, HIGHEST_K);
      errorHigh = errorAt(high);
    }
    step *= 2;
    if (Number.isNaN(errorLow) || Number.isNaN(errorHigh)) throw outOfReach(name, stream.temperatureK);
  }
  if (errorLow === 0) errorAt(low);
  else if (errorHigh === 0) errorAt(high);
  else close(stream, { low, errorLow, high, errorHigh }, tolerance, errorAt);
}

function close(
  stream: StreamState,
  bracket: { low: number; errorLow: number; high: number; errorHigh: number },
  tolerance: number,
  errorAt: (T: number) => number,
): void {
  let { low, errorLow, high, errorHigh } = bracket;
  let weightLow = errorLow;
  let weightHigh = errorHigh;
  let stale = 0;
  for (let step = 0; step < MAX_STEPS && high - low > 1e-13 * high; step++) {
    let T = low - (weightLow * (high - low)) / (weightHigh - weightLow);
    // Every fourth step halves the bracket, so that a jump is closed in as fast as a slope.
    if (!(T > low && T < high) || step % 4 === 3) T = 0.5 * (low + high);
    if (T === low || T === high) break;
    const error = errorAt(T);
    if (Math.abs(error) <= tolerance) return;
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
  mixSides(stream, low, errorLow, high, errorHigh, errorAt);
}

/** The bracket has shrunk to rounding and the value still jumps across it: find the share of each side. */
function mixSides(
  stream: StreamState,
  low: number,
  errorLow: number,
  high: number,
  errorHigh: number,
  errorAt: (T: number) => number,
): void {
  const share = -errorLow / (errorHigh - errorLow);
  errorAt(low);
  const cold = stream.liquidMolPerS.slice();
  const coldFraction = stream.vapourFraction;
  const coldEnthalpy = stream.enthalpyW;
  errorAt(high);
  for (let i = 0; i < cold.length; i++) {
    stream.liquidMolPerS[i] = (1 - share) * cold[i]! + share * stream.liquidMolPerS[i]!;
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
