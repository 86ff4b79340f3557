import { type BlockSlopes, blockSlopes } from '../blocks/slopes.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { copyStream, emptyStream, type StreamState } from '../model/stream.ts';
import type { Step } from './calculation-steps.ts';
import type { HeatLeft } from './heat-left.ts';
import type { Group, Plant } from './plant.ts';

/** Step of a difference, relative to the variable: passes are good to some 1e-12 [-]. */
const STEP = 1e-6;
/** A flow smaller than this share of its stream is moved as if it were that large [-]. */
const TRACE = 1e-3;

/** Derivatives of a whole pass round a group of blocks. */
export interface PassSlopes {
  /** every block of the group has derivatives of its own kind to offer */
  readonly propagated: boolean;
  /**
   * Derivatives of the torn streams as their sources leave them with respect to the same streams as their destinations
   * see them, at the last pass; variables as in `BlockSlopes`.
   *
   * @param out  written row by row; length (tears × (components + 2))²
   * @returns false where a block cannot be evaluated beside this point
   */
  at(out: Float64Array): boolean;
}

/**
 * Carry derivatives through the blocks of a pass in calculation order (forward mode): the derivatives of a block's
 * inlets times its own (`Unit.slopes`) are those of its outlets. A block that has none to offer is evaluated beside
 * the last pass, once for each inlet variable that moves at all, and once more to leave it as it was.
 *
 * @param left  what the passes leave out; its derivatives are zero, as it stays as it is
 * @source A. Griewank, A. Walther, Evaluating Derivatives, 2nd ed., SIAM 2008, chapter 3
 */
export function createPassSlopes(plant: Plant, group: Group, left: HeatLeft | null = null): PassSlopes {
  const width = plant.mixture.size + 2;
  const columns = group.tears.length * width;
  /** derivatives of every state of the group, width rows of `columns`; null where nothing moves it */
  const moves = new Map<StreamState, Float64Array>();
  const inside = new Set(group.blocks.flatMap((block) => plant.outlets[block]));
  for (const s of group.tears) moves.set(plant.seen[s], identityAt(group.tears.indexOf(s)));
  for (const state of inside) moves.set(state, new Float64Array(width * columns));
  const room = new Map<number, BlockSlopes>();
  for (const block of group.blocks) {
    const inlets = plant.inlets[block];
    const moved = inlets.map((inlet) => moves.has(inlet));
    room.set(block, blockSlopes(width, plant.outlets[block].length, inlets.length, moved, isLeft(block)));
  }

  function isLeft(block: number): boolean {
    return left?.flowsOnly[group.steps.findIndex((step) => step.block === block)] ?? false;
  }

  function passAgain(step: Step, slopes: BlockSlopes): void {
    if (slopes.flowsOnly) plant.passFlows(step);
    else plant.pass(step);
  }
  const saved = emptyStream(plant.mixture.size);
  const base = new Map<StreamState, StreamState>();
  for (const state of inside) base.set(state, emptyStream(plant.mixture.size));

  function identityAt(tear: number): Float64Array {
    const of = new Float64Array(width * columns);
    for (let i = 0; i < width; i++) of[i * columns + tear * width + i] = 1;
    return of;
  }

  /** Does a row of derivatives say that this variable moves? */
  function isMoved(of: Float64Array, row: number): boolean {
    for (let k = row * columns; k < (row + 1) * columns; k++) if (of[k] !== 0) return true;
    return false;
  }

  function carryThrough(step: Step): void {
    const outlets = plant.outlets[step.block];
    const inlets = plant.inlets[step.block];
    const slopes = room.get(step.block)!;
    clear(slopes);
    const own = step.ahead === null && plant.units[step.block].slopes?.(inlets, outlets, slopes);
    if (!own) {
      clear(slopes);
      differences(step, slopes);
    }
    const only = step.ahead === null ? -1 : portOf(plant, step.block, step.ahead);
    for (let o = 0; o < outlets.length; o++) {
      if (only >= 0 && o !== only) continue;
      const out = moves.get(outlets[o])!;
      out.fill(0);
      for (let i = 0; i < inlets.length; i++) {
        const of = moves.get(inlets[i]);
        if (of !== undefined) addProduct(slopes.of[o][i], of, out);
      }
    }
  }

  function addProduct(slope: Float64Array, of: Float64Array, out: Float64Array): void {
    for (let r = 0; r < width; r++) {
      for (let c = 0; c < width; c++) {
        const factor = slope[r * width + c];
        if (factor === 0) continue;
        const from = c * columns;
        const to = r * columns;
        for (let k = 0; k < columns; k++) out[to + k] += factor * of[from + k];
      }
    }
  }

  /** @throws PassTrouble where neither a step up nor one down can be evaluated */
  function differences(step: Step, slopes: BlockSlopes): void {
    const outlets = plant.outlets[step.block];
    plant.inlets[step.block].forEach((inlet, i) => {
      const of = moves.get(inlet);
      if (of === undefined) return;
      for (const outlet of outlets) copyStream(outlet, base.get(outlet)!);
      copyStream(inlet, saved);
      const trace = TRACE * plant.mixture.total(inlet) + 1e-12;
      for (let v = 0; v < width; v++) {
        if (!isMoved(of, v)) continue;
        const size = v < width - 2 ? Math.max(variable(saved, v, width), trace) : variable(saved, v, width);
        try {
          let h = moved(inlet, v, STEP * size);
          try {
            passAgain(step, slopes);
          } catch (trouble) {
            if (!(trouble instanceof PassTrouble)) throw trouble;
            copyStream(saved, inlet);
            h = moved(inlet, v, -Math.min(STEP * size, 0.5 * variable(saved, v, width)));
            if (h === 0) throw trouble;
            passAgain(step, slopes);
          }
          outlets.forEach((outlet, o) => {
            const at = base.get(outlet)!;
            for (let r = 0; r < width; r++) {
              slopes.of[o][i][r * width + v] = (variable(outlet, r, width) - variable(at, r, width)) / h;
            }
          });
        } finally {
          copyStream(saved, inlet);
        }
      }
      passAgain(step, slopes);
    });
  }

  /** Move a variable of a stream and settle it; returns by how much in truth. */
  function moved(stream: StreamState, v: number, by: number): number {
    const before = variable(stream, v, width);
    if (v < width - 2) stream.flowsMolPerS[v] += by;
    else if (v === width - 2) stream.temperatureK += by;
    else stream.pressurePa += by;
    plant.mixture.settle(stream);
    return variable(stream, v, width) - before;
  }

  return {
    propagated: group.steps.every((s) => s.ahead === null && plant.units[s.block].slopes !== undefined),
    at(out) {
      try {
        for (const step of group.steps) carryThrough(step);
      } catch (trouble) {
        if (!(trouble instanceof PassTrouble)) throw trouble;
        return false;
      }
      for (let t = 0; t < group.tears.length; t++)
        out.set(moves.get(plant.streams[group.tears[t]])!, t * width * columns);
      return true;
    },
  };
}

function clear(slopes: BlockSlopes): void {
  for (const row of slopes.of) for (const one of row) one.fill(0);
}

/** A variable of a stream: flows [mol/s], then temperature [K], then pressure [Pa]. */
function variable(stream: StreamState, v: number, width: number): number {
  if (v < width - 2) return stream.flowsMolPerS[v];
  return v === width - 2 ? stream.temperatureK : stream.pressurePa;
}

function portOf({ kinds, blocks }: Plant, block: number, outlet: string): number {
  return kinds[block].ports(blocks[block].settings).outlets.indexOf(outlet);
}
