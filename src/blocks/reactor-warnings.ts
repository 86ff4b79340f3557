import type { StreamState } from '../model/stream.ts';
import type { BlockReport } from './block.ts';

/** Liquid in a place of a reactor, whose equilibria are those of a gas. */
export function liquidWarnings(
  places: readonly { readonly name: string; readonly stream: StreamState }[],
): BlockReport['warnings'] {
  return places.flatMap(({ name, stream }) =>
    stream.vapourFraction >= 1
      ? []
      : [
          {
            code: 'liquid-in-reactor',
            message: `${(100 * (1 - stream.vapourFraction)).toFixed(1)} % of the ${name} is liquid, while the equilibrium is taken as if all of it were gas; raise the temperature or lower the pressure`,
          },
        ],
  );
}
