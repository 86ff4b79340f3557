import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { formatDiagnostics } from '../../src/diagnostics/format.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';

const folder = new URL('broken/', import.meta.url);
const files = readdirSync(folder).filter((name) => name.endsWith('.yaml'));

test.each(files)('%s is refused with its whole message', async (name) => {
  const text = readFileSync(new URL(name, folder), 'utf8');
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: name });
  expect(flowsheet).toBeNull();
  expect(diagnostics.length).toBeGreaterThan(0);
  const message = formatDiagnostics(diagnostics, { texts: { [name]: text } });
  await expect(`${message}\n`).toMatchFileSnapshot(`broken/${name.replace(/yaml$/, 'txt')}`);
});

test('there are broken files of every kind', () => {
  expect(files.length).toBeGreaterThanOrEqual(40);
});
