import { expect, test } from 'vitest';
import { renderers } from '../../src/sheets/renderers.ts';
import { textSheet } from '../../src/sheets/text.ts';
import { bookOf } from '../../src/sheets/workbook.ts';
import { closeShipped } from './closed.ts';

/** A page without its tags and the chances to break a name. */
async function pageWords(file: string): Promise<string> {
  const { result, flowsheet } = await closeShipped(file);
  const page = String(await renderers.get('.html')!.render(result, { flowsheet }));
  return page
    .replace(/<wbr>/g, '')
    .replace(/<[^>]*>/g, ' ')
    .replace(/\s+/g, ' ');
}

test('a loop without machines has no power on any sheet, not one of nought', async () => {
  const { result, flowsheet } = await closeShipped('conversion-loop.yaml');
  expect(textSheet(result)).toMatch(/ Power +none\n/);
  expect(textSheet(result)).not.toContain('kWh per t');
  const words = await pageWords('conversion-loop.yaml');
  for (const name of ['specific_power_kWh_t', 'power_kW.total']) expect(words).toContain(` ${name} none `);
  expect(bookOf(result, flowsheet).names.has('specific_power')).toBe(false);
});

test('a loop with machines has numbers', async () => {
  const { result, flowsheet } = await closeShipped('reference-loop.yaml');
  expect(textSheet(result)).toMatch(/ Specific power +\d/);
  expect(await pageWords('reference-loop.yaml')).toMatch(/ specific_power_kWh_t [\d.]+ kWh\/t /);
  expect(bookOf(result, flowsheet).names.has('specific_power')).toBe(true);
});
