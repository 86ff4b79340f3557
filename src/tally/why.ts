import type { Place } from '../model/place.ts';
import type { Facts } from './why-facts.ts';
import { figure } from './why-format.ts';

/** What a recogniser has found; a part of a diagnostic. */
export interface Finding {
  readonly code: string;
  /** continues "The recycle through S8 did not close in 40 passes: " */
  readonly what: string;
  readonly why: string;
  readonly mend: string;
  /** true where `why` begins with what is found after direct passes from the feeds */
  readonly isOfDirectPasses?: boolean;
  /** left out: the torn stream */
  readonly where?: Place;
}

/** Looks at the facts of a loop that did not close; null where its own reason does not hold. */
export type Recogniser = (facts: Facts) => Finding | null;

/** The slowest mode in words, with the passes it takes by direct substitution; '' where it is not known. */
export function slowestModeText({ radius, options }: Facts): string {
  if (radius === null || radius === 0) return '';
  const missing = 1 - radius;
  if (Math.abs(missing) < 1e-9) return 'all of a deviation comes back in every pass (spectral radius 1)';
  if (radius > 1)
    return `a deviation grows by a factor of ${figure(radius)} in every pass (spectral radius ${figure(radius)})`;
  // A power of ten but for rounding must not have a digit more on one side of it.
  const decimals = missing < 0.1 ? Math.ceil(-Math.log10(missing) - 1e-6) + 2 : 3;
  return (
    `${figure(100 * missing)} % of a deviation goes out in a pass and the rest comes back (spectral radius ` +
    `${radius.toFixed(decimals)}): by direct substitution about ` +
    `${figure(Math.ceil(Math.log(options.tolerance) / Math.log(radius)))} passes`
  );
}

/** How the loop would close as it is, in words; '' where it does not. */
export function answerText({ answer, options }: Facts): string {
  if (answer === null) return '';
  const method = options.method === 'auto' ? '' : ' --method auto';
  const allowed = answer.passes > options.maxPasses ? ` --max-passes ${answer.passes}` : '';
  return `as it is, the loop closes in ${answer.passes} passes${method || allowed ? ` with${method}${allowed}` : ''} (tried)`;
}
