import { unzipSync } from 'fflate';
import { describe, expect, test } from 'vitest';
import { dangersOf } from '../../src/sheets/cautions.ts';
import { renderers } from '../../src/sheets/renderers.ts';
import { textSheet } from '../../src/sheets/text.ts';
import { closeShipped } from './closed.ts';

const about = async (file: string) => dangersOf((await closeShipped(file)).result).join('\n');

describe('the dangers told are those of what is there', () => {
  test('ammonia: hydrogen, ammonia, pressure, catalyst', async () => {
    const words = await about('reference-loop.yaml');
    for (const word of ['Nelson curves', 'Ammonia is toxic', 'bar holds the energy', 'Reduced catalyst'])
      expect(words).toContain(word);
    for (const word of ['Carbon monoxide', 'Sulphur', 'nitrogen are']) expect(words).not.toContain(word);
  });

  test('methanol: carbon monoxide, carbonyls, metal dusting, a flame that is not seen', async () => {
    const words = await about('methanol-loop.yaml');
    for (const word of ['carbonyls', 'turn metal to dust', 'methanol is toxic', 'Hydrogen'])
      expect(words).toContain(word);
    expect(words).not.toContain('Ammonia');
  });

  test('the front end of nitric acid: its oxides, oxygen beside ammonia, and no high pressure', async () => {
    const words = await about('nitric-front-end.yaml');
    for (const word of ['Oxides of nitrogen', 'explodes', 'Ammonia']) expect(words).toContain(word);
    for (const word of ['bar holds the energy', 'Carbon monoxide', 'Hydrogen embrittles'])
      expect(words).not.toContain(word);
  });
});

test('every sheet for reading says its version and what it is not; a CSV file stays a table', async () => {
  const { result, flowsheet } = await closeShipped('reference-loop.yaml');
  const sheets = new Map<string, string>([['text', textSheet(result, { version: '1.2.3' })]]);
  for (const [ending, { render }] of renderers) {
    const made = await render(result, { flowsheet, version: '1.2.3' });
    const text =
      typeof made === 'string'
        ? made
        : Object.values(unzipSync(made))
            .map((part) => Buffer.from(part).toString())
            .join('\n');
    sheets.set(ending, text);
  }
  for (const [name, sheet] of sheets) {
    // Lines are broken at widths of their own.
    const words = sheet.replace(/<[^>]*>/g, ' ').replace(/\s+/g, ' ');
    const says = { version: words.includes('1.2.3'), tool: words.includes('not a design certificate') };
    expect({ name, ...says }).toEqual({ name, version: name !== '.csv', tool: name !== '.csv' });
    if (!['.csv', '.svg'].includes(name)) expect(words).toContain('Nelson curves');
  }
});
