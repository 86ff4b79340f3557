import { createEquilibriumSolver } from '../src/chemistry/equilibrium.ts';
import { createLnK } from '../src/chemistry/equilibrium-constant.ts';
import { emptyStream } from '../src/model/stream.ts';
import { balance } from '../src/tally/balance.ts';
import { closePlant } from '../src/tally/close-plant.ts';
import { createPlant, type Plant } from '../src/tally/plant.ts';
import { createRecycleProblem } from '../src/tally/recycle-problem.ts';
import { bytesPerCall, column, median, timeMs, title } from './measure.ts';
import { AMMONIA, openShipped } from './shipped.ts';

const ROUNDS = 15;
/** Time that makes the just-in-time compiler settle [ms]. */
const WARM_UP_MS = 300;
/** Time that one round of a kernel is to take [ms]. */
const ROUND_MS = 20;
/** What the guess is moved by between passes: as between two cases of a sweep. */
const NUDGE = 1e-3;

interface Kernel {
  readonly name: string;
  readonly run: () => void;
  /** calls over which allocation is counted */
  readonly calls: number;
}

/** Time and allocation of the parts of a solve of the ammonia loop, each fed with inputs that change from call to call. */
export async function benchKernels(): Promise<void> {
  title(`Kernels of ${AMMONIA}: time, and ratio to the first, median of ${ROUNDS} rounds`);
  console.log(`  ${'kernel'.padEnd(52)}       us    ratio   bytes`);
  const flowsheet = await openShipped(AMMONIA);
  const plant = createPlant(flowsheet);
  const closure = closePlant(plant, { method: 'auto', tolerance: 1e-9, maxPasses: 200 });
  if (!closure.converged) throw new Error(`${AMMONIA} does not close`);
  const kernels: readonly Kernel[] = [
    ...propertyKernels(plant),
    { ...equilibriumKernel(plant), calls: 20_000 },
    { ...passKernel(plant), calls: 1000 },
    { name: 'one solve: plant, closing, result', run: () => void balance(flowsheet), calls: 30 },
  ];
  let first = 0;
  for (const { name, run, calls } of kernels) {
    const us = microseconds(run);
    first ||= us;
    console.log(
      `  ${name.padEnd(52)} ${column(us, 8)} ${column(us / first, 8)} ${bytesPerCall(run, calls).toFixed(0).padStart(7)}`,
    );
  }
}

function microseconds(run: () => void): number {
  let calls = 1;
  const round = () => timeMs(() => repeat(run, calls));
  for (let spent = 0; spent < WARM_UP_MS; ) spent += round();
  while (round() < ROUND_MS) calls *= 2;
  return median(Array.from({ length: ROUNDS }, () => (1e3 * round()) / calls));
}

function repeat(run: () => void, calls: number): void {
  for (let k = 0; k < calls; k++) run();
}

function propertyKernels({ mixture, streams, flowsheet }: Plant): Kernel[] {
  const { gas, size } = mixture;
  const hot = streams[indexOfStream(flowsheet, 'reactor')]!;
  const cold = emptyStream(size);
  cold.flowsMolPerS.set(hot.flowsMolPerS);
  cold.pressurePa = hot.pressurePa;
  const gasOnly = emptyStream(size);
  gasOnly.flowsMolPerS.set(hot.flowsMolPerS);
  gasOnly.pressurePa = hot.pressurePa;
  const total = hot.flowsMolPerS.reduce((sum, flow) => sum + flow, 0);
  const y = hot.flowsMolPerS.map((flow) => flow / total);
  const richer = y.map((share, i) => (i === 0 ? share + NUDGE : share - NUDGE / (size - 1)));
  const out = new Float64Array(size);
  const calls = 20_000;
  let turn = 0;
  return [
    {
      name: `${gas.name} lnPhi of ${size} components, temperature kept`,
      run: () => gas.lnPhi(700, 196e5, turn++ % 2 === 0 ? y : richer, out),
      calls,
    },
    {
      name: `${gas.name} lnPhi, temperature new at each call`,
      run: () => gas.lnPhi(700 + (turn++ % 16), 196e5, y, out),
      calls,
    },
    {
      name: 'state of a gas at new temperature',
      run: () => {
        gasOnly.temperatureK = 500 + (turn++ % 16);
        mixture.settle(gasOnly);
      },
      calls,
    },
    {
      name: 'phase split and enthalpy, 0.1 K from the last',
      run: () => {
        cold.temperatureK = 265.15 + 0.1 * (turn++ % 2);
        mixture.settle(cold);
      },
      calls: 2000,
    },
  ];
}

/** The stream that leaves the first block of a kind. */
function indexOfStream(flowsheet: Plant['flowsheet'], kind: string): number {
  const names = flowsheet.blocks.filter((block) => block.kind === kind).map((block) => block.name);
  return flowsheet.streams.findIndex((stream) => names.includes(stream.from.name));
}

/** The converter's equilibrium near its outlet, as the search for the adiabatic temperature asks it. */
function equilibriumKernel({ mixture, flowsheet, streams }: Plant): Omit<Kernel, 'calls'> {
  const { components, gas, idealGas } = mixture;
  const reactions = flowsheet.reactions.map((reaction) => {
    const { lnK, standardPressurePa } = createLnK(reaction, idealGas);
    return { coefficients: reaction.coefficients, lnK, standardPressurePa, approachK: 15 };
  });
  const solver = createEquilibriumSolver(reactions, gas, components);
  const { temperatureK, pressurePa, flowsMolPerS } = streams[indexOfStream(flowsheet, 'reactor')]!;
  const product = new Float64Array(mixture.size);
  let turn = 0;
  return {
    name: 'equilibrium solve, 1 K from the last',
    run: () => void solver.solve(temperatureK + (turn++ % 2), pressurePa, flowsMolPerS, product),
  };
}

/** One pass around the recycle with the guess moved from pass to pass: at a standing guess warm starts would hide the work. */
function passKernel(plant: Plant): Omit<Kernel, 'calls'> {
  const group = plant.groups.find(({ tears }) => tears.length > 0)!;
  const problem = createRecycleProblem(plant, group);
  const x = new Float64Array(problem.size);
  problem.read(x);
  const moved = x.map((value, i) => value * (1 + (i % 2 === 0 ? NUDGE : -NUDGE)));
  const g = new Float64Array(problem.size);
  let turn = 0;
  return {
    name: `one pass of the loop (${group.blocks.length} blocks), guess moved by 0.1 %`,
    run: () => problem.evaluate(turn++ % 2 === 0 ? x : moved, g),
  };
}
