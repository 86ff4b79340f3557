import type { Component } from '../model/component.ts';
import type { LiquidModelName } from '../model/flowsheet.ts';
import type { StreamState } from '../model/stream.ts';
import type { Role } from './component-roles.ts';
import { henryConstant } from './henry.ts';
import { liquidVolumeRange } from './liquid-volume.ts';
import { vapourPressureRange } from './vapour-pressure.ts';

/** A correlation that a stream asks outside the temperatures it was made for. */
export interface UseOutside {
  readonly code: string;
  /** of what: heat capacity of NH3 */
  readonly correlation: string;
  readonly fromK: number;
  readonly toK: number;
  /** what is computed with instead */
  readonly goesOn: string;
}

/** A component below this mole fraction of its phase changes nothing that is shown. */
const WORTH_A_WORD = 1e-6;
/** Ranges are printed, and met, to so much [K]. */
const ROUNDING_K = 0.01;

/** Every correlation by which a settled stream is computed and whose range does not hold its temperature. */
export function usesOutside(
  stream: StreamState,
  components: readonly Component[],
  roles: readonly Role[],
  model: LiquidModelName,
): UseOutside[] {
  const { temperatureK: T, flowsMolPerS, liquidMolPerS } = stream;
  let total = 0;
  let liquid = 0;
  for (let i = 0; i < components.length; i++) {
    total += flowsMolPerS[i];
    if (roles[i] !== 'solid') liquid += liquidMolPerS[i];
  }
  const present = (amount: number, of: number) => of > 0 && amount / of > WORTH_A_WORD;
  const outside = (range: { readonly fromK: number; readonly toK: number }) =>
    T < range.fromK - ROUNDING_K || T > range.toK + ROUNDING_K;
  const found: UseOutside[] = [];
  components.forEach((c, i) => {
    const heat = heatCapacityRange(c);
    if (heat !== null && present(flowsMolPerS[i], total) && outside(heat)) {
      const goesOn = 'the heat capacity of the end of its range is kept';
      found.push({
        code: 'heat-capacity-out-of-range',
        correlation: `heat capacity of ${c.id}`,
        ...heat,
        goesOn,
      });
    }
    // An equation of state takes its liquid from no correlation.
    if (model === 'eos' || !present(liquidMolPerS[i], liquid)) return;
    if (roles[i] === 'condensable') {
      const pressure = vapourPressureRange(c);
      const volume = liquidVolumeRange(c);
      if (pressure !== null && outside(pressure)) {
        const goesOn = 'ln P goes on linear in 1/T';
        found.push({
          code: 'vapour-pressure-out-of-range',
          correlation: `vapour pressure of ${c.id}`,
          ...pressure,
          goesOn,
        });
      } else if (volume !== null && outside(volume)) {
        const goesOn = 'it goes on smoothly from the end of its range';
        found.push({
          code: 'liquid-volume-out-of-range',
          correlation: `liquid volume of ${c.id}`,
          ...volume,
          goesOn,
        });
      }
      return;
    }
    components.forEach((solvent, j) => {
      const henry = roles[j] === 'condensable' ? henryConstant(solvent.id, c.id) : undefined;
      if (henry === undefined || !present(liquidMolPerS[j], liquid) || !outside(henry)) return;
      const correlation = `Henry constant of ${c.id} in ${solvent.id}`;
      const { fromK, toK } = henry;
      found.push({
        code: 'henry-out-of-range',
        correlation,
        fromK,
        toK,
        goesOn: 'ln H goes on linear in 1/T',
      });
    });
  });
  return found;
}

/** Where the heat capacity of a component is known [K]; null where it has none. */
export function heatCapacityRange(c: Component): { readonly fromK: number; readonly toK: number } | null {
  const [first, last] = [c.idealGas[0], c.idealGas.at(-1)];
  return first === undefined || last === undefined ? null : { fromK: first.fromK, toK: last.toK };
}
