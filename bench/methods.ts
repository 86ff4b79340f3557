import { basename } from 'node:path';
import { methods } from '../src/convergence/methods.ts';
import type { Flowsheet, MethodName } from '../src/model/flowsheet.ts';
import { balance } from '../src/tally/balance.ts';
import { column, timeInRounds, title } from './measure.ts';
import { openShipped, shippedFiles } from './shipped.ts';

const ROUNDS = 7;
/** Solves that make the just-in-time compiler settle. */
const WARM_UP = 40;
const MAX_PASSES = 5000;

/** Passes and time of a solve by each method on each shipped flowsheet, property model and result included. */
export async function benchMethods(): Promise<void> {
  title(`Solves: passes, time and ratio to auto, median of ${ROUNDS} rounds`);
  console.log(`  ${'flowsheet'.padEnd(20)} ${'method'.padEnd(10)} passes       ms  us/pass   ratio`);
  const names = Object.keys(methods) as MethodName[];
  for (const file of shippedFiles()) {
    const flowsheet = await openShipped(file);
    for (let k = 0; k < WARM_UP; k++) solve(flowsheet, names[0]!);
    const measured = timeInRounds(
      names.map((name) => () => {
        solve(flowsheet, name);
      }),
      ROUNDS,
    );
    names.forEach((name, k) => {
      const { passes, converged } = solve(flowsheet, name);
      const { ms, ratio } = measured[k]!;
      console.log(
        `  ${basename(file, '.yaml').padEnd(20)} ${name.padEnd(10)} ${String(passes).padStart(6)} ` +
          `${column(ms, 8)} ${column((1e3 * ms) / passes, 8)} ${column(ratio, 7)}${converged ? '' : '  not closed'}`,
      );
    });
  }
}

function solve(flowsheet: Flowsheet, method: MethodName): { passes: number; converged: boolean } {
  return balance(flowsheet, { method, maxPasses: MAX_PASSES }).result.convergence;
}
