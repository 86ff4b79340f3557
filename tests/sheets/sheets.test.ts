import { describe, expect, test } from 'vitest';
import type { Result } from '../../src/model/result.ts';
import { csvCell, csvSheet } from '../../src/sheets/csv.ts';
import { markdownSheet } from '../../src/sheets/markdown.ts';
import { renderers } from '../../src/sheets/renderers.ts';
import { textSheet } from '../../src/sheets/text.ts';
import { traceText } from '../../src/sheets/trace.ts';
import { closeShipped } from './closed.ts';
import { exampleResult } from './example-result.ts';

const options = { figureUnits: { hydrogen_slip: '%', 'reactor outlet': 'degC' } };

describe('the sheet of a closed loop', () => {
  test('as text is what was agreed', async () => {
    await expect(textSheet(exampleResult, { ...options, trace: true })).toMatchFileSnapshot(
      '__golden__/example.txt',
    );
  });

  test('as Markdown is what was agreed', async () => {
    await expect(markdownSheet(exampleResult, options)).toMatchFileSnapshot('__golden__/example.md');
  });

  test.each(['streams', 'ledger', 'figures'] as const)(
    'as CSV of the %s is what was agreed',
    async (table) => {
      await expect(csvSheet(exampleResult, table, options)).toMatchFileSnapshot(
        `__golden__/example.${table}.csv`,
      );
    },
  );

  test('tells the story of the loop before its streams', () => {
    const text = textSheet(exampleResult);
    expect(text.indexOf('Goes round')).toBeLessThan(text.indexOf('Streams'));
    expect(text.indexOf('Purge')).toBeLessThan(text.indexOf('Streams'));
  });

  test('keeps within a hundred characters', () => {
    for (const line of textSheet(exampleResult, { trace: true }).split('\n'))
      expect([...line].length).toBeLessThanOrEqual(100);
  });

  test('does not depend on when or how often it is made', async () => {
    const { result, flowsheet } = await closeShipped('conversion-loop.yaml');
    for (const { render } of renderers.values())
      expect(await render(result, { flowsheet })).toEqual(await render(result, { flowsheet }));
  });
});

describe('a loop that did not close', () => {
  const open: Result = {
    ...exampleResult,
    convergence: { ...exampleResult.convergence, converged: false, passes: 200 },
  };

  test('says so at the head of every sheet for reading', () => {
    const words =
      'after 200 passes (anderson, residual 1.2e-11, tear S8): what follows is the last pass, not an answer';
    expect(textSheet(open).split('\n')[3]).toBe(`NOT CLOSED ${words}`);
    expect(markdownSheet(open).split('\n')[2]).toContain(`NOT CLOSED ${words}`);
    expect(csvSheet(open, 'figures')).toContain('closed,,no,');
  });

  test('and why, and what would help, before any number', () => {
    const where = { file: 'loop.yaml', line: 3, column: 1, length: 2 };
    const words = { what: 'argon piles up in S2.', why: 'it has *no* way out', mend: 'add a purge' };
    const diagnosis = { code: 'no-way-out', severity: 'error', where, ...words } as const;
    const text = textSheet(open, { diagnosis }).split('\n');
    expect(text.slice(4, 7)).toEqual([
      '  what: argon piles up in S2.',
      '  why:  it has *no* way out',
      '  mend: add a purge',
    ]);
    const lines = markdownSheet(open, { diagnosis }).split('\n');
    expect(lines.slice(4, 7)).toEqual([
      '- **what:** argon piles up in S2.',
      '- **why:** it has \\*no\\* way out',
      '- **mend:** add a purge',
    ]);
    expect(lines[8]).toBe('## The loop');
    expect(textSheet(exampleResult, { diagnosis: null })).toBe(textSheet(exampleResult));
  });
});

describe("the user's own words on a sheet", () => {
  const hostile: Result = {
    ...exampleResult,
    title: 'a\u001b[31mb\u0007\u202ec\nd | <script>alert(1)</script> `x` [l](u)',
    case: '=cmd()',
    assumptions: ['\u009b31mred'],
    streams: { '=1+1': exampleResult.streams['S1']! },
  };

  test('cannot steer a terminal', () => {
    // biome-ignore lint/suspicious/noControlCharactersInRegex: exactly those must be gone
    expect(textSheet(hostile)).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202e]/);
    expect(textSheet(hostile).split('\n')[0]).toBe('a[31mbc d | <script>alert(1)</script> `x` [l](u)');
  });

  test('are no markup in Markdown', () => {
    expect(markdownSheet(hostile).split('\n')[0]).toBe(
      '# a\\[31mbc d \\| &lt;script&gt;alert(1)&lt;/script&gt; \\`x\\` \\[l\\](u)',
    );
  });

  test('are no formula in a spreadsheet', () => {
    expect(csvSheet(hostile).split('\r\n')[1]).toMatch(/^'=1\+1,makeup,mixer,/);
    expect(csvCell('@SUM(A1)')).toBe("'@SUM(A1)");
    expect(csvCell('-5')).toBe("'-5");
    expect(csvCell('\t=1+1')).toBe("'=1+1");
    expect(csvCell('\r\n+1')).toBe("'+1");
    expect(csvCell('\uff1d1+1')).toBe("'\uff1d1+1");
    expect(csvCell(-5)).toBe('-5');
    expect(csvCell('say "hi", you')).toBe('"say ""hi"", you"');
    expect(csvCell(Number.NaN)).toBe('');
    expect(csvCell(-0)).toBe('0');
  });
});

describe('the table of passes', () => {
  test('says so when there was nothing to close', () => {
    expect(traceText([])).toBe('no passes to show: nothing had to be closed\n');
  });

  test('says what the passes were that it does not list', () => {
    const at = (...passes: number[]) =>
      traceText(passes.map((pass) => ({ pass, residual: 0.1, worst: 'S8.H2', method: 'newton', note: '' })));
    expect(at(1, 2, 3)).toMatch(/^ +pass/);
    expect(at(2, 3)).toMatch(/^ {2}Pass 1 went through from the feeds[^\n]*\n +pass/);
    expect(at(3, 4, 5, 3, 4)).toMatch(/^ {2}Passes 1 and 2 went [^\n]*\n +pass/);
    expect(at(4, 5, 10)).toMatch(/^ {2}Passes 1 to 3 went [^\n]*to start\. Where numbers are left out/);
  });
});
