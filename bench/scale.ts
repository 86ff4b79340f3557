import { readFlowsheet } from '../src/flowsheet/read.ts';
import { readYaml } from '../src/flowsheet/yaml-document.ts';
import type { Flowsheet } from '../src/model/flowsheet.ts';
import { balance } from '../src/tally/balance.ts';
import { closePlant } from '../src/tally/close-plant.ts';
import { planFlowsheet } from '../src/tally/plan.ts';
import { createPlant } from '../src/tally/plant.ts';
import { createRecycleProblem } from '../src/tally/recycle-problem.ts';
import { column, cpuMs, cpuSince, title } from './measure.ts';
import { randomFlowsheet } from './random-flowsheet.ts';

const SIZES = [10, 30, 100, 300, 1000, 2000] as const;
/** Every size is measured on about so many blocks, small flowsheets on several seeds: loops differ in what they cost. */
const BLOCKS_MEASURED = 300;
/** Blocks to a recycle: as many at every size, or the larger ones would be made of cheaper blocks. */
const PER_RECYCLE = 10;
/** Rounds, of which the least counts: what the work takes when nobody else is at the machine. */
const ROUNDS = 9;
/** What the guess is moved by between passes: at a standing guess warm starts would hide the work. */
const NUDGE = 1e-3;

/** Blocks of the targets, and what they ask for. */
const TARGET = { blocks: 1000, checkMs: 100, passRatio: 2, exponent: 1.2 } as const;

interface Measured {
  readonly blocks: number;
  readonly recycles: number;
  readonly tears: number;
  readonly yamlMs: number;
  readonly readMs: number;
  readonly planMs: number;
  readonly passUsPerBlock: number;
  readonly solveMs: number;
  readonly passes: number;
  readonly failed: readonly string[];
}

/** Random flowsheets from 10 to 2,000 blocks: what reading, planning, a pass and a whole solve take, and how that grows. */
export async function benchScale(): Promise<void> {
  title(
    `Scale: random ammonia flowsheets with a recycle to ${PER_RECYCLE} blocks; processor time, least of ${ROUNDS} rounds`,
  );
  const coldMs = await coldCheckMs();
  console.log(
    '  per flowsheet: yaml = text to tree, read = text to checked flowsheet (yaml included), plan = order and tears',
  );
  console.log(
    '   blocks recycles  tears   yaml ms   read ms   plan ms   us/block pass us/block  ratio  passes   solve ms   ms/block',
  );
  const all: Measured[] = [];
  for (const blocks of SIZES) {
    const one = await measure(blocks);
    all.push(one);
    const { yamlMs, readMs, planMs, passUsPerBlock, solveMs } = one;
    console.log(
      `  ${String(blocks).padStart(7)} ${column(one.recycles, 8)} ${column(one.tears, 6)} ${column(yamlMs, 9)} ` +
        `${column(readMs, 9)} ${column(planMs, 9)} ${column((1e3 * (readMs + planMs)) / blocks, 10)} ` +
        `${column(passUsPerBlock, 13)} ${column(passUsPerBlock / all[0].passUsPerBlock, 6)} ${column(one.passes, 7)} ` +
        `${column(solveMs, 10)} ${column(solveMs / blocks, 10)}`,
    );
    for (const failure of one.failed) console.log(`          not closed: ${failure}`);
  }
  sayTargets(all, coldMs);
}

function sayTargets(all: readonly Measured[], coldMs: number): void {
  const first = all[0];
  const last = all.at(-1)!;
  const target = all.find(({ blocks }) => blocks === TARGET.blocks)!;
  const checkMs = target.readMs + target.planMs;
  const ratio = target.passUsPerBlock / first.passUsPerBlock;
  const base = all.find(({ blocks }) => blocks === 100)!;
  const growth = (of: (one: Measured) => number) =>
    Math.log(of(last) / of(base)) / Math.log(last.blocks / base.blocks);
  const say = (holds: boolean, text: string) =>
    console.log(`  ${holds ? 'holds:         ' : 'DOES NOT HOLD: '}${text}`);
  say(
    checkMs < TARGET.checkMs,
    `${TARGET.blocks} blocks are read, checked and ordered in ${column(checkMs, 0)} ms (under ${TARGET.checkMs}); ${column(coldMs, 0)} ms the first time in this process`,
  );
  say(
    ratio < TARGET.passRatio,
    `their pass takes ${column(ratio, 0)} times as much per block as at ${first.blocks} (under ${TARGET.passRatio})`,
  );
  for (const [what, exponent] of [
    ['reading and planning', growth(({ readMs, planMs }) => readMs + planMs)],
    ['a whole solve', growth(({ solveMs }) => solveMs)],
  ] as const)
    say(
      exponent < TARGET.exponent,
      `from ${base.blocks} to ${last.blocks} blocks ${what} grows with their number to the power ${exponent.toFixed(2)} (under ${TARGET.exponent})`,
    );
}

