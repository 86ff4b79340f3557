import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { figure, pageDocument } from '../../../src/sheets/page/document.ts';
import { escapeHtml, html } from '../../../src/sheets/page/html.ts';
import { sha256Base64 } from '../../../src/sheets/page/sha256.ts';
import { numberCell, table, textCell } from '../../../src/sheets/page/tables.ts';

const sha = (text: string) => createHash('sha256').update(text, 'utf8').digest('base64');
const page = (more = {}) =>
  pageDocument({ title: 'A loop', document: 'calculation sheet', job: [], sections: [], ...more });

test('the hash of a text is that of the platform, at every length around a block', () => {
  for (const length of [0, 1, 55, 56, 63, 64, 65, 119, 120, 1000]) {
    expect(sha256Base64('x'.repeat(length))).toBe(sha('x'.repeat(length)));
  }
  fc.assert(
    fc.property(fc.string({ unit: 'grapheme', maxLength: 200 }), (text) => {
      expect(sha256Base64(text)).toBe(sha(text));
    }),
  );
});

test('the policy of a page names its one style and its one script by their hashes, and no other way to run', () => {
  const text = page({ script: 'document.title = "moved";', style: '.own{color:red}' });
  const policy = /Content-Security-Policy" content="([^"]*)"/.exec(text)![1]!;
  const style = /<style>([\s\S]*?)<\/style>/.exec(text)![1]!;
  const script = /<script>([\s\S]*?)<\/script>/.exec(text)![1]!;
  expect(policy).toContain(`style-src 'sha256-${sha(style)}'`);
  expect(policy).toContain(`script-src 'sha256-${sha(script)}'`);
  expect(policy).toContain(`default-src 'none'`);
  expect(policy).not.toMatch(/unsafe|https?:|\*/);
  expect(page()).toContain(`script-src 'none'`);
});

test('a script that would end its own element is refused', () => {
  expect(() => page({ script: 'const a = "</script>";' })).toThrow('would end its element');
  expect(() => page({ script: 'const a = "<!-- ";' })).toThrow('would end its element');
  expect(() => page({ style: '</style>' })).toThrow('would end its element');
});

test('whatever a title, a cell, a label or the data hold, no element and no attribute comes of it', () => {
  const hostile = fc.oneof(
    fc.string({ unit: 'binary', maxLength: 60 }),
    fc.constantFrom('</title><script>alert(1)</script>', '"><img src=x onerror=alert(1)>', '<!-- ', '\u202e'),
  );
  const elements = (text: string) =>
    [...text.matchAll(/<[a-z!/][^>]*>/g)].map(([tag]) => tag.split(/[ >]/)[0]);
  const made = (text: string) =>
    page({
      title: text,
      sections: [
        {
          id: 'one',
          heading: text,
          html: html`${table({ caption: text, heads: [{ text }], rows: [[textCell(text), numberCell('1.5')]] })}${figure('<svg></svg>', text, text)}`,
        },
      ],
      data: { text },
    });
  const plain = elements(made('plain'));
  fc.assert(
    fc.property(hostile, (text) => {
      expect(elements(made(text))).toEqual(plain);
    }),
    { numRuns: 300 },
  );
});

test('the data of a page come back as they were', () => {
  const data = { text: '</script><!-- \u2028 "quoted" é' };
  const text = /id="looptally-data">([\s\S]*?)<\/script>/.exec(page({ data }))![1]!;
  expect(JSON.parse(text)).toEqual(data);
});

test('marks that turn the direction of writing are taken out and letters of every script stay', () => {
  expect(escapeHtml('a\u202eb שלום <b>')).toBe('ab שלום &lt;b&gt;');
});
