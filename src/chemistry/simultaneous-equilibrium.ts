import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { GasActivity } from './gas-activity.ts';
import { solveLinear } from './linear-solve.ts';
import { createReactionBasis } from './reaction-basis.ts';
import type { SingleEquilibrium } from './single-equilibrium.ts';

/** Equilibrium of several reactions at once. */
export interface SimultaneousEquilibrium {
  readonly steps: number;
  /** the answer of the last solve may serve as the start of the next */
  warm: boolean;
  /**
   * @param rows independent reaction rows, `count` of `width`, every gas species in them able to be present
   * @param lnK per original reaction, standard pressure folded in
   * @param feed amounts the balances refer to
   * @param start interior point: all gas species of the rows present; used when there is no warm start
   * @param amounts written
   * @param extents per original reaction, written
   * @throws PassTrouble `equilibrium`
   */
  solve(
    rows: Float64Array,
    count: number,
    lnK: Float64Array,
    T: number,
    P: number,
    feed: Float64Array,
    start: Float64Array,
    amounts: Float64Array,
    extents: Float64Array,
  ): void;
}

const maxSteps = 300;
const tolerance = 1e-12;
/** affinity below which the rounding of a large amount could outweigh what a small one has to say */
const blurred = 1e-9;
/** share of the feed below which an amount is beyond the reach of double precision and no longer followed */
const vanished = 1e-280;

/**
 * Minimises Σ n (ln(y φ) + ...) − Σ ξ ln K, convex in the extents at fixed φ, by Newton steps.
 *
 * Basis: the rows are recombined so that each has one own species, the smallest in it, and the variables are
 * the logarithms of these; the other species follow from the balances. A trace therefore keeps its relative
 * accuracy, and finds its size in one step however far off the guess is. The rows are recombined when
 * another species has become the smallest.
 *
 * A step is accepted when the affinities still point along it at its end (for a convex function that proves
 * a decrease, free of the rounding that blurs the function itself). Where Newton does not move, the rows are
 * brought to equilibrium one by one. Near the answer the effect of the composition on ln φ enters the
 * Jacobian as a Broyden secant.
 *
 * @source W. R. Smith, R. W. Missen, Chemical Reaction Equilibrium Analysis, Wiley 1982 (optimised basis);
 *   C. G. Broyden, Math. Comp. 19, 577–593 (1965)
 */