async function coldCheckMs(): Promise<number> {
  const text = textOf(TARGET.blocks, 1);
  const start = process.cpuUsage();
  planFlowsheet(await read(text));
  return cpuSince(start);
}

function textOf(blocks: number, seed: number): string {
  return randomFlowsheet({
    blocks,
    recycles: Math.floor(blocks / PER_RECYCLE),
    seed,
    trade: 'ammonia',
    dissolvedGases: true,
  });
}

async function read(text: string): Promise<Flowsheet> {
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'random.yaml' });
  if (!flowsheet) throw new Error(diagnostics.map((d) => d.what).join('\n'));
  return flowsheet;
}

async function measure(blocks: number): Promise<Measured> {
  const seeds = Array.from({ length: Math.max(1, Math.round(BLOCKS_MEASURED / blocks)) }, (_, k) => k + 1);
  const sums = { tears: 0, yamlMs: 0, readMs: 0, planMs: 0, passMs: 0, solveMs: 0, passes: 0 };
  const failed: string[] = [];
  for (const seed of seeds) {
    const text = textOf(blocks, seed);
    const flowsheet = await read(text);
    const times = { yamlMs: Infinity, readMs: Infinity, planMs: Infinity };
    for (let round = 0; round < ROUNDS; round++) {
      times.yamlMs = Math.min(
        times.yamlMs,
        cpuMs(() => void readYaml(text, 'random.yaml')),
      );
      const start = process.cpuUsage();
      await read(text);
      times.readMs = Math.min(times.readMs, cpuSince(start));
      times.planMs = Math.min(
        times.planMs,
        cpuMs(() => void planFlowsheet(flowsheet)),
      );
    }
    sums.yamlMs += times.yamlMs;
    sums.readMs += times.readMs;
    sums.planMs += times.planMs;
    sums.passMs += passMs(flowsheet);
    sums.solveMs += cpuMs(() => {
      const { result, diagnosis } = balance(flowsheet);
      sums.tears += result.convergence.tears.length;
      sums.passes += result.convergence.passes;
      if (diagnosis !== null) failed.push(`seed ${seed}: ${diagnosis.code}: ${diagnosis.what}`);
    });
  }
  const count = seeds.length;
  return {
    blocks,
    recycles: Math.floor(blocks / PER_RECYCLE),
    tears: sums.tears / count,
    yamlMs: sums.yamlMs / count,
    readMs: sums.readMs / count,
    planMs: sums.planMs / count,
    passUsPerBlock: (1e3 * sums.passMs) / count / blocks,
    solveMs: sums.solveMs / count,
    passes: sums.passes / count,
    failed,
  };
}

/** One pass through every block of a closed plant, the guess of every loop moved from pass to pass. */
function passMs(flowsheet: Flowsheet): number {
  const plant = createPlant(flowsheet);
  closePlant(plant, flowsheet.solve);
  const loops = plant.groups.map((group) => {
    const problem = createRecycleProblem(plant, group);
    const x = new Float64Array(problem.size);
    problem.read(x);
    const moved = x.map((value, i) => value * (1 + (i % 2 === 0 ? NUDGE : -NUDGE)));
    return { problem, guesses: [x, moved], g: new Float64Array(problem.size) };
  });
  let turn = 0;
  const pass = () => {
    turn++;
    for (const { problem, guesses, g } of loops) problem.evaluate(guesses[turn % 2], g);
  };
  let least = Infinity;
  for (let round = 0; round < ROUNDS; round++) {
    least = Math.min(
      least,
      cpuMs(() => {
        for (let k = 0; k < PASSES; k++) pass();
      }) / PASSES,
    );
  }
  return least;
}

/** Passes to a round; an even number, so that every round has both guesses. */
const PASSES = 4;
