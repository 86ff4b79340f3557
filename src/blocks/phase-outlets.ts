import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';

/** Part a stream whose phases are known into its gas and its liquid (solids leave with the liquid), but for enthalpies. */
export function partFlows(mixed: StreamState, gas: StreamState, liquid: StreamState): void {
  for (const out of [gas, liquid]) {
    out.temperatureK = mixed.temperatureK;
    out.pressurePa = mixed.pressurePa;
  }
  for (let i = 0; i < mixed.flowsMolPerS.length; i++) {
    const down = mixed.liquidMolPerS[i];
    gas.flowsMolPerS[i] = mixed.flowsMolPerS[i] - down;
    gas.liquidMolPerS[i] = 0;
    liquid.flowsMolPerS[i] = down;
    liquid.liquidMolPerS[i] = down;
  }
  gas.vapourFraction = 1;
  liquid.vapourFraction = 0;
}

/** The same, each with its enthalpy. */
export function partPhases(
  mixed: StreamState,
  gas: StreamState,
  liquid: StreamState,
  mixture: Mixture,
): void {
  partFlows(mixed, gas, liquid);
  mixture.settlePhases(liquid);
  // One of them takes the difference, so that the two together hold exactly what the mixed stream held.
  if (mixture.total(gas) > 0) {
    gas.enthalpyW = mixed.enthalpyW - liquid.enthalpyW;
  } else {
    gas.enthalpyW = 0;
    liquid.enthalpyW = mixed.enthalpyW;
  }
}
