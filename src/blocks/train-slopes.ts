import type { MachineStage } from './machine-stage.ts';

/** Stages of one pressure ratio in series, coolers between them, as they last ran. */
export interface Train {
  readonly stages: readonly MachineStage[];
  /** pressure ratio of each stage */
  readonly ratio: number;
  /** derivative of the discharge pressure of the last in the suction pressure of the first */
  readonly pressureSlope: number;
  /** does the cooler before a stage (1, 2, …) hold its temperature? one that does nothing lets it pass */
  cools(stage: number): boolean;
}

/**
 * Turn the derivatives of the suction of the first stage into those of the discharge of the last, in place. The ratio
 * moves with the suction pressure, so that the last stage ends where it is to: Pₖ′ = r Pₖ₋₁′ + Pₖ₋₁ r′.
 *
 * @returns false where there are none
 */
export function carryAlongTrain(train: Train, size: number, matrix: Float64Array): boolean {
  const width = size + 2;
  const { stages, ratio, pressureSlope } = train;
  const row = new Float64Array(width);
  let plain = 1;
  let byRatio = 0;
  for (const { suctionPa } of stages) {
    plain *= ratio;
    byRatio = ratio * byRatio + suctionPa();
  }
  const ratioSlope = (pressureSlope - plain) / byRatio;
  let slope = 1;
  for (let k = 0; k < stages.length; k++) {
    if (k > 0 && train.cools(k + 1)) matrix.fill(0, size * width, (size + 1) * width);
    slope = ratio * slope + stages[k].suctionPa() * ratioSlope;
    row[width - 1] = slope;
    if (!stages[k].carrySlopes(matrix, row)) return false;
  }
  return true;
}
