import type { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { MethodName } from '../model/flowsheet.ts';
import { completeSafely, evaluateSafely } from './attempt.ts';
import { keepWithinBounds } from './bounds.ts';
import { createErrorEstimate } from './error-estimate.ts';
import { createJacobian } from './jacobian.ts';
import { type Note, wordsOf } from './method.ts';
import { methods } from './methods.ts';
import type { FixedPointProblem } from './problem.ts';
import { largestShare } from './vectors.ts';

export type { FixedPointProblem } from './problem.ts';

export interface ClosureOptions {
  /** largest scaled error of a closed loop [-]; 1e-9 when left out */
  readonly tolerance?: number;
  /** evaluations allowed; 200 when left out */
  readonly maxPasses?: number;
  /** the start is the answer of a neighbouring map: keep what the method has learnt of that */
  readonly warm?: boolean;
  /** Asked before every pass: true ends it as if no more passes were allowed. */
  readonly isEnough?: () => boolean;
  /** Called after every pass, for a live trace. */
  readonly onPass?: (pass: PassRecord) => void;
}

/** What happened in one pass. */
export interface PassRecord {
  readonly pass: number;
  /** largest |g − x| / scale; NaN when the pass failed */
  readonly residual: number;
  /** index of the variable with that residual, −1 when the pass failed */
  readonly worst: number;
  /** estimate of the scaled distance from the fixed point; NaN when the pass failed */
  readonly error: number;
  /** guess and answer of that variable; NaN when the pass failed */
  readonly guess: number;
  readonly answer: number;
  /** what problem.extraError said, 0 without one, NaN when the pass failed */
  readonly extraError: number;
  /** what made the guess of this pass: start, a method's name, or shortened */
  readonly method: string;
  /** what was done and why, empty when nothing is worth saying */
  readonly note: string;
}

export interface Closure {
  readonly converged: boolean;
  /** why it stopped */
  readonly reason: 'closed' | 'max-passes' | 'not-finite' | 'trouble' | 'stalled' | 'undetermined';
  /** index of the variable that nothing holds, where that is why it stopped; −1 otherwise */
  readonly loose: number;
  readonly method: MethodName;
  /** evaluations made, failed ones included */
  readonly passes: number;
  /** scaled residual of the last good pass; NaN when there was none */
  readonly residual: number;
  /** estimate of the scaled distance from the fixed point after the last good pass; NaN when not known */
  readonly error: number;
  readonly history: readonly PassRecord[];
  /** the last trouble of a block, when that is why it stopped */
  readonly trouble: PassTrouble | null;
  /** guess and answer of the last good pass (of the start when there was none) */
  readonly x: Float64Array;
  readonly g: Float64Array;
}

/**
 * Passes without a better answer after which going on is pointless, and how many more for each variable: every method
 * of `auto` has had its turn by then, and Newton spends a pass on each variable before it makes a step.
 */
const STALL_PASSES = 60;
const STALL_PASSES_EACH = 7;
/** What an answer must be better by to count; slow direct substitution (0.01 % purge) gains 1e-4 a pass. */
const STALL_SHARE = 1 - 1e-6;
/** Halvings of a step that makes a block fail, before the direct step is tried. */
const HALVINGS = 5;

/**
 * Close a recycle: find x = G(x).
 *
 * Closed means all of: the scaled residual |g − x|, the estimate of the distance from the answer, and
 * problem.extraError are within the tolerance. The distance matters: behind a purge of 0.1 % the residual is
 * a thousandth of it. Guesses keep inside the bounds; a guess at which a block fails is drawn back toward the
 * last good one by halves, then replaced by the direct step.
 *
 * @param start  first guess, length problem.size; not changed
 */
export function closeFixedPoint(
  problem: FixedPointProblem,
  start: Float64Array,
  options: ClosureOptions & { readonly method: MethodName },
): Closure {
  return createCloser(problem, options.method).close(start, options);
}

/** Closes one problem again and again, with room made once. */
export interface Closer {
  readonly method: MethodName;
  /** @param start  first guess, length problem.size; not changed */
  close(start: Float64Array, options: ClosureOptions): Closure;
}

/** The same for many closures of one problem, as its settings move. */
export function createCloser(problem: FixedPointProblem, name: MethodName): Closer {
  const n = problem.size;
  const method = methods[name]();
  const distance = createErrorEstimate(n);
  const x = new Float64Array(n);
  const g = new Float64Array(n);
  const xGood = new Float64Array(n);
  const gGood = new Float64Array(n);
  const xNext = new Float64Array(n);
  const scale = new Float64Array(n);
  const jacobian = createJacobian(n);
  const left = new Float64Array(n);
  return { method: name, close };

  /** Distance from the fixed point by the map's derivatives at its last guess; 0 where it has none, Infinity where they are singular. */
  function verified(x: Float64Array, g: Float64Array): number {
    if (!jacobian.read(problem.derivatives ?? null, scale)) return 0;
    if (!jacobian.correction(x, g, left)) return Infinity;
    return largestShare(left, scale);
  }

  function close(start: Float64Array, options: ClosureOptions): Closure {
    const tolerance = options.tolerance ?? 1e-9;
    const maxPasses = options.maxPasses ?? 200;
    if (!(options.warm && method.resume?.())) method.reset(n, problem.derivatives ?? null);
    distance.clear();
    const history: PassRecord[] = [];
    for (const vector of [x, g, xGood, gGood]) vector.set(start);
    let madeBy = 'start';
    let note: Note = '';
    let hasGood = false;
    let halvings = 0;
    let residual = NaN;
    let error = NaN;
    let best = Infinity;
    let sinceBest = 0;

    keepWithinBounds(problem, x, x, x);

    const stop = (reason: Closure['reason'], trouble: PassTrouble | null = null): Closure => {
      const loose = reason === 'undetermined' ? jacobian.loosest() : -1;
      // What has not closed is shown as it stands, so it is to be whole; what is in trouble stands where it failed.
      if (reason !== 'closed' && reason !== 'trouble' && reason !== 'not-finite')
        completeSafely(problem, xGood, gGood);
      return {
        converged: reason === 'closed',
        reason,
        method: name,
        passes: history.length,
        residual,
        error,
        history,
        trouble,
        loose,
        x: xGood.slice(),
        g: gGood.slice(),
      };
    };

    const log = (entry: LoggedPass): void => {
      history.push(entry);
      options.onPass?.(entry);
    };
    const logFailed = (says: string): void =>
      log(new LoggedPass(history.length + 1, madeBy, joined(note, says), NaN, -1, NaN, NaN, NaN, NaN));

    while (history.length < maxPasses && !options.isEnough?.()) {
      const failure = evaluateSafely(problem, x, g);

      if (failure !== null) {
        logFailed(failure.says);
        if (!hasGood || halvings > HALVINGS) return stop(failure.reason, failure.trouble);
        halvings++;
        if (halvings <= HALVINGS) {
          for (let i = 0; i < n; i++) x[i] = xGood[i] + (x[i] - xGood[i]) / 2;
          madeBy = 'shortened';
          note = 'half the step';
        } else {
          x.set(gGood);
          keepWithinBounds(problem, xGood, gGood, x);
          madeBy = 'direct';
          note = `${HALVINGS} halvings did not help: the direct step`;
        }
        continue;
      }

      hasGood = true;
      halvings = 0;
      xGood.set(x);
      gGood.set(g);
      scaleOf(problem, x, g, scale);
      const worst = worstVariable(x, g, scale);
      residual = n === 0 ? 0 : Math.abs(g[worst] - x[worst]) / scale[worst];
      let extraError = problem.extraError?.() ?? 0;
      const known = method.distance?.(x, g, scale) ?? NaN;
      error = distance.next(x, g, scale, residual, known);
      if (residual <= tolerance && error <= tolerance && extraError <= tolerance && problem.complete) {
        const failure = completeSafely(problem, x, g);
        if (failure !== null) {
          logFailed(failure.says);
          return stop(failure.reason, failure.trouble);
        }
        xGood.set(x);
        gGood.set(g);
        extraError = problem.extraError?.() ?? 0;
      }
      const pass = history.length + 1;
      log(new LoggedPass(pass, madeBy, note, residual, worst, error, x[worst], g[worst], extraError));

      if (residual <= tolerance && error <= tolerance && extraError <= tolerance) {
        // An estimate from the last passes may swing; what the map itself knows has the last word.
        if (Number.isNaN(known)) error = Math.max(error, verified(x, g));
        if (error <= tolerance) return stop('closed');
        if (error === Infinity) return stop('undetermined');
      }
      const merit = Math.max(residual, extraError);
      if (merit < STALL_SHARE * best) {
        best = merit;
        sinceBest = 0;
      } else if (++sinceBest >= STALL_PASSES + STALL_PASSES_EACH * n) return stop('stalled');

      method.next(x, g, scale, xNext);
      madeBy = method.name();
      note = method.note();
      if (!allFinite(xNext)) {
        xNext.set(g);
        note = joined(note, 'the step was not a finite number: the direct step');
      }
      const from = method.base?.() ?? { x, g };
      const held = keepWithinBounds(problem, from.x, from.g, xNext);
      if (held > 0) note = joined(note, `${held} held at the bounds of a step`);
      x.set(xNext);
    }
    return stop('max-passes');
  }
}

function scaleOf(problem: FixedPointProblem, x: Float64Array, g: Float64Array, scale: Float64Array): void {
  if (problem.scale) problem.scale(x, g, scale);
  else for (let i = 0; i < g.length; i++) scale[i] = Math.max(1, Math.abs(g[i]));
}

function worstVariable(x: Float64Array, g: Float64Array, scale: Float64Array): number {
  let worst = 0;
  let most = -1;
  for (let i = 0; i < x.length; i++) {
    const share = Math.abs(g[i] - x[i]) / scale[i];
    if (share > most) {
      most = share;
      worst = i;
    }
  }
  return worst;
}

function allFinite(x: Float64Array): boolean {
  for (let i = 0; i < x.length; i++) if (!Number.isFinite(x[i])) return false;
  return true;
}

function joined(first: Note, second: string): string {
  const words = wordsOf(first);
  return words === '' ? second : `${words}; ${second}`;
}

class LoggedPass implements PassRecord {
  readonly pass: number;
  readonly residual: number;
  readonly worst: number;
  readonly error: number;
  readonly guess: number;
  readonly answer: number;
  readonly extraError: number;
  readonly method: string;
  #note: Note;

  constructor(
    pass: number,
    method: string,
    note: Note,
    residual: number,
    worst: number,
    error: number,
    guess: number,
    answer: number,
    extraError: number,
  ) {
    this.pass = pass;
    this.residual = residual;
    this.worst = worst;
    this.error = error;
    this.guess = guess;
    this.answer = answer;
    this.extraError = extraError;
    this.method = method;
    this.#note = note;
  }

  get note(): string {
    this.#note = wordsOf(this.#note);
    return this.#note;
  }
}
