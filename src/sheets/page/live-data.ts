import { chosenHandles } from '../../flowsheet/chosen-handles.ts';
import { numericSettings } from '../../flowsheet/numeric-settings.ts';
import type { Flowsheet, Handle } from '../../model/flowsheet.ts';

/** What the script finds in #looptally-data. */
export interface LiveData {
  readonly file: string;
  readonly text: string;
  readonly case: string | null;
  readonly set: readonly string[];
}

/** The handles of a flowsheet: those that its file names, else some that are chosen. */
export function handlesOf(flowsheet: Flowsheet): readonly Handle[] {
  return flowsheet.handles.length > 0 ? flowsheet.handles : chosenHandles(flowsheet);
}

/** Where handles stand in a flowsheet [SI]. */
export function standing(flowsheet: Flowsheet, handles: readonly Handle[]): Map<string, number> {
  const paths = new Set(handles.map(({ path }) => path));
  return new Map(
    numericSettings(flowsheet).flatMap(({ path, value }) => (paths.has(path) ? [[path, value]] : [])),
  );
}
