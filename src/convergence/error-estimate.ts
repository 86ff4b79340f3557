import { createSecants } from './secants.ts';

/** Passes remembered: enough for the slow modes of a loop. */
const MEMORY = 8;
const INDEPENDENCE = 1e-4;
/** Without a second point nothing is known of the map: a residual r may hide an error of r / 1e-6. */
const SLOWEST = 1e-6;
/** A step of some size (scaled) that the residual does not answer to by this share: nothing holds that direction. */
const STEP_OF_SOME_SIZE = 1e-9;
const NO_ANSWER = 1e-8;

/** Estimate of how far a guess is from the fixed point, whatever method made the guesses. */
export interface ErrorEstimate {
  /**
   * Take in a point and estimate its largest scaled distance from the fixed point [-]; never below the residual.
   *
   * @param residual  largest |g − x| / scale
   * @param known  the distance where the method knows it from derivatives, NaN where it does not
   */
  next(x: Float64Array, g: Float64Array, scale: Float64Array, residual: number, known: number): number;
  /** Forget all points. */
  clear(): void;
}

/**
 * The distance residual/(1 − λ), with the slow modes λ taken from the differences between the last passes
 * (multi-secant model of G): |x* − x| where x* is the fixed point of the model. Where the last step of some size
 * changed the residual hardly at all, something piles up without end: a residual that is small only beside a huge guess
 * does not count as near. An estimate, not a bound: directions that no pass has gone yet are taken at λ = 0.
 */
export function createErrorEstimate(n: number): ErrorEstimate {
  const secants = createSecants(n, MEMORY, INDEPENDENCE);
  const mixing = new Float64Array(n).fill(1);
  const xStar = new Float64Array(n);
  const xLast = new Float64Array(n);
  const fLast = new Float64Array(n);

  let unanswered = 0;

  /** Step over answer when the last step of some size went unanswered, 0 otherwise. */
  function lookForAnswer(x: Float64Array, g: Float64Array, scale: Float64Array): void {
    let step = 0;
    let answer = 0;
    for (let i = 0; i < n; i++) {
      step = Math.max(step, Math.abs(x[i] - xLast[i]) / scale[i]);
      answer = Math.max(answer, Math.abs(g[i] - x[i] - fLast[i]) / scale[i]);
    }
    if (step > STEP_OF_SOME_SIZE) unanswered = answer < NO_ANSWER * step ? step / answer : 0;
  }

  return {
    clear() {
      secants.clear();
      unanswered = 0;
    },
    next(x, g, scale, residual, known) {
      secants.record(x, g);
      let most = residual;
      if (!Number.isNaN(known)) {
        most = Math.max(residual, known);
        if (secants.held() > 0) lookForAnswer(x, g, scale);
      } else if (secants.held() === 0) most = residual / SLOWEST;
      else {
        secants.step(x, g, scale, mixing, xStar);
        for (let i = 0; i < n; i++) most = Math.max(most, Math.abs(xStar[i] - x[i]) / scale[i]);
        lookForAnswer(x, g, scale);
        if (residual > 0) most = Math.max(most, residual * unanswered);
      }
      for (let i = 0; i < n; i++) {
        xLast[i] = x[i];
        fLast[i] = g[i] - x[i];
      }
      return most;
    },
  };
}
