import { describe, expect, test } from 'vitest';
import { formulaRoots } from '../../../src/flowsheet/formula-scope.ts';
import type { Flowsheet, Formula } from '../../../src/model/flowsheet.ts';
import { compareCsv } from '../../../src/sheets/compare-tables.ts';
import { optimiseCsv } from '../../../src/sheets/optimise-tables.ts';
import { comparePage } from '../../../src/sheets/study-page/compare-page.ts';
import { optimisePage } from '../../../src/sheets/study-page/optimise-page.ts';
import { uncertaintyPage } from '../../../src/sheets/study-page/uncertainty-page.ts';
import { uncertaintyCsv } from '../../../src/sheets/uncertainty-csv.ts';
import { compare } from '../../../src/study/compare.ts';
import { optimise } from '../../../src/study/optimise.ts';
import { uncertainty } from '../../../src/study/uncertainty.ts';
import { compileFormula } from '../../../src/units/formula.ts';
import { flowsheetOf, shipped } from '../../study/read-study.ts';
import { read } from '../../tally/read.ts';
import { shippedText } from '../../tally/shipped.ts';
import { HOSTILE, readPage } from './page-checks.ts';

const options = { version: '1.2.3', script: '', csvName: 'study.csv' };

/** Nothing of a hostile text may become an element; the texts go where a user writes them. */
function expectText(html: string): void {
  const { elements } = readPage(html);
  expect(elements).not.toContain('img');
  expect(elements).not.toContain('script');
  expect(html.match(/<script/g)).toHaveLength(1);
  expect(html.includes('\u202e')).toBe(false);
}

function hostile(flowsheet: Flowsheet, evil: string): Flowsheet {
  return { ...flowsheet, title: evil, file: evil, caseName: evil };
}

describe('a comparison', async () => {
  const text = shippedText('ammonia-loop.yaml');
  const found = compare([
    { name: 'as in the file', flowsheet: await read(text) },
    { name: 'cold condenser', flowsheet: await read(text, { case: 'cold condenser' }) },
  ]);
  const page = readPage(comparePage(found, options));

  test('begins with the settings that differ, marked by more than colour', () => {
    expect(page.headings).toEqual([
      'What is compared',
      'Settings that differ',
      'What that does to the figures',
      'Data and use',
    ]);
    expect(page.text).toContain('condenser.temperature -8.0 degC ≠ -25.0 degC');
    expect(page.text).toMatch(/recycle_ratio 3\.1778 3\.0720 ▼ -0\.106 -3\.33/);
    expect(page.text).toMatch(/power_kW\.refrigeration kW [\d.]+ [\d.]+ ▲ \+/);
  });

  test('holds its table', () => {
    expect(page.csv).toEqual({ name: 'study.csv', text: compareCsv(found) });
  });

  test('names the dangers of what is compared, and no others', () => {
    for (const words of ['Nelson curves', 'Ammonia is toxic', 'Reduced catalyst'])
      expect(page.text).toContain(words);
    for (const words of ['Carbon monoxide is toxic', 'Sulphur oxides'])
      expect(page.text).not.toContain(words);
  });

  test('says in words which column did not close', () => {
    const [first, second] = found.columns as [(typeof found.columns)[0], (typeof found.columns)[0]];
    const open = { ...found, columns: [first, { ...second, closed: false }] };
    expect(readPage(comparePage(open, options)).text).toContain('Not closed: 1 of 2 columns hold no answer.');
  });

  test.each(HOSTILE)('takes any name as text: %#', (evil) => {
    const columns = found.columns.map((column) => ({
      ...column,
      name: evil,
      flowsheet: hostile(column.flowsheet, evil),
    }));
    const figures = found.figures.map((row) => ({ ...row, figure: evil }));
    expectText(comparePage({ ...found, columns, figures }, options));
  });
});

