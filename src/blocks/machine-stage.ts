import { copyStream, emptyStream, type StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { createStageSlopes } from './machine-stage-slopes.ts';

/** Which ideal path an efficiency is measured against. */
export type EfficiencyKind = 'isentropic' | 'polytropic';

/** One adiabatic stage of a compressor or expander. Both change the stream in place and return the shaft power given to it [W]. */
export interface MachineStage {
  /** h₂ = h₁ + (h₂s − h₁)/η */
  compress(stream: StreamState, pressurePa: number, efficiency: number, kind: EfficiencyKind): number;
  /** h₂ = h₁ + η (h₂s − h₁); what is returned is negative */
  expand(stream: StreamState, pressurePa: number, efficiency: number): number;
  /** Suction pressure of the last run [Pa]. */
  suctionPa(): number;
  /**
   * Turn the derivatives of the suction of the last run into those of its discharge, in place.
   *
   * @param matrix  in the variables of the inlet of the block (see outlet-slopes.ts)
   * @param pressure  the row of the discharge pressure
   * @returns false where there are none
   */
  carrySlopes(matrix: Float64Array, pressure: Float64Array): boolean;
}

/** Isentropic efficiencies tried for a polytropic one; four do where T₂/T₁ is below 3. */
const MAX_TRIES = 20;
const CLOSE = 1e-11;

/**
 * Stages on the real isentrope s(T₂s, P₂) = s(T₁, P₁) of the mixture's own entropy.
 *
 * A polytropic efficiency is turned into the isentropic one by the polytropic work of a real gas
 *   w_p = Δh − Δs (T₂ − T₁)/ln(T₂/T₁),  η_p = w_p/Δh,
 * which is exact for an ideal gas of constant heat capacity: there η_p = (R ln(P₂/P₁)) / (cp ln(T₂/T₁)).
 *
 * @source isentropic efficiency: any textbook of thermodynamics, e.g. Smith, Van Ness & Abbott, ch. 7;
 *   polytropic work: M. Mallen & G. Saville, Polytropic processes in the performance prediction of centrifugal
 *   compressors, I. Mech. E. C183/77 (1977), from memory
 */
export function createMachineStage(mixture: Mixture): MachineStage {
  const ideal = emptyStream(mixture.size);
  /**
   * What the last stage teaches for the first guess of the next: d ln T/d ln P along the isentrope, null before any; the
   * rise of temperature that was found over the one guessed.
   */
  const last: { exponent: number | null; stretch: number } = { exponent: null, stretch: 1 };
  const from = emptyStream(mixture.size);
  const to = emptyStream(mixture.size);
  const slopes = createStageSlopes(mixture);
  const path = { from, isentropic: ideal, to, workRatio: 1, polytropic: null as number | null };
  let ran = false;

  function isentropicRise(stream: StreamState, pressurePa: number, firstExponent: number): number {
    const entropy = mixture.entropy(stream);
    const lnRatio = Math.log(pressurePa / stream.pressurePa);
    copyStream(stream, from);
    copyStream(stream, ideal);
    ideal.temperatureK = stream.temperatureK * Math.exp((last.exponent ?? firstExponent) * lnRatio);
    ideal.pressurePa = pressurePa;
    mixture.settleAtEntropy(ideal, entropy);
    last.exponent = within(0, Math.log(ideal.temperatureK / stream.temperatureK) / lnRatio, 0.5);
    return ideal.enthalpyW - stream.enthalpyW;
  }

  function isIdle(stream: StreamState, pressurePa: number): boolean {
    // A ratio of 1 but for rounding is no work.
    const idle = Math.abs(pressurePa - stream.pressurePa) <= 1e-12 * stream.pressurePa;
    if (!idle && mixture.total(stream) > 0) return false;
    stream.pressurePa = pressurePa;
    ran = false;
    return true;
  }

  function giveWork(stream: StreamState, pressurePa: number, work: number, guessedRiseK: number): void {
    const fromK = stream.temperatureK;
    stream.temperatureK = fromK + last.stretch * guessedRiseK;
    stream.pressurePa = pressurePa;
    mixture.settleAtEnthalpy(stream, stream.enthalpyW + work);
    last.stretch = within(0.5, (stream.temperatureK - fromK) / guessedRiseK || 1, 2);
    copyStream(stream, to);
    ran = true;
  }

  return {
    compress(stream, pressurePa, efficiency, kind) {
      if (isIdle(stream, pressurePa)) return 0;
      // An ideal diatomic gas gives the first guess: T₂/T₁ = (P₂/P₁)^(2/7).
      const rise = isentropicRise(stream, pressurePa, 2 / 7);
      const isPolytropic = kind === 'polytropic';
      const isentropic = isPolytropic ? matched(stream, rise, efficiency) : efficiency;
      const work = rise / isentropic;
      path.workRatio = 1 / isentropic;
      path.polytropic = isPolytropic ? efficiency : null;
      // Where an efficiency was matched, `ideal` has come to the end of the real path.
      const riseK = ideal.temperatureK - stream.temperatureK;
      giveWork(stream, pressurePa, work, isPolytropic ? riseK : riseK / efficiency);
      return work;
    },
    expand(stream, pressurePa, efficiency) {
      if (isIdle(stream, pressurePa)) return 0;
      path.workRatio = efficiency;
      path.polytropic = null;
      const work = efficiency * isentropicRise(stream, pressurePa, 0);
      giveWork(stream, pressurePa, work, efficiency * (ideal.temperatureK - stream.temperatureK));
      return work;
    },
    suctionPa: () => from.pressurePa,
    carrySlopes: (matrix, pressure) => ran && slopes.carry(path, matrix, pressure),
  };

  /** The isentropic efficiency at which the path from `suction` has the polytropic efficiency wanted, by secants. */
  function matched(suction: StreamState, rise: number, wanted: number): number {
    const s1 = mixture.entropy(suction);
    const polytropicAt = (isentropic: number): number => {
      const work = rise / isentropic;
      mixture.settleAtEnthalpy(ideal, suction.enthalpyW + work);
      const T1 = suction.temperatureK;
      const T2 = ideal.temperatureK;
      const meanK = Math.abs(T2 - T1) > 1e-6 * T1 ? (T2 - T1) / Math.log(T2 / T1) : T1;
      return 1 - ((mixture.entropy(ideal) - s1) * meanK) / work;
    };
    let [e, poly] = [1, 1];
    let next = wanted;
    for (let tries = 0; tries < MAX_TRIES && Math.abs(next - e) > CLOSE; tries++) {
      const polyNext = polytropicAt(next);
      const slope = (polyNext - poly) / (next - e);
      [e, poly] = [next, polyNext];
      if (!(slope > 0)) break;
      next = Math.max(e + (wanted - poly) / slope, 0.5 * e);
    }
    return next;
  }
}

function within(least: number, value: number, most: number): number {
  return Math.min(Math.max(value, least), most);
}
