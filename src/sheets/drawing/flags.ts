import type { StreamResult } from '../../model/result.ts';
import { fixed, significant } from '../numbers.ts';
import { type PlacedText, type Point, rectangle, SMALL, THIN_LINE, text } from './svg.ts';
import { textWidth } from './text-width.ts';

/** The flag at a stream: its tag in a frame, under it temperature, pressure and flow. */
export interface Flag {
  readonly width: number;
  readonly height: number;
  draw(at: Point): { readonly svg: string; readonly texts: readonly PlacedText[] };
}

const TAG_WIDTH = 90;
const ROW = 11;
const TAG_ROW = 14;

/**
 * What stands under the tag of a flag.
 *
 * @param decimals  of all pressures of a drawing, so that 200.0 does not stand beside 20.00
 */
export function flagRows(state: StreamResult, decimals: number): readonly string[] {
  return [
    `${fixed(state.temperature_K - 273.15, 1, 1e-9)} °C`,
    `${state.pressure_bar.toFixed(decimals)} bar`,
    `${flowText(state.flow_kmol_h)} kmol/h`,
  ];
}

export function flagOf(tag: string, state: StreamResult, decimals: number): Flag {
  const rows = flagRows(state, decimals);
  const head = text(tag, 4, 10, { bold: true, width: TAG_WIDTH });
  const frame = head.box.width + 8;
  return {
    width: Math.max(frame, ...rows.map((row) => textWidth(row, SMALL))) + 2,
    height: TAG_ROW + ROW * rows.length,
    draw({ x, y }) {
      const texts = [
        text(tag, x + 4, y + 10, { bold: true, width: TAG_WIDTH }),
        ...rows.map((row, k) => text(row, x, y + TAG_ROW + 9 + ROW * k)),
      ];
      return { svg: rectangle({ x, y, width: frame, height: TAG_ROW - 1 }, THIN_LINE), texts };
    },
  };
}

/** Decimals that give the lowest of some pressures [bar] three figures, one at least and four at most. */
export function pressureDecimals(pressures: readonly number[]): number {
  const lowest = Math.min(...pressures.filter((pressure) => pressure > 0));
  return Number.isFinite(lowest) ? Math.min(4, Math.max(1, 2 - Math.floor(Math.log10(lowest) + 1e-9))) : 1;
}

/** Four figures, and no decimals where there are more before the point. */
function flowText(flow: number): string {
  return Math.abs(flow) >= 1000 && Math.abs(flow) < 1e9 ? flow.toFixed(0) : significant(flow, 4);
}
