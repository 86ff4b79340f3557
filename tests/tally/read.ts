import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';

/** A flowsheet from YAML text; fails with the findings when there are any. */
export async function read(
  text: string,
  options: { readonly set?: readonly string[]; readonly case?: string } = {},
): Promise<Flowsheet> {
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'loop.yaml', ...options });
  if (!flowsheet) throw new Error(diagnostics.map((d) => `${d.code}: ${d.what}`).join('\n'));
  return flowsheet;
}
