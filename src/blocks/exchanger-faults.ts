import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import type { BlockFault } from './block.ts';
import type { ClosestApproach } from './counter-current.ts';
import type { DutyLimit } from './duty-limit.ts';
import type { ExchangerSettings } from './exchanger.ts';

/** Curves that cross by less than this are taken as touching: rounding [K]. */
const TOUCHING_K = 1e-6;
/** Heat wanted and heat moved that differ by less than this share are the same. */
const SAME_HEAT = 1e-9;

interface Outcome {
  readonly wantedW: number;
  readonly movedW: number;
  readonly closest: ClosestApproach;
}

/** What makes a closed exchanger another one than was asked for; empty when it does as its settings say. */
export function exchangerFaults(
  setting: ExchangerSettings,
  inlets: { readonly hot: StreamState; readonly cold: StreamState },
  outcome: Outcome,
  limit: DutyLimit,
): BlockFault[] {
  const fault = faultOf(setting, inlets, outcome, limit);
  return fault ? [{ ...fault, path: [settingOf(setting)] }] : [];
}

function faultOf(
  setting: ExchangerSettings,
  { hot, cold }: { readonly hot: StreamState; readonly cold: StreamState },
  { wantedW, movedW, closest }: Outcome,
  limit: DutyLimit,
): BlockFault | null {
  const same = SAME_HEAT * (Math.abs(hot.enthalpyW) + Math.abs(cold.enthalpyW));
  const inletsK = hot.temperatureK - cold.temperatureK;
  if (isEmpty(hot) && isEmpty(cold)) return null;
  if (setting.approach !== undefined) {
    return inletsK < setting.approach ? inletsTooClose(setting.approach, hot, cold) : null;
  }
  if (wantedW < -same) return wrongWay(setting, hot, cold);
  const fallsShort = wantedW > movedW + same;
  if (!fallsShort && (movedW <= same || closest.differenceK >= -TOUCHING_K)) return null;
  if (isEmpty(hot) || isEmpty(cold)) return nothingFlows(isEmpty(hot) ? 'hot' : 'cold', wantedW);
  if (inletsK <= 0) return coldIsHotter(hot, cold);
  return crossing(setting, hot, cold, wantedW, limit);
}

function settingOf(setting: ExchangerSettings): 'cold_temperature' | 'hot_temperature' | 'duty' | 'approach' {
  if (setting.cold_temperature !== undefined) return 'cold_temperature';
  if (setting.hot_temperature !== undefined) return 'hot_temperature';
  return setting.duty !== undefined ? 'duty' : 'approach';
}

function crossing(
  setting: ExchangerSettings,
  hot: StreamState,
  cold: StreamState,
  wantedW: number,
  limit: DutyLimit,
): BlockFault {
  const mostW = limit.heatAtApproach(0);
  const most = limit.moved(mostW);
  const remedy = {
    cold_temperature: `set cold_temperature well below ${celsius(most.coldOutK)}`,
    hot_temperature: `set hot_temperature well above ${celsius(most.hotOutK)}`,
    duty: `set duty well below ${kW(mostW)}`,
    approach: 'raise approach',
  }[settingOf(setting)];
  return {
    code: 'temperature-cross',
    what: `To move ${kW(wantedW)} the streams would have to cross: ${whereCrossed(hot, cold, wantedW, limit)}.`,
    why: `heat flows from hot to cold only, and between hot entering at ${celsius(hot.temperatureK)} and cold entering at ${celsius(cold.temperatureK)} that is less than ${kW(mostW)}`,
    mend: `${remedy}, where no difference would be left, or set approach and let the heat follow, or bring in more or hotter gas on the hot side`,
  };
}

/** Where the curves cross furthest, with both temperatures. */
function whereCrossed(hot: StreamState, cold: StreamState, wantedW: number, limit: DutyLimit): string {
  try {
    const { share, hotK, coldK } = limit.moved(wantedW).closest;
    const where =
      share === 0
        ? 'at the cold end'
        : share === 1
          ? 'at the hot end'
          : `inside, at ${(100 * share).toFixed(0)} % of the heat counted from the cold end,`;
    return `${where} hot would be at ${celsius(hotK)} and cold at ${celsius(coldK)}`;
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
    return `hot enters at ${celsius(hot.temperatureK)}, cold at ${celsius(cold.temperatureK)}, and no temperature holds so much heat`;
  }
}

function coldIsHotter(hot: StreamState, cold: StreamState): BlockFault {
  return {
    code: 'temperature-cross',
    what: `Hot enters at ${celsius(hot.temperatureK)} and cold at ${celsius(cold.temperatureK)}.`,
    why: 'heat flows from hot to cold only, and here the stream called cold is no colder',
    mend: 'exchange the ports hot and cold, or take the exchanger out',
  };
}

function wrongWay(setting: ExchangerSettings, hot: StreamState, cold: StreamState): BlockFault {
  const isCold = setting.cold_temperature !== undefined;
  const inlet = isCold ? cold : hot;
  const name = isCold ? 'cold' : 'hot';
  const wanted = isCold ? setting.cold_temperature! : setting.hot_temperature!;
  return {
    code: 'heat-runs-back',
    what: `The ${name} side enters at ${celsius(inlet.temperatureK)} and should leave at ${celsius(wanted)}.`,
    why: `the cold side of an exchanger can only take heat up, the hot side only give it off`,
    mend: `set ${name}_temperature ${isCold ? 'above' : 'below'} ${celsius(inlet.temperatureK)}, or take the exchanger out`,
  };
}

function inletsTooClose(approachK: number, hot: StreamState, cold: StreamState): BlockFault {
  return {
    code: 'approach-out-of-reach',
    what: `Hot enters at ${celsius(hot.temperatureK)} and cold at ${celsius(cold.temperatureK)}: an approach of ${approachK.toFixed(1)} K cannot be kept.`,
    why: 'the closest approach is at most the difference between the two inlets',
    mend: 'lower the approach, bring in a hotter or colder stream, or take the exchanger out',
  };
}

function nothingFlows(side: 'hot' | 'cold', wantedW: number): BlockFault {
  return {
    code: 'temperature-cross',
    what: `${kW(wantedW)} are to be moved, and nothing flows on the ${side} side.`,
    why: 'a side without flow neither gives off nor takes up heat',
    mend: `lead a stream through the ${side} side, or take the exchanger out`,
  };
}

function isEmpty(stream: StreamState): boolean {
  return stream.flowsMolPerS.every((flow) => flow === 0);
}

function celsius(kelvin: number): string {
  return `${(kelvin - 273.15).toFixed(1)} degC`;
}

function kW(watts: number): string {
  return `${Number((watts / 1e3).toPrecision(5))} kW`;
}
