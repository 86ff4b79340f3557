import { copyStream, emptyStream, type StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { partPhases } from './phase-outlets.ts';

/** The drums behind the coolers of a compressor: each takes the liquid out of the gas, all drain to the first. */
export interface KnockOut {
  /** Begin a pass. */
  start(): void;
  /** Part a cooled, settled stream: the gas stays in it, its liquid goes to the drains. */
  drain(stream: StreamState): void;
  /**
   * Write the condensate: what every drum drained, let down to the pressure of the first without heat or work and
   * mixed there, so that it may carry flash gas.
   * @param emptyK,emptyPa  state of a condensate of nothing
   */
  collect(condensate: StreamState, emptyK: number, emptyPa: number): void;
}

/** Knock-out of what condenses between the stages of a compressor. */
export function createKnockOut(mixture: Mixture): KnockOut {
  const gas = emptyStream(mixture.size);
  const liquid = emptyStream(mixture.size);
  const drains = emptyStream(mixture.size);
  let enthalpyW = 0;
  let drained = 0;

  return {
    start() {
      drains.flowsMolPerS.fill(0);
      enthalpyW = 0;
      drained = 0;
    },
    drain(stream) {
      partPhases(stream, gas, liquid, mixture);
      copyStream(gas, stream);
      if (mixture.total(liquid) === 0) return;
      drained++;
      if (drained === 1) {
        copyStream(liquid, drains);
      } else {
        for (let i = 0; i < mixture.size; i++) drains.flowsMolPerS[i] += liquid.flowsMolPerS[i];
      }
      enthalpyW += liquid.enthalpyW;
    },
    collect(condensate, emptyK, firstPa) {
      copyStream(drains, condensate);
      if (drained === 0) {
        condensate.temperatureK = emptyK;
        condensate.pressurePa = firstPa;
        mixture.settle(condensate);
      } else if (drained > 1 || drains.pressurePa !== firstPa) {
        condensate.pressurePa = firstPa;
        mixture.settleAtEnthalpy(condensate, enthalpyW);
      }
    },
  };
}
