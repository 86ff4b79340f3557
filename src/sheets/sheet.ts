/** What a sheet may say beyond the result itself. */
export interface SheetOptions {
  /** units of the user's own figures by name; '%' shows the fraction times 100 */
  readonly figureUnits?: Readonly<Record<string, string>>;
  /** marks up heads and warnings for a terminal; plain text where absent */
  readonly paint?: Paint;
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