describe('an optimum', async () => {
  const found = optimise(await shipped('methanol-optimum'), (await shipped('methanol-optimum')).objective!, {
    starts: 1,
  });
  const page = readPage(optimisePage(found, options));

  test('is told with what holds it, and drawn over each of its settings', () => {
    expect(page.headings.slice(0, 4)).toEqual(['Answer', 'Around the best case', 'Settings', 'Limits']);
    expect(page.text).toMatch(/Maximise profit: 9150\.\d EUR\/h, all limits kept/);
    expect(page.text).toContain('1 point more is worth');
    expect(page.elements.filter((name) => name === 'svg')).toHaveLength(2);
    expect(page.text).toContain('Hatched: a limit does not hold.');
    expect(page.csv.text).toBe(optimiseCsv(found));
  });

  test.each(HOSTILE)('takes any name as text: %#', (evil) => {
    const objective = {
      goals: found.objective.goals.map((goal) => ({ ...goal, text: evil, unit: evil })),
      moves: found.objective.moves.map((move) => ({ ...move, path: evil, unit: 'K' })),
      limits: found.objective.limits.map((limit) => ({ ...limit, text: evil })),
    };
    expectText(optimisePage({ ...found, objective, flowsheet: hostile(found.flowsheet, evil) }, options));
  });
});

test('a trade-off is drawn as one goal against the other, with the settings along it', async () => {
  const text = shippedText('methanation.yaml').replace(/\nobjective:[\s\S]*$/, '\n');
  const flowsheet = await flowsheetOf(
    `${text}\nobjective: {minimise: figures.power_kW.total, maximise: streams.S8.y.CH4, move: {divider.fractions.product: 5 %..40 %}}\n`,
  );
  const found = optimise(flowsheet, flowsheet.objective!, { starts: 1, points: 4 });
  const page = readPage(optimisePage(found, options));
  expect(found.front.length).toBeGreaterThan(2);
  expect(page.headings.slice(0, 2)).toEqual(['Answer', 'The trade-off']);
  expect(page.text).toContain('streams.S8.y.CH4 against figures.power_kW.total');
  expect(page.text).toContain('divider.fractions.product along the trade-off');
  expect(page.csv.text).toBe(optimiseCsv(found));
});

describe('an uncertainty', async () => {
  const record = ['figures.recycle_ratio', 'figures.overall_yield.value'].map((text): Formula => {
    const compiled = compileFormula(text, formulaRoots);
    if (!compiled.ok) throw new Error(compiled.what);
    return { text, evaluate: compiled.evaluate };
  });
  const asked = { samples: 32, seed: 1, method: 'sobol', percentiles: [5, 50, 95], record } as const;
  const found = uncertainty(await shipped('ammonia-uncertain'), { ...asked, shares: 'rank' });
  const page = readPage(uncertaintyPage(found, options));

  test('is told by percentiles, curves of the share of cases below, and bars of what each figure follows', () => {
    expect(page.headings).toEqual([
      'What was spread',
      'What becomes of the figures',
      'Share of cases below a value',
      'What each figure follows: share of the variance of its ranks',
      'Data and use',
    ]);
    expect(page.text).toContain('32 samples of 8 spreads');
    expect(page.elements.filter((name) => name === 'svg')).toHaveLength(4);
    expect(page.text).toMatch(/5 % 50 % 95 % cases/);
    expect(page.csv.text).toBe(uncertaintyCsv(found));
  });

  test('says how many cases have no part in it', () => {
    const failures = [{ reason: 'not closed in 200 passes', count: 3, first: 7 }];
    const text = readPage(uncertaintyPage({ ...found, failed: 3, failures }, options)).text;
    expect(text).toContain('Not all closed: 3 of 32 cases have no part in the numbers below.');
    expect(text).toContain('3 cases, first in sample 7: not closed in 200 passes');
  });

  test('draws nothing of a figure without a value', () => {
    const figures = found.figures.map((figure, f) => (f === 0 ? { ...figure, summary: null } : figure));
    const { elements } = readPage(uncertaintyPage({ ...found, figures }, options));
    expect(elements.filter((name) => name === 'svg')).toHaveLength(2);
  });

  test.each(HOSTILE)('takes any name as text: %#', (evil) => {
    const figures = found.figures.map((figure) => ({ ...figure, expression: evil }));
    const spreads = found.spreads.map((one) => ({ ...one, spread: { ...one.spread, path: evil } }));
    const failures = [{ reason: evil, count: 1, first: 1 }];
    const flowsheet = hostile(found.flowsheet, evil);
    expectText(uncertaintyPage({ ...found, figures, spreads, failures, failed: 1, flowsheet }, options));
  });
});
