import type { Handle } from '../../model/flowsheet.ts';

/** A value in SI as a number in the unit of its handle, without the last digits that the way through SI has cost. */
export function numberOf({ scale }: Handle, value: number): number {
  return Number((value / scale.factor - scale.offset).toPrecision(10));
}

/** The number at a place of the slider, 0 at its lower end, in the unit of the handle. */
export function numberAt(handle: Handle, place: number): number {
  const [low, high] = handle.between.map((end) => numberOf(handle, end)) as [number, number];
  return Number((low + ((high - low) * place) / (handle.places - 1)).toPrecision(10));
}

/** The place of the slider next to a value in SI. */
export function placeOf({ between: [low, high], places }: Handle, value: number): number {
  const share = Math.min(1, Math.max(0, (value - low) / (high - low)));
  return Math.round(share * (places - 1));
}

/** A number with its unit as a file writes it: -10 degC, 2.5 %. */
export function withUnit(number: number, { unit }: Handle): string {
  return `${number} ${unit}`.trimEnd();
}

/** A path as words that may break behind its dots. */
export function pathWords(path: string): string {
  return path.replaceAll('_', ' ');
}