export function createSimultaneousEquilibrium(
  size: number,
  reactions: number,
  activity: GasActivity,
  single: SingleEquilibrium,
): SimultaneousEquilibrium {
  const { inGas } = activity;
  const width = size + reactions;
  const basis = createReactionBasis(size, reactions, inGas);
  const { rows: nu, own: pivots, moleChange: change, rest } = basis;
  const lnKs = new Float64Array(reactions);
  const n = new Float64Array(size);
  const trial = new Float64Array(size);
  const lnPhi = new Float64Array(size);
  const affinity = new Float64Array(reactions);
  const step = new Float64Array(reactions);
  const moved = new Float64Array(reactions);
  const phiSum = new Float64Array(reactions);
  const phiBefore = new Float64Array(reactions);
  const secant = new Float64Array(reactions * reactions); // d(Σ ν ln φ)/d(extent/total)
  const matrix = new Float64Array(reactions * (reactions + 1));
  let m = 0;
  let scale = 1;
  const state = { steps: 0, warm: false, solve };

  function solve(
    rows: Float64Array,
    count: number,
    lnK: Float64Array,
    T: number,
    P: number,
    feed: Float64Array,
    start: Float64Array,
    amounts: Float64Array,
    extents: Float64Array,
  ): void {
    m = count;
    basis.count = count;
    const total = activity.total(feed);
    state.steps = 0;
    if (!(state.warm && basis.resume(n, total / scale, feed, total))) {
      scale = total;
      n.set(start);
      basis.choose(rows, n);
      for (let sweep = 0; sweep < 3; sweep++) {
        sweepRows(lnK, T, P);
        basis.choose(nu, n);
      }
      secant.fill(0);
    }
    state.warm = false;
    scale = total;
    foldLnK(lnK);
    let haveBefore = false;
    let before = Number.POSITIVE_INFINITY;
    for (;;) {
      if (basis.isStale(n)) {
        basis.choose(nu, n);
        foldLnK(lnK);
        secant.fill(0);
        haveBefore = false;
      }
      const worst = affinities(T, P);
      if (activity.real && haveBefore) updateSecant();
      phiBefore.set(phiSum);
      haveBefore = true;
      if (worst <= 1) break;
      state.steps++;
      if (state.steps > maxSteps) throw didNotSettle(T, P);
      const size0 = largest(affinity);
      const near = size0 < 0.3;
      // a secant that made things worse is forgotten
      if (near && size0 > before) secant.fill(0);
      before = near ? size0 : Number.POSITIVE_INFINITY;
      if (!newtonStep(near && activity.real) || !walk(near)) {
        sweepRows(lnK, T, P);
        basis.choose(nu, n);
        foldLnK(lnK);
        haveBefore = false;
        secant.fill(0);
      }
    }
    amounts.set(n);
    extents.fill(0);
    for (let r = 0; r < m; r++) {
      const extent = n[pivots[r]] - feed[pivots[r]];
      for (let k = 0; k < reactions; k++) {
        extents[k] = extents[k] + extent * nu[r * width + size + k];
      }
    }
    state.warm = true;
  }

  function foldLnK(lnK: Float64Array): void {
    for (let r = 0; r < m; r++) {
      lnKs[r] = 0;
      for (let k = 0; k < reactions; k++) lnKs[r] = lnKs[r] + nu[r * width + size + k] * lnK[k];
    }
  }

  /** Affinities at n; returns the worst as a multiple of what is allowed (tolerance and rounding). */
  function affinities(T: number, P: number): number {
    const total = activity.total(n);
    activity.lnPhi(T, P, n, total, lnPhi);
    let worst = 0;
    for (let r = 0; r < m; r++) {
      let sum = -lnKs[r] - change[r] * Math.log(total);
      let phi = 0;
      let blur = 0;
      for (let i = 0; i < size; i++) {
        const v = nu[r * width + i];
        if (v === 0 || inGas[i] === 0) continue;
        const part = Math.log(n[i]);
        sum += v * part;
        phi += v * lnPhi[i];
        blur += Math.abs(v) * ((i === pivots[r] ? 0 : Math.abs(rest[i]) / n[i]) + Math.abs(part));
      }
      affinity[r] = sum + phi;
      phiSum[r] = phi;
      if (sum + phi > 0 && n[pivots[r]] <= vanished * scale) affinity[r] = 0;
      worst = Math.max(worst, Math.abs(affinity[r]) / (tolerance + 2e-15 * blur));
    }
    return worst;
  }

  function largest(x: Float64Array): number {
    let most = 0;
    for (let r = 0; r < m; r++) most = Math.max(most, Math.abs(x[r]));
    return most;
  }

  /**
   * Newton step of the logarithms, d ln(own amount), into `step`; with D = diag(sqrt(own amount)) the matrix
   * D H D is near the unit matrix however small the amounts are. False when it cannot be solved.
   */
  function newtonStep(withSecant: boolean): boolean {
    const total = activity.total(n);
    const w = m + 1;
    for (let r = 0; r < m; r++) {
      const rootR = Math.sqrt(n[pivots[r]]);
      for (let q = 0; q < m; q++) {
        const rootQ = Math.sqrt(n[pivots[q]]);
        let sum = r === q ? 1 : 0;
        for (let i = 0; i < size; i++) {
          const a = nu[r * width + i];
          const b = nu[q * width + i];
          if (a === 0 || b === 0 || inGas[i] === 0 || pivots[r] === i) continue;
          sum += ((a * rootR) / n[i]) * (b * rootQ);
        }
        sum -= ((change[r] * rootR) / total) * (change[q] * rootQ);
        if (withSecant) sum += (secant[r * reactions + q] / total) * rootR * rootQ;
        matrix[r * w + q] = sum;
      }
      matrix[r * w + m] = -affinity[r] * rootR;
    }
    if (!solveLinear(matrix, m)) return false;
    for (let r = 0; r < m; r++) {
      const move = matrix[r * w + m] / Math.sqrt(n[pivots[r]]);
      if (!Number.isFinite(move)) return false;
      step[r] = Math.max(-60, Math.min(60, move));
    }
    return true;
  }

  /** Go along `step` as far as it helps; false when not even a hundredth of it does. */
  function walk(near: boolean): boolean {
    for (let part = 1; part > 0.01; part *= 0.5) {
      trial.set(n);
      let along = 0;
      for (let r = 0; r < m; r++) {
        const own = n[pivots[r]];
        const next = Math.max(own * Math.exp(part * step[r]), 0.1 * vanished * scale);
        trial[pivots[r]] = next;
        moved[r] = own * Math.expm1(part * step[r]);
        if (Math.abs(affinity[r]) > blurred) along += affinity[r] * moved[r];
      }
      if (!basis.fill(trial)) continue;
      if (!keepsPrimaries()) continue;
      if (!near) {
        if (!(along < 0)) return false;
        if (!pointsAlong(along)) continue;
      }
      n.set(trial);
      return true;
    }
    return false;
  }

  /** No species but the variables shrinks by more than a factor of 50 in one step. */
  function keepsPrimaries(): boolean {
    for (let i = 0; i < size; i++) {
      if (inGas[i] === 0 || trial[i] >= 0.02 * n[i]) continue;
      let own = false;
      for (let r = 0; r < m; r++) if (pivots[r] === i) own = true;
      if (!own) return false;
    }
    return true;
  }

  /** At frozen ln φ: the affinities at the end of the step do not turn against it by more than 0.3. */
  function pointsAlong(along: number): boolean {
    const total = activity.total(trial);
    let end = 0;
    for (let r = 0; r < m; r++) {
      let sum = -lnKs[r] - change[r] * Math.log(total) + phiSum[r];
      for (let i = 0; i < size; i++) {
        const v = nu[r * width + i];
        if (v !== 0 && inGas[i] === 1) sum += v * Math.log(trial[i]);
      }
      if (Math.abs(sum) > blurred) end += sum * moved[r];
    }
    return end <= -0.3 * along;
  }

  /** Broyden: the secant matrix learns what the last step did to Σ ν ln φ. */
  function updateSecant(): void {
    let square = 0;
    for (let q = 0; q < m; q++) square += (moved[q] / scale) ** 2;
    if (!(square > 1e-24)) return;
    for (let r = 0; r < m; r++) {
      let expected = 0;
      for (let q = 0; q < m; q++) expected += (secant[r * reactions + q] * moved[q]) / scale;
      const miss = phiSum[r] - phiBefore[r] - expected;
      for (let q = 0; q < m; q++) {
        secant[r * reactions + q] = secant[r * reactions + q] + (miss * moved[q]) / scale / square;
      }
    }
  }

  /** Each row to equilibrium in turn, ln φ held. */
  function sweepRows(lnK: Float64Array, T: number, P: number): void {
    foldLnK(lnK);
    activity.lnPhi(T, P, n, activity.total(n), lnPhi);
    for (let r = 0; r < m; r++) {
      single.solve(nu, r * width, lnKs[r], n, T, P, 0, lnPhi, 1e-3, trial);
      n.set(trial);
    }
  }

  return state;
}

function didNotSettle(T: number, P: number): PassTrouble {
  return new PassTrouble(
    'equilibrium',
    `The reaction equilibrium did not settle at ${T.toFixed(2)} K and ${(P / 1e5).toFixed(3)} bar.`,
    `after ${maxSteps} steps the reactions still pull against each other`,
    'check temperature and pressure, or leave out reactions that play no part here',
  );
}
