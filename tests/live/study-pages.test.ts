import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Page } from 'playwright-core';
import { describe, expect, test } from 'vitest';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import { comparePage } from '../../src/sheets/study-page/compare-page.ts';
import { optimisePage } from '../../src/sheets/study-page/optimise-page.ts';
import type { StudyPageOptions } from '../../src/sheets/study-page/study-document.ts';
import { sweepPage } from '../../src/sheets/study-page/sweep-page.ts';
import { uncertaintyPage } from '../../src/sheets/study-page/uncertainty-page.ts';
import { compare } from '../../src/study/compare.ts';
import { optimise } from '../../src/study/optimise.ts';
import { sweepOfStudy } from '../../src/study/swept-table.ts';
import { uncertainty } from '../../src/study/uncertainty.ts';
import { readPage } from '../sheets/study-page/page-checks.ts';
import { flowsheetOf, formula } from '../study/read-study.ts';
import { shippedText } from '../tally/shipped.ts';
import { noBrowser } from './browser.ts';
import { studyBench } from './study-bench.ts';

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** A loop that closes at once, with a study, an objective with a limit, spreads and a case. */
const text = `${shippedText('conversion-loop.yaml')}
study:
  over:
    purge.fractions.bleed: 1 %..8 %:8
    converter.reactions.synthesis.conversion: 15 %..30 %:4
  record: [figures.recycle_ratio, figures.production_t_d]
  note: ['The recycle is least at {purge.fractions.bleed at least figures.recycle_ratio}.']
objective: {minimise: figures.recycle_ratio, move: {purge.fractions.bleed: 1 %..10 %}, limits: [streams.S2.y.Ar > 5 %]}
spreads: {purge.fractions.bleed: {kind: uniform, low: 2 %, high: 6 %}}
cases: {small purge: {purge.fractions.bleed: 1 %}}
`;

function swept(flowsheet: Flowsheet, options: StudyPageOptions): string {
  const { swept: table, lines } = sweepOfStudy(flowsheet, 400)!;
  const heads = [
    ...table.axes.map(({ path, unit }) => `${path} [${unit}]`),
    ...table.record,
    'converged',
    'passes',
    'note',
  ];
  return sweepPage({ flowsheet, swept: table, heads, reading: lines, addedLimits: [] }, options);
}

describe.skipIf(noBrowser !== '')(`pages of studies in the browser${noBrowser}`, async () => {
  const { open, options, complaints } = studyBench();
  const flowsheet = await flowsheetOf(text);
  const line = await flowsheetOf(text.replace(/ {4}converter\.reactions.*\n/, ''));
  const writers: readonly [string, () => string][] = [
    ['a sweep over one setting', () => swept(line, options())],
    ['a sweep over two settings', () => swept(flowsheet, options())],
    [
      'a comparison',
      () =>
        comparePage(
          compare([
            { name: 'as in the file', flowsheet },
            { name: 'line', flowsheet: line },
          ]),
          options(),
        ),
    ],
    ['an optimum', () => optimisePage(optimise(flowsheet, flowsheet.objective!, { starts: 1 }), options())],
    [
      'an uncertainty',
      () =>
        uncertaintyPage(
          uncertainty(flowsheet, {
            samples: 32,
            seed: 1,
            method: 'sobol',
            shares: 'rank',
            percentiles: [5, 50, 95],
            record: [formula('figures.recycle_ratio')],
          }),
          options(),
        ),
    ],
  ];

  test.each(writers)(
    '%s opens from disk, can be used by all, saved as a table and printed',
    async (_, write) => {
      const html = write();
      for (const colorScheme of ['light', 'dark'] as const) {
        const page = await open(html, { viewport: { width: 390, height: 800 }, colorScheme });
        expect(await faultsIn(page)).toEqual([]);
        expect(await page.evaluate('document.documentElement.scrollWidth <= innerWidth')).toBe(true);
        await page.context().close();
      }
      const page = await open(html, { viewport: { width: 1280, height: 900 } });
      const [download] = await Promise.all([
        page.waitForEvent('download'),
        page.getByRole('button', { name: 'Download study.csv' }).click(),
      ]);
      expect(download.suggestedFilename()).toBe('study.csv');
      expect(readFileSync(await download.path(), 'utf8')).toBe(readPage(html).csv.text);
      expect((await page.pdf({ format: 'A4' })).subarray(0, 5).toString()).toBe('%PDF-');
      await page.context().close();
      expect(complaints).toEqual([]);
    },
  );

  test('a chart of lines tells the value under the pointer, and the arrow keys go along the line', async () => {
    const page = await open(swept(line, options()), { viewport: { width: 1280, height: 900 } });
    const figure = page.locator('.chart-figure').first();
    const value = figure.locator('.value');
    await figure.locator('.points path').nth(3).hover();
    expect(await value.textContent()).toMatch(
      /^figures\.recycle_ratio 2\.78\d* at purge\.fractions\.bleed 4 %$/,
    );
    await figure.locator('.picture').focus();
    await page.keyboard.press('ArrowRight');
    expect(await value.textContent()).toMatch(/at purge\.fractions\.bleed 5 %$/);
    await page.keyboard.press('Tab');
    expect(await value.textContent()).toBe('');
    await page.context().close();
  });

  test('a contour chart tells figure and both settings of the nearest case', async () => {
    const page = await open(swept(flowsheet, options()), { viewport: { width: 1280, height: 900 } });
    const figure = page.locator('.chart-figure').first();
    await figure.locator('.picture').focus();
    for (const key of ['ArrowRight', 'ArrowRight', 'ArrowUp']) await page.keyboard.press(key);
    expect(await figure.locator('.value').textContent()).toMatch(
      /^figures\.recycle_ratio [\d.]+ at converter\.reactions\.synthesis\.conversion 20 %, purge\.fractions\.bleed 2 %$/,
    );
    await page.context().close();
  });

  test('numbers stand as the reader writes them, and the page can be read without its script', async () => {
    const html = swept(line, options());
    const german = await open(html, { locale: 'de-DE' });
    expect(await german.locator('#table td.r').nth(1).textContent()).toMatch(/^\d+,\d+$/);
    await german.context().close();
    const still = await open(html, { javaScriptEnabled: false });
    expect(await still.getByText('The recycle is least at 8 % (an end of the range).').count()).toBe(1);
    expect(await still.getByRole('button').count()).toBe(0);
    expect(await still.locator('svg').count()).toBe(3);
    await still.context().close();
  });

  test('a hostile title runs nothing', async () => {
    const title =
      '</title><img src=x onerror="document.title=\'broken\'"><script>document.title="broken"</script>';
    const page = await open(swept({ ...line, title }, options()));
    expect(await page.locator('h1').textContent()).toBe(title);
    expect(await page.title()).toBe(title);
    expect(complaints).toEqual([]);
    await page.context().close();
  });
});

/** What keeps somebody from using a page, as far as a program can tell. */
async function faultsIn(page: Page): Promise<string[]> {
  // The page's own policy lets nothing in from outside; what a test brings comes past it.
  await page.evaluate(axe);
  const found = (await page.evaluate('axe.run()')) as {
    violations: { id: string; nodes: { html: string }[] }[];
  };
  return found.violations.map(
    ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 200)).join('; ')}`,
  );
}
