import { copyStream, emptyStream, type StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { type ClosestApproach, createCounterCurrent } from './counter-current.ts';

/** How much heat two streams let through. */
export interface DutyLimit {
  /** the inlets, and the pressures at which the two streams leave [Pa] */
  between(hot: StreamState, cold: StreamState, hotOutPa: number, coldOutPa: number): void;
  /** Most heat with a difference at both ends [W], never below 0. */
  heatAtEnds(differenceK: number): number;
  /**
   * Most heat with a closest approach anywhere along the curve [W], never below 0.
   * @throws PassTrouble
   */
  heatAtApproach(approachK: number): number;
  /** Temperatures of the outlets and the closest approach when so much is moved [W]. @throws PassTrouble */
  moved(heatW: number): {
    readonly hotOutK: number;
    readonly coldOutK: number;
    readonly closest: ClosestApproach;
  };
}

/** The closest approach is met to this [K]; the search stops as well when the heat is known to rounding. */
const MET_K = 1e-9;
const LEAST_SPAN = 1e-13;
const MAX_STEPS = 80;

/**
 * Limits of the heat between two streams. The closest approach shrinks as more heat is moved; where the ends
 * do not decide it, the heat is found between 0 and the limit of the ends by regula falsi with halving of the
 * stale end (Illinois), starting from the last answer.
 *
 * @source Dowell & Jarratt, BIT 11 (1971) 168–174 (the Illinois rule)
 */
export function createDutyLimit(mixture: Mixture): DutyLimit {
  const hot = emptyStream(mixture.size);
  const cold = emptyStream(mixture.size);
  const hotOut = emptyStream(mixture.size);
  const coldOut = emptyStream(mixture.size);
  const probe = emptyStream(mixture.size);
  const curve = createCounterCurrent(mixture);
  let last = 0;

  /** Enthalpy of a stream at a temperature and pressure [W]. */
  function enthalpyAt(stream: StreamState, temperatureK: number, pressurePa: number): number {
    probe.flowsMolPerS.set(stream.flowsMolPerS);
    probe.temperatureK = temperatureK;
    probe.pressurePa = pressurePa;
    mixture.settle(probe);
    return probe.enthalpyW;
  }

  function heatAtEnds(differenceK: number): number {
    if (hot.temperatureK - cold.temperatureK <= differenceK) return 0;
    if (mixture.total(hot) === 0 || mixture.total(cold) === 0) return 0;
    const given = hot.enthalpyW - enthalpyAt(hot, cold.temperatureK + differenceK, hotOut.pressurePa);
    const taken = enthalpyAt(cold, hot.temperatureK - differenceK, coldOut.pressurePa) - cold.enthalpyW;
    return Math.max(Math.min(given, taken), 0);
  }

  function closestAt(heatW: number): ClosestApproach {
    mixture.settleAtEnthalpy(hotOut, hot.enthalpyW - heatW);
    mixture.settleAtEnthalpy(coldOut, cold.enthalpyW + heatW);
    curve.lay(hot, hotOut, cold, coldOut);
    return curve.closest();
  }

  return {
    heatAtEnds,
    between(hotIn, coldIn, hotOutPa, coldOutPa) {
      copyStream(hotIn, hot);
      copyStream(coldIn, cold);
      copyStream(hotIn, hotOut);
      copyStream(coldIn, coldOut);
      hotOut.pressurePa = hotOutPa;
      coldOut.pressurePa = coldOutPa;
    },
    heatAtApproach(approachK) {
      const most = heatAtEnds(approachK);
      if (most === 0) return 0;
      const errorAt = (heatW: number) => approachK - closestAt(heatW).differenceK;
      const errorMost = errorAt(most);
      if (errorMost <= MET_K) return most;
      last = solveRising(errorAt, most, errorMost, approachK - (hot.temperatureK - cold.temperatureK), last);
      return last;
    },
    moved(heatW) {
      const closest = closestAt(heatW);
      return { hotOutK: hotOut.temperatureK, coldOutK: coldOut.temperatureK, closest };
    },
  };
}

/** The root of a rising function between 0 and `high`; `guess` is tried first. */
function solveRising(
  f: (x: number) => number,
  high: number,
  errorHigh: number,
  errorLow: number,
  guess: number,
): number {
  let low = 0;
  let weightLow = errorLow;
  let weightHigh = errorHigh;
  let stale = 0;
  for (let step = 0; step < MAX_STEPS && high - low > LEAST_SPAN * high; step++) {
    let x = low - (weightLow * (high - low)) / (weightHigh - weightLow);
    if (step === 0 && guess > low && guess < high) x = guess;
    if (!(x > low && x < high)) x = 0.5 * (low + high);
    const error = f(x);
    if (Math.abs(error) <= MET_K) return x;
    if (error < 0) {
      [low, weightLow] = [x, error];
      if (stale < 0) weightHigh *= 0.5;
      stale = -1;
    } else {
      [high, weightHigh] = [x, error];
      if (stale > 0) weightLow *= 0.5;
      stale = 1;
    }
  }
  return low;
}
