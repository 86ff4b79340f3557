import { join } from 'node:path';
import type { Flowsheet } from '../src/model/flowsheet.ts';
import { balance } from '../src/tally/balance.ts';
import { closePlant } from '../src/tally/close-plant.ts';
import { createPlant, type Plant } from '../src/tally/plant.ts';
import { column, quickestMs, title } from './measure.ts';
import { scipyProblem } from './scipy-problem.ts';
import { runScipy, type ScipyRun, scipyMissing } from './scipy-run.ts';
import { FOLDER, openShipped } from './shipped.ts';

const REFERENCE = join(FOLDER, 'reference-loop.yaml');
const SCRIPT = join('bench', 'scipy_loop.py');
/** Both sides are to be right to this, as share of each flow. */
const TOLERANCE = 1e-9;
const ROUNDS = 100;
/**
 * Calls that make our compiler settle, and as many that are timed: with other work on the machine it takes some thousand
 * of the shortest until the compiled code is there.
 */
const CALLS = 2000;
/** How many times faster than the best method of scipy the loop is to close. */
const TARGET = 30;
const OPTIONS = { method: 'auto', tolerance: TOLERANCE, maxPasses: 200 } as const;

/** The reference loop closed here and by scipy, from the same constants and to the same answer. */
export async function benchScipy(): Promise<void> {
  title(`${REFERENCE} against the same loop in Python, closed by scipy, both right to ${TOLERANCE}`);
  const missing = scipyMissing();
  if (missing !== null) {
    console.log(`  scipy comparison skipped: ${missing}`);
    return;
  }
  const flowsheet = await openShipped(REFERENCE);
  const exact = closedRecycle(flowsheet);
  const problem = { tolerance: TOLERANCE, rounds: ROUNDS };
  const plain = runScipy(scipyProblem(flowsheet, { ...problem, tuned: false }), SCRIPT);
  const tuned = runScipy(scipyProblem(flowsheet, { ...problem, tuned: true }), SCRIPT);
  const { python, numpy, scipy } = plain.versions;
  console.log(`  Python ${python}, numpy ${numpy}, scipy ${scipy}, Node ${process.versions.node}`);
  printMethods('plain Python (numpy, brentq)', plain, exact);
  printMethods('Python tuned by hand (no numpy inside, warm Newton)', tuned, exact);
  console.log(
    '  All close the flows. Ours then works out what the loops in Python leave out, within the time shown: the\n' +
      '  temperatures behind mixer and circulator, the work of the circulator, enthalpies and so the duties.',
  );
  printRatios(ourTimes(flowsheet), bestOf(plain), bestOf(tuned));
}

function printMethods(name: string, run: ScipyRun, exact: Float64Array): void {
  console.log(
    `  ${name}: one pass ${column(run.pass_ms, 1)} ms; largest difference of a recycle flow from ours ` +
      `${furthest(run.answer, exact).toExponential(1)}`,
  );
  console.log(`    ${'method'.padEnd(15)} ${'start'.padEnd(5)}  passes       ms  off ours`);
  for (const { method, start, converged, evaluations, ms, answer, note } of run.results) {
    const result =
      converged && ms !== null && answer !== null
        ? `${column(ms, 8)}  ${furthest(answer, exact).toExponential(1)}`
        : `did not converge: ${note}`;
    console.log(`    ${method.padEnd(15)} ${start.padEnd(5)} ${String(evaluations).padStart(7)} ${result}`);
  }
}

/** The quickest right answer of a run [ms], and whose it is. */
function bestOf(run: ScipyRun): { method: string; ms: number } {
  let best = { method: '', ms: Number.POSITIVE_INFINITY };
  for (const { method, ms } of run.results) if (ms !== null && ms < best.ms) best = { method, ms };
  if (best.method === '') throw new Error('no method of scipy closed the loop');
  return best;
}

/** Times of one solve, quickest of many as on the other side [ms]. */
function ourTimes(flowsheet: Flowsheet): readonly (readonly [name: string, ms: number])[] {
  const kept = createPlant(flowsheet);
  return [
    ['plant kept, closed from the feeds', quickestMs(() => closed(kept), CALLS)],
    ['plant made anew and closed', quickestMs(() => closed(createPlant(flowsheet)), CALLS)],
    ['balance(): plant, closing, whole result', quickestMs(() => void balance(flowsheet), CALLS)],
  ];
}

function printRatios(
  ours: readonly (readonly [name: string, ms: number])[],
  plain: { method: string; ms: number },
  tuned: { method: string; ms: number },
): void {
  console.log(
    `  best of scipy: plain ${plain.method} ${column(plain.ms, 1)} ms, tuned ${tuned.method} ${column(tuned.ms, 1)} ms`,
  );
  console.log(`    ${'Looptally'.padEnd(42)}       ms  x plain  x tuned`);
  for (const [k, [name, ms]] of ours.entries()) {
    const ratio = plain.ms / ms;
    // The promise is for a solve; what making the plant and telling the result cost beside it is shown for comparison.
    const verdict = k > 0 ? '' : `(plain at least ${TARGET}: ${ratio >= TARGET ? 'kept' : 'MISSED'})`;
    console.log(
      `    ${name.padEnd(42)} ${column(ms, 8)} ${column(ratio, 8)} ${column(tuned.ms / ms, 8)}  ${verdict}`,
    );
  }
}

function closed(plant: Plant): void {
  if (!closePlant(plant, OPTIONS).converged) throw new Error(`${REFERENCE} does not close`);
}

/** Flows of the torn recycle [mol/s], closed as far as they go. */
export function closedRecycle(flowsheet: Flowsheet): Float64Array {
  const plant = createPlant(flowsheet);
  const { converged } = closePlant(plant, { ...OPTIONS, tolerance: 1e-13 });
  if (!converged) throw new Error(`${REFERENCE} does not close to 1e-13`);
  const recycle = flowsheet.streams.findIndex(({ tag }) => tag === flowsheet.ledger.recycle);
  return plant.streams[recycle]!.flowsMolPerS.slice();
}

/** Largest relative difference of a flow. */
export function furthest(found: readonly number[], wanted: Float64Array): number {
  return Math.max(...found.map((flow, i) => Math.abs(flow / wanted[i]! - 1)));
}
