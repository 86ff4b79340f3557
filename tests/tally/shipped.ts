import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const folder = fileURLToPath(new URL('../../flowsheets/', import.meta.url));

/** File names of the flowsheets that come with Looptally. */
export const shipped: readonly string[] = readdirSync(folder)
  .filter((name) => name.endsWith('.yaml'))
  .sort();

/** Text of a shipped flowsheet. */
export function shippedText(name: string): string {
  return readFileSync(`${folder}${name}`, 'utf8');
}

/** The same without what `optimise` is asked: a setting that an objective moves can have no aim. */
export function textWithoutObjective(name: string): string {
  return shippedText(name).replace(/^(?:prices|objective):.*\n(?:[ \t]+.*\n|\n)*/gm, '');
}
