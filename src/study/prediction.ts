/** Cases remembered: a parabola through three of them foresees the fourth. */
const MEMORY = 3;
/** Settings that stray from a line by this share of the step do not lie on it [-]. */
const ON_LINE = 1e-9;

/**
 * Foresees the recycles of the next case from the last closed ones, where they lie on one line in the settings (a row
 * of a grid): the polynomial through them, of degree two at most. Elsewhere the last closed case stands as it is.
 */
export interface Prediction {
  /** take in a closed case */
  add(settings: ArrayLike<number>, tears: Float64Array): void;
  /**
   * @param tears  written; flows never below zero
   * @param flows  which of the tears are flows
   * @returns the cases it rests on, 0 where none has closed yet (nothing is written then)
   */
  at(settings: ArrayLike<number>, tears: Float64Array): number;
  clear(): void;
}

/** @param lower  least value of each tear variable */
export function createPrediction(settings: number, lower: Float64Array): Prediction {
  const size = lower.length;
  const points = Array.from({ length: MEMORY }, () => ({
    settings: new Float64Array(settings),
    tears: new Float64Array(size),
  }));
  const along = new Float64Array(MEMORY);
  let known = 0;
  /** newest first */
  const point = (k: number) => points[(known - 1 - k + MEMORY) % MEMORY]!;

  /** How many of the newest points lie on the line to the next case; their places along it in `along`, the next at 1. */
  function onLine(next: ArrayLike<number>): number {
    const held = Math.min(known, MEMORY);
    const newest = point(0).settings;
    along[0] = 0;
    let lead = 0;
    for (let s = 0; s < settings; s++) {
      if (step(next, newest, s) > step(next, newest, lead)) lead = s;
    }
    const whole = next[lead]! - newest[lead]!;
    if (whole === 0) return 1;
    for (let k = 1; k < held; k++) {
      const one = point(k).settings;
      along[k] = (one[lead]! - newest[lead]!) / whole;
      for (let s = 0; s < settings; s++) {
        const off = one[s]! - newest[s]! - along[k]! * (next[s]! - newest[s]!);
        if (Math.abs(off) > ON_LINE * Math.max(Math.abs(next[s]!), Math.abs(newest[s]!))) return k;
      }
      for (let j = 0; j < k; j++) if (Math.abs(along[k]! - along[j]!) < 1e-3) return k;
    }
    return held;
  }

  return {
    add(values, tears) {
      known = known >= 2 * MEMORY ? known - MEMORY + 1 : known + 1;
      const newest = point(0);
      newest.settings.set(values);
      newest.tears.set(tears);
    },
    at(values, tears) {
      if (known === 0) return 0;
      const count = onLine(values);
      tears.fill(0);
      for (let k = 0; k < count; k++) {
        let weight = 1;
        for (let j = 0; j < count; j++) {
          if (j !== k) weight *= (1 - along[j]!) / (along[k]! - along[j]!);
        }
        const of = point(k).tears;
        for (let i = 0; i < size; i++) tears[i]! += weight * of[i]!;
      }
      const newest = point(0).tears;
      for (let i = 0; i < size; i++) if (!(tears[i]! > lower[i]!)) tears[i] = newest[i]!;
      return count;
    },
    clear() {
      known = 0;
    },
  };
}

function step(next: ArrayLike<number>, newest: Float64Array, s: number): number {
  const size = Math.max(Math.abs(next[s]!), Math.abs(newest[s]!));
  return size > 0 ? Math.abs(next[s]! - newest[s]!) / size : 0;
}
