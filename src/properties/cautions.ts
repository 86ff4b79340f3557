import type { Component } from '../model/component.ts';
import type { LiquidModelName } from '../model/flowsheet.ts';
import type { StreamState } from '../model/stream.ts';
import type { Role } from './component-roles.ts';
import { lnVapourPressure, vapourPressureRange } from './vapour-pressure.ts';

/** A word about a state at which the data are asked for more than they know. */
export interface Caution {
  readonly code: string;
  readonly message: string;
}

/** Henry's law is a limit for little gas in much liquid; above this share a liquid needs a word. @source common practice */
const MUCH_DISSOLVED = 0.2;
/** A component below this mole fraction of the liquid needs no word about its vapour pressure. */
const WORTH_A_WORD = 1e-4;

/**
 * Cautions for a settled stream: a condensable outside the range of its vapour pressure, a condensate below a
 * freezing point, a gas so cold and dense that it would condense on its own, a liquid that is mostly gas.
 */
export function cautionsOf(
  stream: StreamState,
  components: readonly Component[],
  roles: readonly Role[],
  model: LiquidModelName = 'antoine',
): Caution[] {
  const { temperatureK: T, pressurePa: P, flowsMolPerS, liquidMolPerS } = stream;
  let liquid = 0;
  let dissolved = 0;
  let gas = 0;
  for (let i = 0; i < components.length; i++) {
    if (roles[i] === 'solid') continue;
    liquid += liquidMolPerS[i];
    if (roles[i] === 'dissolved') dissolved += liquidMolPerS[i];
    gas += flowsMolPerS[i] - liquidMolPerS[i];
  }
  const muchDissolved = model === 'antoine' && liquid > 0 && dissolved / liquid > MUCH_DISSOLVED;
  return [...(muchDissolved ? [tooMuchGas(dissolved / liquid)] : []), ...components.flatMap(cautionOf)];

  function cautionOf(c: Component, i: number): Caution[] {
    const range = vapourPressureRange(c);
    if (!range || roles[i] === 'solid') return [];
    const share = liquid > 0 ? liquidMolPerS[i] / liquid : 0;
    if (roles[i] === 'condensable' && share > WORTH_A_WORD) {
      if (T < range.fromK - 0.005) {
        return [
          {
            code: 'below-freezing',
            message: `${celsius(T)} is below ${celsius(range.fromK)}, where the vapour pressure of ${c.id} ends (freezing point or end of data); ${model === 'eos' ? '' : 'it was extrapolated, and '}${c.id} may freeze`,
          },
        ];
      }
      if (model === 'antoine' && T > range.toK + 0.01) {
        return [
          {
            code: 'above-critical',
            message: `${celsius(T)} is above ${celsius(range.toK)}, where the vapour pressure of ${c.id} ends; it was extrapolated`,
          },
        ];
      }
    }
    // An equation of state asks for no vapour pressure; the freezing point alone concerns it.
    if (model === 'eos') return [];
    const partial = gas > 0 ? ((flowsMolPerS[i] - liquidMolPerS[i]) / gas) * P : 0;
    const subcritical = T < (c.critical?.temperatureK ?? 0);
    if (roles[i] !== 'condensable' && subcritical && partial > Math.exp(lnVapourPressure(c, T))) {
      return [
        {
          code: 'gas-would-condense',
          message: `${c.id} is taken as a gas, yet its partial pressure of ${(partial / 1e5).toFixed(2)} bar is above its vapour pressure at ${celsius(T)}; name it under condense if it may condense`,
        },
      ];
    }
    return [];
  }
}

function tooMuchGas(share: number): Caution {
  return {
    code: 'much-dissolved',
    message: `${(100 * share).toFixed(0)} % of the liquid is dissolved gas; Henry's law is meant for a few per cent`,
  };
}

function celsius(T: number): string {
  return `${(T - 273.15).toFixed(1)} degC`;
}
