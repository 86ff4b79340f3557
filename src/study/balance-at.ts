import type { Flowsheet } from '../model/flowsheet.ts';
import { type Balance, type BalanceOptions, balancePlant } from '../tally/balance.ts';
import { createPlant } from '../tally/plant.ts';

/** The balance of a flowsheet with some of its settings moved. */
export function balanceAt(
  flowsheet: Flowsheet,
  settings: readonly { readonly path: string; readonly value: number }[],
  options: BalanceOptions = {},
): Balance {
  const plant = createPlant(flowsheet);
  for (const { path, value } of settings) plant.set(path, value);
  return balancePlant(plant, options);
}
