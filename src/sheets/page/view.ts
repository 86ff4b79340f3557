import type { Flowsheet } from '../../model/flowsheet.ts';
import type { Result } from '../../model/result.ts';
import type { TradeOff } from '../../study/trade-off.ts';
import type { NumberText } from '../charts/number-text.ts';
import { figureUnits } from '../figure-units.ts';
import type { SheetOptions } from '../sheet.ts';
import type { Html } from './html.ts';
import type { NumberWords } from './tables.ts';

/** What the sections of a calculation sheet are made of. */
export interface PageView {
  readonly result: Result;
  /** the flowsheet that was closed */
  readonly flowsheet: Flowsheet;
  /** as it stands in the file, where settings have been moved in the page since */
  readonly asInFile: Flowsheet;
  /** where the handles of the page stand now, by their paths [SI] */
  readonly at: ReadonlyMap<string, number>;
  readonly tradeOffs: readonly TradeOff[];
  /** how numbers are shown */
  readonly words: NumberWords;
  /** the same for the axes of charts */
  readonly axisText: NumberText;
}

/** A numbered section of the sheet. */
export interface PagePart {
  readonly id: string;
  readonly heading: string;
  /** null where there is nothing of the kind */
  render(view: PageView): Html | null;
  readonly newSheet?: boolean;
  /** what it shows are figures of the closed loop, which are worth nothing where it did not close */
  readonly figures: boolean;
}

/** What the text renderers need to know besides the result. */
export function sheetOptions({ flowsheet }: PageView): SheetOptions {
  return { figureUnits: figureUnits(flowsheet) };
}
