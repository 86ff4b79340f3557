import { createHash } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { buildLive } from '../../../scripts/build.mjs';
import { pageOf } from '../../live/browser.ts';
import { shipped, shippedText } from '../../tally/shipped.ts';

const LARGEST_BYTES = 2.5e6;
let script = '';

beforeAll(async () => {
  const folder = mkdtempSync(join(tmpdir(), 'looptally-live-'));
  await buildLive(folder);
  script = readFileSync(join(folder, 'live.js'), 'utf8');
  rmSync(folder, { recursive: true, force: true });
}, 120_000);

test('the script of the page brings no unit engine, no layout engine and nothing that evaluates text', () => {
  expect(script.length).toBeLessThan(1.2e6);
  expect(script).not.toMatch(/\beval\(|elkjs|org\.eclipse|createUnit/);
});

const sections = [
  'loop',
  'warnings',
  'diagram',
  'streams',
  'ledger',
  'trade-offs',
  'blocks',
  'figures',
  'settings',
  'passes',
  'assumptions',
  'sources',
  'cautions',
];

test.each(shipped)(
  'the page of %s is whole, small, asks for nothing and lets only its own script run',
  async (name) => {
    const page = await pageOf(name, shippedText(name), script);
    expect(Buffer.byteLength(page)).toBeLessThan(LARGEST_BYTES);
    const found = [...page.matchAll(/<section id="([a-z-]+)"/g)].map(([, id]) => id!);
    expect(sections.filter((id) => !found.includes(id) && id !== 'trade-offs')).toEqual([]);
    const [head] = page.split('<script>');
    expect(head).not.toMatch(/ style="| on[a-z]+="|<link|<iframe|src=|@import|url\((?!#)/);
    const shaOf = (text: string) => createHash('sha256').update(text).digest('base64');
    const [, inline] = /<script>([\s\S]*)<\/script>/.exec(page)!;
    expect(page).toContain(`script-src 'sha256-${shaOf(inline!)}'`);
    const ids = [...head!.matchAll(/ id="([^"]*)"/g)].map(([, id]) => id!);
    expect(ids.filter((id, k) => ids.indexOf(id) !== k)).toEqual([]);
  },
);

test('without the script the page stands still: no panel, no script, all numbers', async () => {
  const page = await pageOf('reference-loop.yaml', shippedText('reference-loop.yaml'), null);
  expect(page).toContain(`script-src 'none'`);
  expect(page).not.toMatch(/<script|<aside/);
  expect(page).toContain('450.00');
});

test('a file without handles says so in its page', async () => {
  const page = await pageOf('ammonia-three-beds.yaml', shippedText('ammonia-three-beds.yaml'), script);
  expect(page).toContain('The file names no handles; these were chosen');
});
