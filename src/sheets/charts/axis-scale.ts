import { scaleLinear, scaleLog } from 'd3-scale';
import { decimalsOfDigits, decimalsOfStep, type NumberText, pointText } from './number-text.ts';

/** What one axis of a chart shows. */
export interface ChartAxis {
  readonly title: string;
  /** '' where there is none */
  readonly unit: string;
  /** equal ratios take equal room; taken as linear where a value is not above zero */
  readonly log?: boolean;
  readonly text?: NumberText;
}

export interface Tick {
  readonly value: number;
  readonly text: string;
  readonly decimals: number;
}

/** Values to places along an axis. */
export interface AxisScale {
  readonly log: boolean;
  readonly low: number;
  readonly high: number;
  /** 0 at the low end, 1 at the high end */
  share(value: number): number;
  readonly ticks: readonly Tick[];
}

/** Differences smaller than this against the size of the values are what closing leaves open, no shape of a curve. */
const NOISE = 1e-9;

/**
 * A scale over some values. Values that do not differ stand in the middle of a range around them.
 *
 * @param values  those that are not finite are passed over; none at all gives 0 to 1
 * @param wanted  about how many ticks
 * @param tight  ends at the least and the greatest value instead of the next round number
 */
export function createAxisScale(
  { log: logWanted = false, text = pointText }: ChartAxis,
  values: Iterable<number>,
  wanted: number,
  tight = false,
): AxisScale {
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (!Number.isFinite(value)) continue;
    least = Math.min(least, value);
    most = Math.max(most, value);
  }
  if (least > most) [least, most] = [0, 1];
  const size = Math.max(Math.abs(least), Math.abs(most));
  const constant = most - least <= NOISE * size;
  if (constant) {
    const room = size === 0 ? 1 : 0.05 * size;
    const middle = (least + most) / 2;
    [least, most] = [middle - room, middle + room];
  }
  const log = logWanted && least > 0;
  const scale = log ? scaleLog() : scaleLinear();
  scale.domain([least, most]);
  if (!tight || constant) scale.nice(wanted);
  const [low, high] = scale.domain() as [number, number];
  const numbers = tickValues(scale.ticks(wanted), log, low, high, wanted);
  const step = numbers.length > 1 ? Math.abs(numbers[1]! - numbers[0]!) : high - low;
  return {
    log,
    low,
    high,
    share: log
      ? (value) => Math.log(value / low) / Math.log(high / low)
      : (value) => (value - low) / (high - low),
    ticks: numbers.map((value) => {
      const decimals = log ? decimalsOfDigits(value, shortestDigits(value)) : decimalsOfStep(step);
      return { value, text: text(value, decimals), decimals };
    }),
  };
}

/** d3 gives every 1 to 9 of a decade, or nothing on a narrow range: thin them out, or take equal steps. */
function tickValues(
  ticks: readonly number[],
  log: boolean,
  low: number,
  high: number,
  wanted: number,
): readonly number[] {
  if (!log || ticks.length <= wanted + 1) return ticks;
  for (const kept of [[1, 2, 5], [1, 3], [1]]) {
    const left = ticks.filter((tick) => kept.includes(leadingDigit(tick)));
    if (left.length >= 2 && left.length <= wanted + 2) return left;
  }
  const decades = ticks.filter((tick) => leadingDigit(tick) === 1);
  if (decades.length < 2) return scaleLinear([low, high], [0, 1]).ticks(wanted);
  const every = Math.ceil(decades.length / wanted);
  return decades.filter((_, k) => k % every === 0);
}

function leadingDigit(value: number): number {
  return Math.round(value / 10 ** Math.floor(Math.log10(value) + 1e-9));
}

function shortestDigits(value: number): number {
  for (let digits = 1; digits < 6; digits++) {
    if (Math.abs(Number(value.toPrecision(digits)) - value) <= 1e-9 * Math.abs(value)) return digits;
  }
  return 6;
}

/** Title of an axis with its unit in brackets. */
export function axisTitle({ title, unit }: ChartAxis): string {
  return unit === '' ? title : `${title} [${unit}]`;
}
