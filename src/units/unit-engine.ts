import type { Dimension } from './dimension.ts';
import type { UnitFactor } from './unit-table.ts';

/** mathjs unit each dimension is converted to; null where mathjs has nothing that fits. */
const targets: Readonly<Record<Dimension, string | null>> = {
  temperature: 'K',
  temperatureDifference: 'K',
  pressure: 'Pa',
  pressureDifference: 'Pa',
  molarFlow: 'mol/s',
  massFlow: 'kg/s',
  normalVolumeFlow: null,
  power: 'W',
  fraction: null,
  molarEnergy: 'J/mol',
  molarHeatCapacity: 'J/mol/K',
  molarVolume: 'm^3/mol',
  volume: 'm^3',
  mass: 'kg',
  density: 'kg/m^3',
  heatTransferPerVolume: 'W/m^3/K',
  number: null,
};

type UnitOf = (value: number, unit: string) => { toNumber(unit: string): number };
let engine: UnitOf | null = null;

/**
 * Load mathjs, which knows the units beyond our table. Costly (some 100 ms), so only done where
 * `needsUnitEngine` says that a text uses such a unit; the synchronous parser then finds it here.
 */
export async function loadUnitEngine(): Promise<void> {
  if (engine !== null) return;
  const { create, unitDependencies } = await import('mathjs');
  const math = create(unitDependencies, {});
  engine = (value, unit) => math.unit?.(value, unit) as ReturnType<UnitOf>;
}

/** The factor of a unit from mathjs; undefined where it is not loaded, or does not know or fit the unit. */
export function engineFactor(unit: string, dimension: Dimension): UnitFactor | undefined {
  const target = targets[dimension];
  if (engine === null || target === null || !isUnitText(unit)) return undefined;
  try {
    const factor = engine(1, unit).toNumber(target);
    return Number.isFinite(factor) && factor > 0 ? { factor, offset: 0 } : undefined;
  } catch {
    return undefined; // mathjs throws on every unit it does not know or cannot convert
  }
}

/** True for text that can be a unit at all: keeps the engine from running over arbitrary text. */
export function isUnitText(text: string): boolean {
  return text.length <= 40 && /^[A-Za-z][A-Za-z0-9*/^() .-]*$/.test(text) && !/[/*^]{2}/.test(text);
}
