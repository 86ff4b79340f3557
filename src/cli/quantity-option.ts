import {
  type Dimension,
  type Limits,
  loadUnitEngine,
  needsUnitEngine,
  parseQuantity,
} from '../units/quantity.ts';
import type { UsageFault } from './refusal.ts';

/** The value of an option with a unit, in SI; NaN with a fault added where it cannot be read. */
export async function quantityOption(
  text: string,
  dimension: Dimension,
  limits: Limits,
  faults: UsageFault[],
): Promise<number> {
  if (needsUnitEngine(text)) await loadUnitEngine();
  const read = parseQuantity(text, dimension, limits);
  if (read.ok) return read.value;
  const { code, what, why, mend } = read;
  faults.push({ code, what, why, mend, at: text });
  return Number.NaN;
}
