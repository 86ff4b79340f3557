/** One published value and how far ours is from it, in the unit of its row. */
export interface Deviation {
  /** which value, in a few words */
  readonly at: string;
  readonly value: number;
}

/** Deviation in % of the published value. */
export function percent(at: string, ours: number, published: number): Deviation {
  return { at, value: 100 * (ours / published - 1) };
}

/** Deviation in the unit of the value. */
export function difference(at: string, ours: number, published: number): Deviation {
  return { at, value: ours - published };
}

/** Mean of the sizes. */
export function mean(deviations: readonly Deviation[]): number {
  return deviations.reduce((sum, { value }) => sum + Math.abs(value), 0) / deviations.length;
}

/** The deviation of the largest size. */
export function worst(deviations: readonly Deviation[]): Deviation {
  const [first, ...rest] = deviations;
  if (!first) throw new Error('no deviations to choose from');
  return rest.reduce((most, each) => (Math.abs(each.value) > Math.abs(most.value) ? each : most), first);
}

/** A deviation with its sign and one decimal: +1.2, -0.3, 0.0. */
export function signed(value: number): string {
  if (!Number.isFinite(value)) throw new Error(`a deviation of ${value} cannot be printed`);
  const digits = Math.abs(value).toFixed(1);
  if (Number(digits) === 0) return digits;
  return `${value < 0 ? '-' : '+'}${digits}`;
}

/** A size with about two digits; what is rounding of the arithmetic is not spelt out. */
export function size(value: number): string {
  if (!Number.isFinite(value)) throw new Error(`a deviation of ${value} cannot be printed`);
  const bare = Math.abs(value);
  if (bare < NOTHING) return `< ${NOTHING}`;
  return bare.toFixed(bare >= 1 ? 1 : bare >= 0.1 ? 2 : 3);
}

/** The same with its sign. */
export function signedSize(value: number): string {
  const bare = size(value);
  if (bare.startsWith('<')) return bare;
  return `${value < 0 ? '-' : '+'}${bare}`;
}

/** Below this a deviation is not told apart from none. */
export const NOTHING = 0.001;

/** A Markdown table; all columns but those named stand to the right. */
export function table(
  head: readonly string[],
  rows: readonly (readonly string[])[],
  left: readonly number[],
) {
  const line = (cells: readonly string[]) => `| ${cells.join(' | ')} |`;
  const rule = head.map((_, column) => (left.includes(column) ? '---' : '--:'));
  return [line(head), line(rule), ...rows.map(line)].join('\n');
}
