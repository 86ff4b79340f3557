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
