import { createJacobian, type Jacobian } from './jacobian.ts';
import type { FixedPointMethod, Note } from './method.ts';
import type { Derivatives } from './problem.ts';
import { largestShare, takenBack } from './vectors.ts';

/** Length of a probe relative to the size of its variable: passes are good to some 1e-12. */
const PROBE = 1e-6;
/**
 * Without derivatives from the map, a guess this far from its answer (an empty recycle: 1) is first led by direct steps, so
 * many at most.
 */
const FAR = 0.5;
const DIRECT_STEPS = 3;
/** Guess and answer this near to one another are equal. */
const SETTLED = 1e-13;
/** With derivatives brought up to date by steps, what a step may leave over beside it before they are taken afresh. */
const CHORD = 1.5;
/** Where derivatives cost no more than a pass, they are brought up to date by a step only this near to the answer. */
const FINE = 1e-7;
/** A correction that takes this share of the step back again shows derivatives of the other side of a kink. */
const OVERSHOT = 0.8;
/** Share of a step at which the derivatives are to blame rather than its length. */
const SHORTEST = 0.02;
/** A step lets no variable grow by more than so many times its size, with derivatives by differences and by the map. */
const GROW = 2;
const GROW_GIVEN = 9;
/** The least of the shares that follow from how badly the last step was foreseen. */
const LEAST_SHARE = 0.1;
/** A step that takes this share of the way before it back again turns; so many times it may. */
const TURNED_BACK = 0.5;
const FREE_TURNS = 1;
/** Derivatives singular so many times: another method is better. */
const SINGULAR_TIMES = 3;

/**
 * Newton's method on f(x) = G(x) − x. The derivatives are those that the map carries through its passes, or finite
 * differences at one pass per variable; then steps with Broyden's update of the derivatives until they stop paying, and
 * derivatives afresh. A step is judged by the correction it leaves over under the derivatives it was made
 * with (natural monotonicity), not by the residual: behind a small purge a small residual says little.
 *
 * By differences, a variable that is settled (guess = answer, and no probe of another has moved its answer) needs no
 * probe: its correction is zero whatever its column. Pressure is such a one, and often temperature.
 *
 * @source P. Deuflhard, Newton Methods for Nonlinear Problems, Springer 2004, chapters 2 and 3; the update:
 * C. G. Broyden, Math. Comput. 19 (1965) 577-593
 */
