import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readFlowsheet } from '../src/flowsheet/read.ts';
import type { Flowsheet } from '../src/model/flowsheet.ts';

export const FOLDER = 'flowsheets';
export const AMMONIA = join(FOLDER, 'ammonia-loop.yaml');
export const REFERENCE = join(FOLDER, 'reference-loop.yaml');

/** File names of the flowsheets that come with the program. */
export function shippedFiles(): string[] {
  return readdirSync(FOLDER)
    .filter((name) => name.endsWith('.yaml'))
    .map((name) => join(FOLDER, name));
}

export async function openShipped(file: string): Promise<Flowsheet> {
  const { flowsheet, diagnostics } = await readFlowsheet(readFileSync(file, 'utf8'), { file });
  if (!flowsheet) throw new Error(`${file}: ${diagnostics.map((d) => d.what).join(' ')}`);
  return flowsheet;
}
