// The parts of odex that are used here. The package ships its TypeScript source, which the compiler would check by
// our rules if it were not for this file (see `paths` in tsconfig.json).

/** Called at the start and after each accepted step; false ends the integration. */
export type OutputFunction = (step: number, from: number, to: number, y: number[]) => boolean | undefined;

export declare class Solver {
  constructor(size: number);
  absoluteTolerance: number;
  relativeTolerance: number;
  initialStepSize: number;
  solve(
    derivative: (x: number, y: number[]) => number[],
    from: number,
    start: number[],
    to: number,
    output?: OutputFunction,
  ): { y: number[]; outcome: number; nEval: number };
}
