import type { FixedPointProblem } from '../convergence/problem.ts';
import type { StreamState } from '../model/stream.ts';
import type { HeatLeft } from './heat-left.ts';
import { createPassSlopes } from './pass-slopes.ts';
import type { Group, Plant } from './plant.ts';

/** The variables of a torn stream: component flows [mol/s], then T/100 K and P/bar, so that all are of one size. */
const KELVIN = 0.01;
const BAR = 1e-5;
/** A flow this small beside its stream is measured against the stream [-]. */
const TRACE = 1e-6;
/** Rounding counts from here [-]: a finer tolerance asks for passes, not for more digits than a number has. */
const LEDGER = 1e-9;

/** The recycles of one group of blocks as a fixed-point problem, with the names of its variables. */
export interface RecycleProblem extends FixedPointProblem {
  /** e.g. S8.Ar, S8.temperature */
  readonly names: readonly string[];
  /** those of a pass, carried through its blocks */
  readonly derivatives: NonNullable<FixedPointProblem['derivatives']>;
  /** write the states of the torn streams as their sources left them into x */
  read(x: Float64Array): void;
}

/**
 * x = the torn streams as guessed, G(x) = the same streams as the blocks of the group return them.
 * The extra error is the balance over the battery limit that the difference leaves open: per component against
 * what enters or is formed, and of energy against what the blocks exchange.
 *
 * @param left  what the passes are to leave to `complete`
 */
