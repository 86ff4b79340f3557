import { ANDERSON_INDEPENDENCE, ANDERSON_MEMORY } from './anderson.ts';
import { createDirect } from './direct.ts';
import type { FixedPointMethod } from './method.ts';
import { createSecants, type Secants } from './secants.ts';
import { createWegstein } from './wegstein.ts';

/** Passes without a better residual after which the leads are dropped, and after which the method is changed. */
const LEAD_PATIENCE = 3;
const PATIENCE = 8;
/** A residual has to fall below this share of the best one to count as better. */
const BETTER = 0.9;
/** Slope from which on a component counts as piling up, and the one its lead is limited to (50 direct steps). */
const PILING_UP = 0.3;
const STEEPEST = 0.98;

/**
 * Chooses and changes over. One direct pass; then components that pile up from pass to pass (inerts before a
 * purge, and what is converted a little at a time) get a lead of 1/(1 − s), s their own slope; Anderson does
 * the rest. When the residual stalls: first no more leads, then Anderson afresh, then bounded Wegstein, then
 * direct substitution, and round again.
 *
 * Measured on an ammonia loop with two inerts, temperature and pressure (7 variables, to 1e-9, from an empty
 * recycle): 8 to 9 passes at 5 and 2 % purge, 14 at 0.1 %, 15 at 0.01 %; Anderson alone 10, 11, 16, 16.
 */
export function createAuto(): FixedPointMethod {
  const stages = ['anderson', 'anderson', 'wegstein', 'direct'] as const;
  const wegstein = createWegstein();
  const direct = createDirect();
  let secants: Secants;
  let mixing = new Float64Array(0);
  let xFirst = new Float64Array(0);
  let gFirst = new Float64Array(0);
  let stage = 0;
  let passes = 0;
  let best = Infinity;
  let sinceBest = 0;
  let leading = 0;
  let note = '';

  function changeOver(n: number): void {
    sinceBest = 0;
    if (leading > 0) {
      leading = 0;
      mixing.fill(1);
      note = `no better residual in ${LEAD_PATIENCE} passes: no more leads`;
      return;
    }
    const from = stages[stage];
    stage = (stage + 1) % stages.length;
    secants.clear();
    wegstein.reset(n);
    best = Infinity;
    const to = stages[stage];
    note = `no better residual in ${PATIENCE} passes: ${from === to ? `${to} afresh` : `from ${from} to ${to}`}`;
  }

  return {
    get name() {
      return passes < 2 ? 'direct' : stages[stage];
    },
    reset(n) {
      secants = createSecants(n, ANDERSON_MEMORY, ANDERSON_INDEPENDENCE);
      mixing = new Float64Array(n).fill(1);
      xFirst = new Float64Array(n);
      gFirst = new Float64Array(n);
      wegstein.reset(n);
      stage = 0;
      passes = 0;
      best = Infinity;
      sinceBest = 0;
      leading = 0;
      note = '';
    },
    next(x, g, scale, xNext) {
      passes++;
      note = '';
      const residual = scaledResidual(x, g, scale);
      if (residual < BETTER * best) {
        best = residual;
        sinceBest = 0;
      } else if (++sinceBest >= (leading > 0 ? LEAD_PATIENCE : PATIENCE)) changeOver(x.length);
      if (passes === 1) {
        xFirst.set(x);
        gFirst.set(g);
      } else if (passes === 2) {
        leading = setLeads(x, g, xFirst, gFirst, mixing);
        if (leading > 0) note = `${leading} of ${x.length} variables pile up and are led ahead`;
      }
      if (stages[stage] === 'anderson') {
        secants.record(x, g);
        secants.step(x, g, scale, mixing, xNext);
      } else (stages[stage] === 'wegstein' ? wegstein : direct).next(x, g, scale, xNext);
    },
    note: () => note,
  };
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