export function createNewton(): FixedPointMethod {
  let n = 0;
  let derivatives: Derivatives | null = null;
  let jacobian: Jacobian = createJacobian(0);
  /** the point a probe or step starts from */
  let xBase = new Float64Array(0);
  let gBase = new Float64Array(0);
  /** the whole step from the base; what is left over where it led */
  let step = new Float64Array(0);
  let left = new Float64Array(0);
  /** the way from the last base to this one */
  let came = new Float64Array(0);
  /** steps that took the last one back */
  let turns = 0;
  /** times that the derivatives were singular */
  let singular = 0;
  let settled = new Uint8Array(0);
  let order: number[] = [];
  let base: { readonly x: Float64Array; readonly g: Float64Array } = { x: xBase, g: gBase };
  let directSteps = 0;
  let probe = 0;
  let phase: 'begin' | 'kept' | 'revisit' | 'probe' | 'step' = 'begin';
  /** `left` is that of the point handed in last: 1 yes, 0 not yet looked at, −1 the derivatives are singular */
  let leftKnown = 0;
  /** the derivatives are of the base itself, not brought up to date from elsewhere */
  let fresh = false;
  let taken = 1;
  /** what the derivatives are has been said in the trace */
  let said = false;
  let note: Note = '';

  /** Take the derivatives at the point handed in, and the step or the first probe into xNext. */
  function takeDerivatives(
    x: Float64Array,
    g: Float64Array,
    scale: Float64Array,
    xNext: Float64Array,
    most = 1,
  ): void {
    rebase(x, g);
    if (jacobian.read(derivatives, scale)) {
      if (!said) note = aboutDerivatives();
      fresh = true;
      stepFromBase(scale, xNext, most);
      return;
    }
    jacobian.begin(scale);
    order.sort((a, b) => Math.abs(g[b] - x[b]) / scale[b] - Math.abs(g[a] - x[a]) / scale[a] || a - b);
    for (let i = 0; i < n; i++) {
      settled[i] = Math.abs(g[i] - x[i]) <= SETTLED * scale[i] ? 1 : 0;
    }
    probe = -1;
    phase = 'probe';
    nextProbe(scale, xNext);
  }

  /** Make a point the base, and remember the way that led to it. */
  function rebase(x: Float64Array, g: Float64Array): void {
    if (x !== xBase) for (let i = 0; i < n; i++) came[i] = x[i] - xBase[i];
    xBase.set(x);
    gBase.set(g);
  }

  /** For the trace: what direct substitution would be up against. */
  function aboutDerivatives(): Note {
    said = true;
    const radius = jacobian.radius();
    const how = derivatives?.propagated
      ? 'carried through the pass'
      : 'carried through the pass, some by differences';
    return () => {
      const found = radius();
      return Number.isNaN(found)
        ? `derivatives ${how}`
        : `derivatives ${how}; spectral radius ${found.toFixed(4)}`;
    };
  }

  /** The same at the base, which is not the point handed in: a map gives derivatives of its last pass only. */
  function takeThemAtBase(scale: Float64Array, xNext: Float64Array): void {
    if (derivatives === null) takeDerivatives(xBase, gBase, scale, xNext);
    else {
      xNext.set(xBase);
      phase = 'revisit';
    }
  }

  /** The next probe, or the step when there are no more. */
  function nextProbe(scale: Float64Array, xNext: Float64Array): void {
    do probe++;
    while (probe < n && settled[order[probe]] === 1);
    if (probe < n) {
      const j = order[probe];
      xNext.set(xBase);
      // toward the answer, where the block is more likely to work
      xNext[j] += (gBase[j] < xBase[j] ? -PROBE : PROBE) * jacobian.size[j];
      return;
    }
    fresh = true;
    stepFromBase(scale, xNext, 1);
  }

  function readProbe(x: Float64Array, g: Float64Array): void {
    const j = order[probe];
    const h = (x[j] - xBase[j]) / jacobian.size[j];
    if (h === 0) return;
    for (let i = 0; i < n; i++) {
      if (Math.abs(g[i] - gBase[i]) > SETTLED * jacobian.size[i]) settled[i] = 0;
    }
    jacobian.setColumn(j, h, gBase, g);
  }

  /** `left` at the point handed in; false when the derivatives are singular. */
  function knowLeft(x: Float64Array, g: Float64Array): boolean {
    if (leftKnown === 0) leftKnown = jacobian.correction(x, g, left) ? 1 : -1;
    return leftKnown === 1;
  }

  /** Solve for the step and go along it by the share given at most; a direct step when it cannot be solved for. */
  function stepFromBase(scale: Float64Array, xNext: Float64Array, most: number): void {
    if (!jacobian.correction(xBase, gBase, step)) {
      note = 'the derivatives are singular: the direct step';
      singular++;
      phase = 'begin';
      xNext.set(gBase);
      return;
    }
    phase = 'step';
    let share = most;
    // Two sides of a kink may send each other back and forth: then half the last way at most.
    const back = takenBack(step, came, scale);
    if (back > TURNED_BACK && ++turns > FREE_TURNS) share = Math.min(share, 0.5 / back);
    for (let i = 0; i < n; i++) {
      // What falls is held at the bounds by itself: a flow of no consequence must not hold back the others.
      const rise = (derivatives === null ? GROW : GROW_GIVEN) * Math.max(Math.abs(xBase[i]), scale[i]);
      if (step[i] > rise) share = Math.min(share, rise / step[i]);
    }
    go(xNext, share);
  }

  function go(xNext: Float64Array, share: number): void {
    taken = share;
    for (let i = 0; i < n; i++) xNext[i] = xBase[i] + share * step[i];
  }

  /**
   * Is the point handed in nearer to the answer by its own derivatives than the base was? Then it is the base, and they are
   * kept; else nothing is changed. Across a kink (a condenser that has begun to condense) the old ones tell nothing.
   */
  function otherSide(x: Float64Array, g: Float64Array, scale: Float64Array, before: number): boolean {
    jacobian.keep();
    if (!jacobian.read(derivatives, scale)) return false;
    const now = jacobian.correction(x, g, left) ? largestShare(left, scale) : Infinity;
    if (now < before) {
      rebase(x, g);
      return true;
    }
    jacobian.restore();
    return false;
  }

  /** Judge the step that led to x and make the next one. */
  function judge(x: Float64Array, g: Float64Array, scale: Float64Array, xNext: Float64Array): void {
    if (!knowLeft(x, g)) {
      takeDerivatives(x, g, scale, xNext);
      return;
    }
    const before = largestShare(step, scale);
    const after = largestShare(left, scale);
    let unforeseen = 0;
    for (let i = 0; i < n; i++) {
      unforeseen = Math.max(unforeseen, Math.abs(left[i] - (1 - taken) * step[i]) / scale[i]);
    }
    const propagated = derivatives?.propagated === true;
    // what the linear model does not foresee grows with the square of the share
    const bearable = (0.5 * before * taken * taken) / unforeseen;
    const share = unforeseen > 0 ? Math.min(Math.max(bearable, LEAST_SHARE), 1) : 1;
    if (!fresh && !(after <= CHORD * before)) {
      note = 'a step without gain: derivatives afresh';
      takeThemAtBase(scale, xNext);
    } else if (fresh && !(after <= (1 - taken / 4) * before) && otherSide(x, g, scale, before)) {
      note = 'a step without gain, but nearer by the derivatives at its end';
      stepFromBase(scale, xNext, 1);
    } else if (fresh && !(after <= (1 - taken / 4) * before) && Math.min(bearable, taken / 2) > SHORTEST) {
      note = 'a step without gain: a shorter one';
      go(xNext, Math.min(bearable, taken / 2));
    } else if (takenBack(left, step, scale) > OVERSHOT * taken) {
      note = 'the step went too far: derivatives afresh';
      takeDerivatives(x, g, scale, xNext);
    } else if (propagated && after > FINE) {
      takeDerivatives(x, g, scale, xNext, share);
    } else if (!fresh && after - (1 - taken) * before > before) {
      note = 'slow progress: derivatives afresh';
      takeDerivatives(x, g, scale, xNext);
    } else {
      jacobian.update(xBase, gBase, x, g);
      rebase(x, g);
      fresh = false;
      stepFromBase(scale, xNext, share);
    }
  }

  return {
    name: () => 'newton',
    base: () => (phase === 'begin' ? null : base),
    reset(variables, ofMap = null) {
      if (variables !== n) makeRoom(variables);
      derivatives = ofMap;
      said = false;
      singular = 0;
      directSteps = 0;
      turns = 0;
      came.fill(0);
      leftKnown = 0;
      phase = 'begin';
      note = '';
    },
    isStuck: () => singular >= SINGULAR_TIMES,
    resume() {
      if (phase !== 'step') return false;
      phase = 'kept';
      turns = 0;
      came.fill(0);
      leftKnown = 0;
      note = '';
      return true;
    },
    distance(x, g, scale) {
      leftKnown = 0;
      if (phase !== 'step' && phase !== 'kept') return NaN;
      if (!knowLeft(x, g)) return Infinity;
      return largestShare(left, scale);
    },
    next(x, g, scale, xNext) {
      note = '';
      if (phase === 'begin') {
        if (derivatives === null && directSteps < DIRECT_STEPS && isFar(x, g, scale)) {
          directSteps++;
          note = 'far off: a direct step first';
          xNext.set(g);
        } else {
          xBase.set(x);
          takeDerivatives(x, g, scale, xNext);
        }
      } else if (phase === 'revisit') takeDerivatives(x, g, scale, xNext);
      else if (phase === 'kept') {
        xBase.set(x);
        gBase.set(g);
        fresh = false;
        stepFromBase(scale, xNext, 1);
      } else if (phase === 'step') judge(x, g, scale, xNext);
      else {
        readProbe(x, g);
        nextProbe(scale, xNext);
      }
      leftKnown = 0;
    },
    note: () => (note === '' && phase === 'probe' ? `probe ${probe + 1} for the derivatives` : note),
  };

  function makeRoom(variables: number): void {
    n = variables;
    xBase = new Float64Array(n);
    gBase = new Float64Array(n);
    base = { x: xBase, g: gBase };
    step = new Float64Array(n);
    left = new Float64Array(n);
    came = new Float64Array(n);
    settled = new Uint8Array(n);
    order = Array.from({ length: n }, (_, i) => i);
    jacobian = createJacobian(n);
  }
}

function isFar(x: Float64Array, g: Float64Array, scale: Float64Array): boolean {
  for (let i = 0; i < x.length; i++) if (Math.abs(g[i] - x[i]) > FAR * scale[i]) return true;
  return false;
}
