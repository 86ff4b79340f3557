import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';

/**
 * Settle a stream at the enthalpy it came with plus the duty set on its block.
 *
 * @throws PassTrouble when the duty is more than the stream can take up or give, condensation or boiling included
 */
export function settleWithDuty(mixture: Mixture, stream: StreamState, inletW: number, dutyW: number): void {
  try {
    mixture.settleAtEnthalpy(stream, inletW + dutyW);
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble) || trouble.code !== 'temperature-bound' || dutyW === 0)
      throw trouble;
    throw tooMuchDuty(mixture.total(stream), dutyW);
  }
}

function tooMuchDuty(molPerS: number, dutyW: number): PassTrouble {
  const cools = dutyW < 0;
  const amount = `${(dutyW / 1e6).toPrecision(4)} MW`;
  const trouble = new PassTrouble(
    'duty-too-large',
    `The duty of ${amount} is more heat than this stream of ${(molPerS * 3.6).toPrecision(4)} kmol/h ${cools ? 'holds' : 'can take up'}.`,
    cools
      ? 'with all of it condensed and cooled to 20 K it would not have given so much'
      : 'with all of it boiled and heated to 3500 K it would not have taken so much',
    `set duty closer to zero, or set temperature instead of duty`,
  );
  trouble.setting = 'duty';
  return trouble;
}