export function createRecycleProblem(
  plant: Plant,
  group: Group,
  left: HeatLeft | null = null,
): RecycleProblem {
  const { mixture, streams, seen, flowsheet } = plant;
  const width = mixture.size + 2;
  const size = width * group.tears.length;
  const reactors = group.blocks.filter((block) => plant.kinds[block].reactionsIn);
  // A block that is worked out in two groups has outlets that this one does not write.
  const elsewhere = new Set(plant.groups.flatMap((other) => (other === group ? [] : other.blocks)));
  const carriers = group.blocks.filter((block) => !plant.kinds[block].reactionsIn && !elsewhere.has(block));
  const lower = new Float64Array(size);
  for (let t = 0; t < group.tears.length; t++) {
    lower[t * width + mixture.size] = 20 * KELVIN;
    lower[t * width + mixture.size + 1] = 1e-6;
  }

  /** What a variable of a stream is multiplied with to become that of the problem. */
  function unit(i: number): number {
    const v = i % width;
    if (v < mixture.size) return 1;
    return v === mixture.size ? KELVIN : BAR;
  }

  function pack(state: StreamState, x: Float64Array, at: number): void {
    x.set(state.flowsMolPerS, at);
    x[at + mixture.size] = state.temperatureK * KELVIN;
    x[at + mixture.size + 1] = state.pressurePa * BAR;
  }

  const slopes = createPassSlopes(plant, group, left);
  /** by tear: is its heat closed with its flows? */
  const heat = group.tears.map((s) => !left?.tears.includes(s));
  let complete = left === null;

  function pass(): void {
    for (let k = 0; k < group.steps.length; k++) {
      if (left?.flowsOnly[k]) plant.passFlows(group.steps[k]);
      else plant.pass(group.steps[k]);
    }
  }

  function readAnswer(g: Float64Array): void {
    for (let t = 0; t < group.tears.length; t++) pack(streams[group.tears[t]], g, t * width);
  }

  return {
    size,
    lower,
    derivatives: {
      propagated: slopes.propagated,
      // Where all pressures are equal, a mixer may take its own from the recycle as well as from the feed.
      mayFloat: (i) => i % width === width - 1,
      at(out) {
        if (!slopes.at(out)) return false;
        for (let i = 0; i < size; i++) {
          for (let j = 0; j < size; j++) out[i * size + j] *= unit(i) / unit(j);
        }
        return true;
      },
    },
    names: group.tears.flatMap((s) =>
      [...mixture.components.map((c) => c.id), 'temperature', 'pressure'].map(
        (name) => `${flowsheet.streams[s].tag}.${name}`,
      ),
    ),
    read(x) {
      group.tears.forEach((s, t) => {
        pack(streams[s], x, t * width);
      });
    },
    evaluate(x, g) {
      for (let t = 0; t < group.tears.length; t++) {
        const guess = seen[group.tears[t]];
        const at = t * width;
        for (let i = 0; i < mixture.size; i++) guess.flowsMolPerS[i] = x[at + i];
        guess.temperatureK = x[at + mixture.size] / KELVIN;
        guess.pressurePa = x[at + mixture.size + 1] / BAR;
        if (heat[t]) mixture.settle(guess);
      }
      pass();
      readAnswer(g);
      complete = left === null;
    },
    ...(left && { complete: completeHeat(left) }),
    scale(x, g, out) {
      for (let t = 0; t < group.tears.length; t++) {
        const at = t * width;
        let total = 0;
        for (let i = 0; i < mixture.size; i++) total += Math.max(x[at + i], g[at + i]);
        for (let i = 0; i < width; i++) {
          const floor = i < mixture.size ? TRACE * total + 1e-12 : 0;
          out[at + i] = Math.max(Math.abs(x[at + i]), Math.abs(g[at + i]), floor);
        }
      }
    },
    extraError() {
      return complete ? Math.max(materialError(), energyError()) : materialError();
    },
  };

  /** All blocks but those that have their heat from the tears, so that these get theirs; then what is behind them. */
  function completeHeat({ flowsOnly, tears, behindTears }: HeatLeft) {
    const later = new Set(behindTears);
    return (x: Float64Array, g: Float64Array): void => {
      for (const [k, step] of group.steps.entries()) {
        if (flowsOnly[k] && later.has(step)) plant.passFlows(step);
        else plant.pass(step);
      }
      for (const s of tears) {
        seen[s].temperatureK = streams[s].temperatureK;
        mixture.settle(seen[s]);
        x[group.tears.indexOf(s) * width + mixture.size] = streams[s].temperatureK * KELVIN;
      }
      for (const step of behindTears) plant.pass(step);
      readAnswer(g);
      complete = true;
    };
  }

  /**
   * What is left open of each component, against what enters the flowsheet or is formed in the group: by the tears, and
   * where the ledger would show it by rounding in the blocks between, which no further pass makes less.
   */
  function materialError(): number {
    let worst = 0;
    for (let i = 0; i < mixture.size; i++) {
      let open = 0;
      for (const s of group.tears) open += streams[s].flowsMolPerS[i] - seen[s].flowsMolPerS[i];
      let rounded = open;
      for (const block of carriers) rounded -= made(block, i);
      let formed = 0;
      for (const block of reactors) formed += made(block, i);
      const entering = Math.max(formed, 0) + plant.entering.flowsMolPerS[i];
      if (Math.abs(rounded) > LEDGER * entering) open = rounded;
      if (entering > 0) worst = Math.max(worst, Math.abs(open) / entering);
    }
    return worst;
  }

  /**
   * What leaves a block of a component beyond what enters it [mol/s], exact where the two nearly agree.
   * @source compensated summation, A. Neumaier, Z. angew. Math. Mech. 54 (1974) 39-51 (from memory)
   */
  function made(block: number, i: number): number {
    const out = plant.outlets[block];
    const into = plant.inlets[block];
    let sum = 0;
    let lost = 0;
    for (let k = 0; k < out.length + into.length; k++) {
      const flow = k < out.length ? out[k].flowsMolPerS[i] : -into[k - out.length].flowsMolPerS[i];
      const next = sum + flow;
      lost += Math.abs(sum) >= Math.abs(flow) ? sum - next + flow : flow - next + sum;
      sum = next;
    }
    return sum + lost;
  }

  function energyError(): number {
    let open = 0;
    for (const s of group.tears) open += streams[s].enthalpyW - seen[s].enthalpyW;
    let exchanged = plant.entering.enthalpyW;
    for (const block of group.blocks) {
      let added = 0;
      for (const state of plant.outlets[block]) added += state.enthalpyW;
      for (const state of plant.inlets[block]) added -= state.enthalpyW;
      exchanged += Math.abs(added);
    }
    return exchanged > 0 ? Math.abs(open) / exchanged : 0;
  }
}
