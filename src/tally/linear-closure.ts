import { solveInPlace } from '../convergence/linear-solve.ts';
import { largest } from '../convergence/vectors.ts';
import type { Plant } from './plant.ts';
import { createRecycleProblem, type RecycleProblem } from './recycle-problem.ts';

/** Relative step of a tear variable for its difference quotient [-]. */
const STEP = 1e-4;
/** A variable smaller than this share of its stream is moved as if it were that large [-]. */
const TRACE = 1e-3;
/** Newton steps that carry a closed loop to the noise of its blocks. */
const POLISH = 3;

/** A closed plant with its recycles linearised: x = G(x) at the tears, A = dG/dx. */
export interface LinearClosure {
  /** tear variables of all groups together */
  readonly size: number;
  /** the tears where the plant is closed, scaled as in recycle-problem.ts */
  readonly x: Float64Array;
  /** sizes of the tear variables, to measure steps against; > 0 */
  readonly scale: Float64Array;
  /** passes that linearising took, of the recycle that took most */
  readonly passes: number;
  /** one pass of the whole plant from these tears, all groups in calculation order; @throws PassTrouble */
  pass(x: Float64Array, g: Float64Array): void;
  /** turn a residual r into the step (I − A)⁻¹ r, each group by itself; false where a group is singular */
  solve(r: Float64Array): boolean;
  /** `solve` with A as it is at the last pass; as it was where there are no derivatives or they are singular */
  solveHere(): (r: Float64Array) => boolean;
}

interface Part {
  readonly problem: RecycleProblem;
  readonly from: number;
  /** rows of I − A of this group */
  readonly rows: readonly Float64Array[];
}

/**
 * Linearise the recycles of a closed plant by the derivatives that its blocks carry through a pass, or, where a block
 * fails beside it, by one pass each side of every tear variable; then close the plant to the last digits with what was
 * found.
 *
 * How one group moves those behind it is no part of A: it comes in by the passes of the whole plant.
 *
 * @throws PassTrouble where a block cannot be evaluated beside the closed point
 */
export function linearise(plant: Plant): LinearClosure {
  const parts: Part[] = [];
  /** per group its problem, null where nothing goes round */
  const problems = plant.groups.map((group) =>
    group.tears.length === 0 ? null : createRecycleProblem(plant, group),
  );
  let size = 0;
  for (const problem of problems) {
    if (problem === null) continue;
    const rows = Array.from({ length: problem.size }, () => new Float64Array(problem.size));
    parts.push({ problem, from: size, rows });
    size += problem.size;
  }
  const x = new Float64Array(size);
  const scale = new Float64Array(size);
  for (const { problem, from } of parts) problem.read(x.subarray(from, from + problem.size));

  function pass(at: Float64Array, g: Float64Array): void {
    plant.refreshFeeds();
    let from = 0;
    plant.groups.forEach((group, k) => {
      const problem = problems[k];
      if (problem === null) for (const step of group.steps) plant.pass(step);
      else {
        problem.evaluate(at.subarray(from, from + problem.size), g.subarray(from, from + problem.size));
        from += problem.size;
      }
    });
  }

  function solveWith(list: readonly Part[], floating = false): (r: Float64Array) => boolean {
    return (r) =>
      list.every(({ problem, from, rows }) =>
        solveRows(
          rows,
          r.subarray(from, from + problem.size),
          floating ? problem.derivatives.mayFloat : undefined,
        ),
      );
  }
  const solve = solveWith(parts);

  function solveHere(): (r: Float64Array) => boolean {
    const here = parts.map((part) => ({
      ...part,
      rows: part.rows.map((row) => new Float64Array(row.length)),
    }));
    // To one side of a kink a pressure may be left to itself: it stays where it is.
    return here.every((part) => readDerivatives(part, true)) ? solveWith(here, true) : solve;
  }

  const g = new Float64Array(size);
  pass(x, g);
  sizes(plant, x, scale);
  // one to begin with and one to end with
  let passes = 2 + Math.max(0, ...parts.map((part) => linearisePart(part, x, scale)));
  for (let k = 0; k < POLISH; k++) {
    pass(x, g);
    passes++;
    const r = g.map((value, i) => value - x[i]);
    if (!solve(r)) break;
    for (let i = 0; i < size; i++) x[i] = Math.max(x[i] + r[i], 0);
  }
  pass(x, g);
  return { size, x, scale, passes, pass, solve, solveHere };
}

/** The size of every tear variable: its own, or a trace of its stream. */
function sizes(plant: Plant, x: Float64Array, scale: Float64Array): void {
  const n = plant.mixture.size;
  for (let at = 0; at < x.length; at += n + 2) {
    let total = 0;
    for (let i = 0; i < n; i++) total += x[at + i];
    for (let i = 0; i < n; i++) scale[at + i] = Math.max(x[at + i], TRACE * total, 1e-12);
    for (let i = n; i < n + 2; i++) scale[at + i] = x[at + i];
  }
}

/** Write I − A of one group at its last pass; returns the passes of all blocks it took. */
function linearisePart(part: Part, x: Float64Array, scale: Float64Array): number {
  // Of a kink they are those of one side, and that may leave a pressure undetermined: differences see both.
  if (readDerivatives(part)) return 0;
  differentiate(part, x, scale);
  // a base before and after two for each variable
  return 2 * part.problem.size + 2;
}

/** I − A from the derivatives of the last pass; false where there are none or they are singular. */
function readDerivatives({ problem, rows }: Part, floating = false): boolean {
  const n = problem.size;
  const given = new Float64Array(n * n);
  if (!problem.derivatives.at(given)) return false;
  rows.forEach((row, i) => {
    for (let j = 0; j < n; j++) row[j] = (i === j ? 1 : 0) - given[i * n + j];
  });
  return solveRows(rows, new Float64Array(n), floating ? problem.derivatives.mayFloat : undefined);
}

/** Pivots, relative to the largest entry, below which rows are singular [-]. */
const SINGULAR = 1e-14;
/** What is left of a residual in an equation that is met [-]. */
const MET = 1e-9;

/**
 * Solve with a copy of the rows, r → the answer; false where they are singular.
 *
 * @param mayFloat  variables that may stay as they are where nothing decides them, see `Derivatives`
 */
function solveRows(
  rows: readonly Float64Array[],
  r: Float64Array,
  mayFloat?: (variable: number) => boolean,
): boolean {
  return solveInPlace(
    rows.map((row) => row.slice()),
    r,
    SINGULAR,
    mayFloat,
    MET * largest(r),
  );
}

/** Write I − A of one group by differences; where a flow is too small for a step down, both steps go up. */
function differentiate({ problem, from, rows }: Part, x: Float64Array, scale: Float64Array): void {
  const n = problem.size;
  const at = x.slice(from, from + n);
  const base = new Float64Array(n);
  const one = new Float64Array(n);
  const other = new Float64Array(n);
  problem.evaluate(at, base);
  for (let j = 0; j < n; j++) {
    const x0 = at[j];
    const h = STEP * scale[from + j];
    const central = x0 > h;
    at[j] = x0 + h;
    problem.evaluate(at, one);
    at[j] = central ? x0 - h : x0 + 2 * h;
    problem.evaluate(at, other);
    at[j] = x0;
    for (let i = 0; i < n; i++) {
      const slope = central ? (one[i] - other[i]) / (2 * h) : (4 * one[i] - 3 * base[i] - other[i]) / (2 * h);
      rows[i][j] = (i === j ? 1 : 0) - slope;
    }
  }
  problem.evaluate(at, base);
}
