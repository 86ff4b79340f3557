import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Aim } from '../model/flowsheet.ts';
import type { TraceEntry } from '../model/result.ts';
import { type CloseOptions, closePlant, type PlantClosure } from './close-plant.ts';
import type { Plant } from './plant.ts';
import { scopeOf } from './tally.ts';

/** A plant whose settings are moved for its aims, with an account of every pass spent on it. */
export interface AimTask {
  readonly plant: Plant;
  readonly aims: readonly Aim[];
  /** first settings, within their bounds */
  readonly start: Float64Array;
  readonly low: Float64Array;
  readonly high: Float64Array;
  /** the last closing */
  readonly closure: PlantClosure;
  /** passes spent so far, and the story of them */
  readonly passes: number;
  readonly history: readonly TraceEntry[];
  set(settings: Float64Array): void;
  /** close the plant at these settings, from where it stands; nothing is done where it is closed there already */
  closeAt(settings: Float64Array, note: string): PlantClosure;
  /** figures minus targets on the plant as it stands, each by the size of its target */
  residuals(): Float64Array;
  /** the same, the plant closed at these settings before; @throws PassTrouble where it does not close */
  residualsAt(settings: Float64Array): Float64Array;
  /** passes made otherwise than by closing; the plant is closed no longer, but near enough to start from */
  spend(passes: number, entry: Omit<TraceEntry, 'pass' | 'method'>): void;
}

export function createAimTask(plant: Plant, options: CloseOptions): AimTask {
  const { aims } = plant.flowsheet;
  const low = Float64Array.from(aims, (aim) => aim.between[0]);
  const high = Float64Array.from(aims, (aim) => aim.between[1]);
  const history: TraceEntry[] = [];
  let passes = 0;
  let warm = options.warm === true;
  let closure: PlantClosure | null = null;
  let closedAt: Float64Array | null = null;
  // A target of zero has no size of its own: the figure's first value gives it one.
  let sizes: number[] | null = null;

  function set(settings: Float64Array): void {
    aims.forEach((aim, a) => {
      plant.set(aim.move, settings[a]);
    });
  }

  function close(fromHere: boolean, note: string): PlantClosure {
    const closed = closePlant(plant, { ...options, warm: fromHere });
    closed.history.forEach((entry, k) => {
      const joined = k > 0 ? entry.note : [note, entry.note].filter((text) => text !== '').join('; ');
      history.push({ ...entry, pass: passes + entry.pass, note: joined });
    });
    passes += closed.passes;
    return closed;
  }

  function closeAt(settings: Float64Array, note: string): PlantClosure {
    if (closure !== null && closedAt?.every((value, a) => value === settings[a])) return closure;
    set(settings);
    closure = close(warm, note);
    // A neighbour too far away to start from: begin again at the feeds.
    if (!closure.converged && warm) closure = close(false, 'again from the feeds');
    warm = closure.converged;
    closedAt = settings.slice();
    return closure;
  }

  function residuals(): Float64Array {
    const scope = scopeOf(plant);
    const found = aims.map((aim) => aim.until.evaluate(scope));
    sizes ??= aims.map((aim, a) => Math.max(Math.abs(aim.target), Math.abs(found[a])) || 1);
    return Float64Array.from(aims, (aim, a) => (found[a] - aim.target) / sizes![a]);
  }

  return {
    plant,
    aims,
    low,
    high,
    start: Float64Array.from(aims, ({ move, between: [least, most] }) =>
      Math.min(Math.max(plant.get(move) ?? (least + most) / 2, least), most),
    ),
    get closure() {
      return closure!;
    },
    get passes() {
      return passes;
    },
    history,
    set,
    closeAt,
    residuals,
    residualsAt(settings) {
      const closed = closeAt(settings, 'a try for the aims');
      if (!closed.converged) throw closed.failure?.trouble ?? notClosed();
      return residuals();
    },
    spend(more, entry) {
      passes += more;
      closedAt = null;
      history.push({ ...entry, pass: passes, method: 'aims' });
    },
  };
}

function notClosed(): PassTrouble {
  return new PassTrouble(
    'not-closed',
    'The loop does not close at the settings tried for an aim.',
    'see the trace',
    'narrow the bounds of the aim',
  );
}
