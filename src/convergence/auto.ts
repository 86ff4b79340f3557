import { ANDERSON_INDEPENDENCE, ANDERSON_MEMORY } from './anderson.ts';
import { createDirect } from './direct.ts';
import { type FixedPointMethod, type Note, wordsOf } from './method.ts';
import { createNewton } from './newton.ts';
import type { Derivatives } from './problem.ts';
import { createSecants, type Secants } from './secants.ts';
import { limitStep } from './step-limit.ts';
import { createWegstein } from './wegstein.ts';

/** Passes without progress after which the leads are dropped, and after which the method is changed. */
const LEAD_PATIENCE = 3;
const PATIENCE = 5;
/** A residual has to fall below this share of the best one, or of the last one, to count as progress. */
const BETTER = 0.9;
/** Slope from which on a component counts as piling up, and the one its lead is limited to (50 direct steps). */
const PILING_UP = 0.3;
const STEEPEST = 0.98;
/** No step lets a variable grow or fall by more than this factor. */
const FURTHEST = 10;
/** The same while variables are led: a lead reaches fifty direct steps. */
const LED_FURTHEST = 100;
/** A method changed to goes back to the best pass when the last one is this many times worse. */
const MUCH_WORSE = 10;

type Stage = 'anderson' | 'newton' | 'wegstein' | 'direct';
/** The order of the methods where derivatives have to be found by passes, and where the map has them to give. */
const BY_PASSES: readonly Stage[] = ['anderson', 'newton', 'anderson', 'newton', 'wegstein', 'direct'];
const DERIVED: readonly Stage[] = ['newton', 'anderson', 'newton', 'wegstein', 'direct'];

/**
 * Chooses and changes over. Where the map has derivatives to give, Newton begins: the trace tells the spectral radius that
 * direct substitution would be up against. Where it has none, one direct pass; then components that pile up from pass to
 * pass (inerts before a purge, and what is converted a little at a time) get a lead of 1/(1 − s), s their own slope;
 * Anderson does the rest, with steps shortened to a factor of ten. When there is no progress: first no more leads, then
 * the next method of the list, from the best pass on where the last one is far worse, and round again.
 *
 * Measured on 10,000 random ammonia loops (bench/random-loops.ts): all close, in 6.5 passes on average, 99 of 100
 * within 13. Without derivatives 99.8 % of them closed, in 16.4 passes on average. Tried and found wanting: going back
 * whenever a residual is 5 or 30 times the best (96.5 and 98 % closed). Behind a small purge the way leads over large
 * residuals of the fast modes.
 */
