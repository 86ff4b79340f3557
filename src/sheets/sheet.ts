import type { Diagnostic } from '../diagnostics/diagnostic.ts';

/** What a sheet may say beyond the result itself. */
export interface SheetOptions {
  /** units of the user's own figures by name; '%' shows the fraction times 100 */
  readonly figureUnits?: Readonly<Record<string, string>>;
  /** marks up heads and warnings for a terminal; plain text where absent */
  readonly paint?: Paint;
  /** why the loop did not close, which the sheet then begins with */
  readonly diagnosis?: Diagnostic | null;
  /** adds the table of passes */
  readonly trace?: boolean;
  /** version of Looptally, said on the sheet */
  readonly version?: string;
}

export interface Paint {
  head(text: string): string;
  alarm(text: string): string;
}

export const noPaint: Paint = { head: (text) => text, alarm: (text) => text };

/** The diagnosis of a loop that did not close, as label and sentence. */
export function diagnosisRows({ diagnosis }: SheetOptions): readonly (readonly [string, string])[] {
  if (diagnosis === undefined || diagnosis === null) return [];
  const { what, why, mend } = diagnosis;
  return [
    ['what', what],
    ['why', why],
    ['mend', mend],
  ];
}
