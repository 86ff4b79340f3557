import type { AimsOutcome, AimsSearch } from './aims.ts';
import { DEAD } from './fighting-aims.ts';

/** First step, as a share of the way between the bounds. */
const FIRST_STEP = 0.02;
/** A secant may go this many times as far as the step before. */
const LONGEST = 8;
/** A secant is stretched a little, so that the sign changes rather than nearly so. */
const BEYOND = 1.05;
/** Steps shorter than this share of the way between the bounds lead nowhere. */
const SHORTEST = 1e-9;
/** The nearest place between the bounds is found to this share of the way: the figure is flat there. */
const NEAREST = 1e-3;
/** Golden section. */
const GOLDEN = (3 - Math.sqrt(5)) / 2;

/**
 * One aim: secants from the start until the residual changes sign or a bound is met, then the bracket is
 * narrowed by interpolation on points of opposite sign (Illinois: the end that stays put counts half), by
 * halves whenever that is slow. Where there is no change of sign the nearest place is closed in on.
 *
 * @source M. Dowell, P. Jarratt, BIT 11 (1971) 168-174 (Illinois algorithm, from memory)
 */
export function reachOneAim(search: AimsSearch): AimsOutcome {
  const low = search.low[0];
  const high = search.high[0];
  const tried: Place[] = [];
  const at = (value: number): number => {
    const f = search.tryAt(Float64Array.of(value))?.[0] ?? NaN;
    if (!Number.isNaN(f)) tried.push({ value, f });
    return f;
  };
  const start = firstPlace(search.start[0], low, high, at);
  if (start === null || Math.abs(start.f) <= search.tolerances[0]) return search.outcome();

  const walk = walkToBracket(search, start, at);
  if (walk.limit !== null) return search.outcome({ limit: 0, side: walk.limit, singular: dead(tried) });
  const bracket = walk.bracket ?? closeIn(search, tried, at);
  if (bracket !== null) {
    narrow(search, bracket, at);
    return search.outcome();
  }
  const { value } = tried.reduce((best, place) => (Math.abs(place.f) < Math.abs(best.f) ? place : best));
  const side = value === low ? 'low' : value === high ? 'high' : null;
  return search.outcome({ limit: side === null ? -1 : 0, side, singular: dead(tried) });
}

/** The aim, where nothing tried has moved its figure. */
function dead(tried: readonly Place[]): readonly number[] | null {
  const all = tried.map((place) => place.f);
  return Math.max(...all) - Math.min(...all) <= DEAD ? [0] : null;
}

/** The nearest place between its neighbours, by golden sections; two places when the residual changes sign after all. */
function closeIn(
  search: AimsSearch,
  tried: readonly Place[],
  at: (value: number) => number,
): readonly [Place, Place] | null {
  const places = tried.toSorted((a, b) => a.value - b.value);
  const sizes = places.map((place) => Math.abs(place.f));
  const b = sizes.indexOf(Math.min(...sizes));
  if (b === 0 || b === places.length - 1) return null;
  let [left, middle, right] = places.slice(b - 1, b + 2);
  const width = NEAREST * (search.high[0] - search.low[0]);
  while (right.value - left.value > width && search.left() > 0) {
    const far = right.value - middle.value > middle.value - left.value ? right : left;
    const value = middle.value + GOLDEN * (far.value - middle.value);
    const place = { value, f: at(value) };
    if (Number.isNaN(place.f)) return null;
    if (place.f * middle.f <= 0) return [middle, place];
    const better = Math.abs(place.f) < Math.abs(middle.f);
    // the worse of the two becomes the end on its side
    const worse = better ? middle : place;
    if ((far === right) === better) left = worse;
    else right = worse;
    if (better) middle = place;
  }
  return null;
}

interface Place {
  readonly value: number;
  readonly f: number;
}

interface Walk {
  /** two places with residuals of opposite sign, or one that is reached, twice */
  readonly bracket: readonly [Place, Place] | null;
  /** the bound that stands in the way */
  readonly limit: 'low' | 'high' | null;
}

/** The start, or the first of a few places between the bounds where the loop closes. */
function firstPlace(start: number, low: number, high: number, at: (value: number) => number): Place | null {
  const middle = [0.5, 0.25, 0.75, 0, 1].map((share) => low + share * (high - low));
  for (const value of [start, ...middle]) {
    const f = at(value);
    if (!Number.isNaN(f)) return { value, f };
  }
  return null;
}

/** Secants with growing steps in the direction that improves, turning once; at last a look at both bounds. */
function walkToBracket(search: AimsSearch, start: Place, at: (value: number) => number): Walk {
  const low = search.low[0];
  const high = search.high[0];
  let a = start;
  let step = FIRST_STEP * (high - low);
  if (a.value + step > high) step = -step;
  let turned = false;
  while (search.left() > 0 && Math.abs(step) > SHORTEST * (high - low)) {
    const value = Math.min(Math.max(a.value + step, low), high);
    if (value === a.value) {
      if (turned) return { bracket: null, limit: value === low ? 'low' : 'high' };
      turned = true;
      step = -step;
      continue;
    }
    const b = { value, f: at(value) };
    if (Number.isNaN(b.f)) {
      step /= 2;
      continue;
    }
    if (Math.abs(b.f) <= search.tolerances[0]) return { bracket: [b, b], limit: null };
    if (a.f * b.f < 0) return { bracket: [a, b], limit: null };
    if (Math.abs(b.f) < Math.abs(a.f)) {
      if (b.value === low || b.value === high)
        return { bracket: null, limit: b.value === low ? 'low' : 'high' };
      const secant = (-b.f * (b.value - a.value)) / (b.f - a.f);
      const longest = LONGEST * Math.abs(b.value - a.value);
      a = b;
      step = Math.sign(secant) * Math.min(BEYOND * Math.abs(secant), longest);
      turned = true; // it came from the other side
      continue;
    }
    if (turned) break;
    turned = true;
    step = -step;
  }
  for (const value of [low, high]) {
    const b = { value, f: at(value) };
    if (a.f * b.f <= 0) return { bracket: [a, b], limit: null };
  }
  return { bracket: null, limit: null };
}

/** Interpolation inside a bracket, each point tried remembered by the search. */
function narrow(search: AimsSearch, bracket: readonly [Place, Place], at: (value: number) => number): void {
  let [{ value: a, f: fa }, { value: b, f: fb }] = bracket;
  const tolerance = search.tolerances[0];
  if (Math.abs(fb) <= tolerance) return;
  let side = 0;
  while (search.left() > 0) {
    const between = (a * fb - b * fa) / (fb - fa);
    const slow = Math.abs(side) >= 3;
    const usable = between > Math.min(a, b) && between < Math.max(a, b) && !slow;
    const next = usable ? between : (a + b) / 2;
    if (next === a || next === b) return;
    const f = at(next);
    if (Number.isNaN(f) || Math.abs(f) <= tolerance) return;
    if (f * fb > 0) {
      b = next;
      fb = f;
      if (side > 0) fa /= 2;
      side = Math.max(side, 0) + 1;
    } else {
      a = next;
      fa = f;
      if (side < 0) fb /= 2;
      side = Math.min(side, 0) - 1;
    }
  }
}
