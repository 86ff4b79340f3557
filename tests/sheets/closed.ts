import type { Flowsheet } from '../../src/model/flowsheet.ts';
import type { Result } from '../../src/model/result.ts';
import { balance } from '../../src/tally/balance.ts';
import { read } from '../tally/read.ts';
import { shippedText } from '../tally/shipped.ts';

export interface Closed {
  readonly flowsheet: Flowsheet;
  readonly result: Result;
}

/** A flowsheet as text, closed. */
export async function closeText(text: string): Promise<Closed> {
  const flowsheet = await read(text);
  return { flowsheet, result: balance(flowsheet).result };
}

/** A shipped flowsheet by the name of its file, closed. */
export function closeShipped(file: string): Promise<Closed> {
  return closeText(shippedText(file));
}
