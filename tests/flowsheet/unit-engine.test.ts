import { readdirSync, readFileSync } from 'node:fs';
import { afterEach, expect, test, vi } from 'vitest';
import { readFlowsheet } from '../../src/flowsheet/read.ts';

const loaded = vi.hoisted(() => ({ times: 0 }));
vi.mock('mathjs', async (original) => {
  loaded.times++;
  return original();
});
afterEach(() => {
  loaded.times = 0;
});
const folder = new URL('../../flowsheets/', import.meta.url);

// It costs more than all the rest of a balance; prices and ranges are read without it.
test('no shipped flowsheet loads mathjs', async () => {
  for (const name of readdirSync(folder)) {
    const { flowsheet } = await readFlowsheet(readFileSync(new URL(name, folder), 'utf8'), { file: name });
    expect(flowsheet).not.toBeNull();
  }
  expect(loaded.times).toBe(0);
});

test('a unit beyond the table does, in a range too', async () => {
  const text = readFileSync(new URL('reference-loop.yaml', folder), 'utf8');
  const { flowsheet, diagnostics } = await readFlowsheet(text, {
    file: 'loop.yaml',
    set: ['makeup.pressure=210000 cmH2O'],
  });
  expect(diagnostics).toEqual([]);
  expect(flowsheet).not.toBeNull();
  expect(loaded.times).toBe(1);
});