export function createAuto(): FixedPointMethod {
  const wegstein = createWegstein();
  const direct = createDirect();
  const newton = createNewton();
  /** made when they are first used: newton alone closes most maps that have derivatives */
  let secants: Secants | null = null;
  let mixing = new Float64Array(0);
  let xFirst = new Float64Array(0);
  let gFirst = new Float64Array(0);
  let xBest = new Float64Array(0);
  let gBest = new Float64Array(0);
  let stages = BY_PASSES;
  let derivatives: Derivatives | null = null;
  let stage = 0;
  let passes = 0;
  /** smallest residual of all, and of this stage; that of the last pass */
  let least = Infinity;
  let best = Infinity;
  let last = Infinity;
  let sinceProgress = 0;
  let leading = 0;
  let fromBest = false;
  let note: Note = '';

  function patience(n: number): number {
    if (leading > 0) return LEAD_PATIENCE;
    if (stages === DERIVED && stages[stage] === 'newton') return 2 * PATIENCE;
    // Newton spends n passes on its derivatives before it makes a step: three times of that
    return stages[stage] === 'newton' ? 3 * (n + 1) + 2 * PATIENCE : PATIENCE;
  }

  function begin(): void {
    stage = 0;
    passes = 0;
    least = Infinity;
    best = Infinity;
    last = Infinity;
    sinceProgress = 0;
    leading = 0;
    fromBest = false;
    note = '';
  }

  function changeOver(n: number, residual: number, why = `no progress in ${patience(n)} passes`): void {
    sinceProgress = 0;
    if (leading > 0) {
      leading = 0;
      mixing.fill(1);
      note = `${why}: no more leads`;
      return;
    }
    const from = stages[stage];
    stage = (stage + 1) % stages.length;
    secants?.clear();
    wegstein.reset(n);
    newton.reset(n, derivatives);
    best = Infinity;
    fromBest = residual > MUCH_WORSE * least;
    note = `${why}: from ${from} to ${stages[stage]}${fromBest ? ', from the best pass on' : ''}`;
  }

  return {
    name: () => (passes < 2 && stages === BY_PASSES ? 'direct' : stages[stage]),
    base() {
      const ofNewton = stages[stage] === 'newton' ? newton.base!() : null;
      return ofNewton ?? (fromBest ? { x: xBest, g: gBest } : null);
    },
    reset(n, ofMap = null) {
      derivatives = ofMap;
      stages = derivatives ? DERIVED : BY_PASSES;
      if (n === mixing.length) secants?.clear();
      else makeRoom(n);
      mixing.fill(1);
      wegstein.reset(n);
      newton.reset(n, derivatives);
      begin();
    },
    resume() {
      if (stages[stage] !== 'newton' || !newton.resume!()) return false;
      const kept = stage;
      begin();
      stage = kept;
      return true;
    },
    distance: (x, g, scale) => (stages[stage] === 'newton' ? newton.distance!(x, g, scale) : NaN),
    next(xSeen, gSeen, scale, xNext) {
      const n = xSeen.length;
      passes++;
      note = '';
      fromBest = false;
      const residual = scaledResidual(xSeen, gSeen, scale);
      if (residual <= least) {
        least = residual;
        xBest.set(xSeen);
        gBest.set(gSeen);
      }
      if (residual < BETTER * best) {
        best = residual;
        sinceProgress = 0;
      } else {
        if (leading > 0 || residual > BETTER * last) sinceProgress++;
        if (sinceProgress >= patience(n)) changeOver(n, residual);
      }
      if (derivatives !== null && stages[stage] === 'newton' && newton.isStuck!())
        changeOver(n, residual, 'singular derivatives');
      last = residual;
      if (passes === 1) {
        xFirst.set(xSeen);
        gFirst.set(gSeen);
      } else if (passes === 2 && stages[stage] === 'anderson') {
        leading = setLeads(xSeen, gSeen, xFirst, gFirst, mixing);
        if (leading > 0) note = `${leading} of ${n} variables pile up and are led ahead`;
      }
      const x = fromBest ? xBest : xSeen;
      const g = fromBest ? gBest : gSeen;
      if (stages[stage] === 'anderson') {
        secants ??= createSecants(n, ANDERSON_MEMORY, ANDERSON_INDEPENDENCE);
        secants.record(x, g);
        secants.step(x, g, scale, mixing, xNext);
        const share = limitStep(x, g, scale, xNext, leading > 0 ? LED_FURTHEST : FURTHEST);
        if (share < 1) tell(`step shortened to ${(100 * share).toPrecision(2)} %`);
      } else if (stages[stage] === 'newton') {
        newton.next(x, g, scale, xNext);
        tell(newton.note());
      } else (stages[stage] === 'wegstein' ? wegstein : direct).next(x, g, scale, xNext);
    },
    note: () => note,
  };

  function makeRoom(n: number): void {
    secants = null;
    mixing = new Float64Array(n);
    xFirst = new Float64Array(n);
    gFirst = new Float64Array(n);
    xBest = new Float64Array(n);
    gBest = new Float64Array(n);
  }

  function tell(remark: Note): void {
    if (note === '') note = remark;
    else if (remark !== '') note = `${wordsOf(note)}; ${wordsOf(remark)}`;
  }
}

/** Mixing 1/(1 − s) for variables that grew and still grow, 1 for the others; returns how many are led. */
function setLeads(
  x: Float64Array,
  g: Float64Array,
  xFirst: Float64Array,
  gFirst: Float64Array,
  mixing: Float64Array,
): number {
  let leading = 0;
  for (let i = 0; i < x.length; i++) {
    const dx = x[i] - xFirst[i];
    const slope = (g[i] - gFirst[i]) / dx;
    if (dx > 0 && g[i] > x[i] && slope > PILING_UP && slope < 1) {
      mixing[i] = 1 / (1 - Math.min(slope, STEEPEST));
      leading++;
    }
  }
  return leading;
}

function scaledResidual(x: Float64Array, g: Float64Array, scale: Float64Array): number {
  let worst = 0;
  for (let i = 0; i < x.length; i++) worst = Math.max(worst, Math.abs(g[i] - x[i]) / scale[i]);
  return worst;
}
