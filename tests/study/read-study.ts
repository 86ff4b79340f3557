import { readFileSync } from 'node:fs';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Flowsheet, Formula } from '../../src/model/flowsheet.ts';
import { compileFormula } from '../../src/units/formula.ts';

/** A shipped flowsheet, with settings changed. */
export async function shipped(name: string, set: readonly string[] = []): Promise<Flowsheet> {
  const text = readFileSync(new URL(`../../flowsheets/${name}.yaml`, import.meta.url), 'utf8');
  return flowsheetOf(text, set);
}

/** A shipped flowsheet with sections added at its end. */
export async function shippedWith(name: string, sections: string): Promise<Flowsheet> {
  const text = readFileSync(new URL(`../../flowsheets/${name}.yaml`, import.meta.url), 'utf8');
  return flowsheetOf(`${text}\n${sections}`);
}

export async function flowsheetOf(text: string, set: readonly string[] = []): Promise<Flowsheet> {
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'study.yaml', set });
  if (flowsheet === null) throw new Error(diagnostics.map((d) => d.what).join('\n'));
  return flowsheet;
}

export function formula(text: string): Formula {
  const compiled = compileFormula(text, ['streams', 'blocks', 'figures']);
  if (!compiled.ok) throw new Error(compiled.what);
  return { text, evaluate: compiled.evaluate };
}
