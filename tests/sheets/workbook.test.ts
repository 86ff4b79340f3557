import { describe, expect, test } from 'vitest';
import { randomFlowsheet } from '../../bench/random-flowsheet.ts';
import { isWithoutPower } from '../../src/sheets/no-power.ts';
import { bookOf, workbook } from '../../src/sheets/workbook.ts';
import { workbookBytes } from '../../src/sheets/xlsx-file.ts';
import type { Page } from '../../src/sheets/xlsx-model.ts';
import { createNames } from '../../src/sheets/xlsx-names.ts';
import { agreed, constant, over } from '../../src/sheets/xlsx-term.ts';
import { shipped } from '../tally/shipped.ts';
import { type Closed, closeShipped, closeText } from './closed.ts';
import { createEvaluator } from './evaluate-formulas.ts';
import { elements, type ReadBook, readWorkbook } from './read-workbook.ts';

function read({ result, flowsheet }: Closed, version?: string): ReadBook {
  return readWorkbook(workbook(result, flowsheet, version === undefined ? {} : { version }));
}

/** What stands in the column of a head, in the row that begins with some words. */
function find({ cells }: ReadBook, sheet: string, head: string, ...row: string[]): string {
  const inSheet = [...cells].filter(([at]) => at.startsWith(`${sheet}!`));
  const column = inSheet.find(([, { text }]) => text === head)?.[0].match(/![A-Z]+/)?.[0];
  const line = inSheet.find(
    ([at, { text }]) =>
      /!A\d+$/.test(at) &&
      text === row[0] &&
      row.slice(1).every((word, k) => cells.get(at.replace('!A', `!${'BC'[k]}`))?.text === word),
  )?.[0];
  if (!column || !line) throw new Error(`${sheet} has no ${head} of ${row.join(', ')}`);
  return sheet + column + line.match(/\d+$/)![0];
}

const loop = await closeShipped('ammonia-loop.yaml');

describe.each(shipped)('the workbook of %s', async (name) => {
  const closed = await closeShipped(name);
  const book = read(closed);
  const { result } = closed;
  const { cell, name: named } = createEvaluator(book);

  test('shows beside every formula what the formula gives', () => expectLive(book));

  test('works out the closures and totals of the result again', () => {
    const closures = new Map([
      ['mass', result.closure.mass],
      ['energy', result.closure.energy],
      ...Object.entries(result.closure.atoms).map(([e, value]) => [`atoms ${e}`, value] as const),
    ]);
    for (const [what, expected] of closures)
      expect(Math.abs(cell(find(book, 'Closure', 'closure, relative', what)) - expected)).toBeLessThan(1e-12);
    for (const [id, entry] of Object.entries(result.ledger)) {
      const at = (head: string) => cell(find(book, 'Ledger', head, id, 'kmol/h'));
      near(at('in'), entry.in);
      near(at('out, all'), sum(Object.values(entry.out)));
      expect(Math.abs(at('closure, relative') - entry.closure)).toBeLessThan(1e-12);
    }
    const entries = Object.values(result.ledger);
    near(cell(find(book, 'Ledger', 'in', 'total', 'kmol/h')), sum(entries.map((entry) => entry.in)));
    near(cell(find(book, 'Ledger', 'formed', 'total', 'kmol/h')), sum(entries.map((entry) => entry.formed)));
  });

  test('works out flows and key figures of the result again, by their names', () => {
    for (const [tag, stream] of Object.entries(result.streams)) {
      near(named(`flow_${tag}`), stream.flow_kmol_h);
      near(named(`mass_${tag}`), stream.mass_kg_h);
    }
    const { figures } = result;
    const numbers: [string, number | null | undefined][] = [
      ['recycle_ratio', figures.recycle_ratio],
      ['overall_yield', figures.overall_yield?.value],
      ['production_t_d', figures.production_t_d],
      ['purge_flow', figures.purge?.flow_kmol_h],
      ['purge_per_feed', figures.purge?.fraction_of_makeup],
      ['purge_heating_value', figures.purge?.lhv_MW],
      ['power_total', figures.power_kW['total']],
      ['specific_power', isWithoutPower(figures) ? null : figures.specific_power_kWh_t],
      ...Object.entries(figures.inerts).map(([b, value]) => [`inerts_${b}`, value] as [string, number]),
      ...Object.entries(figures.overall_conversion).map(
        ([id, value]) => [`overall_conversion_${id}`, value] as [string, number],
      ),
    ];
    for (const [name, value] of numbers) {
      if (typeof value === 'number') near(named(name), value);
      else expect(book.names.has(name)).toBe(false);
    }
  });

  test('is the same whenever it is made', () => {
    const zone = process.env['TZ'];
    const bytes = ['UTC', 'Asia/Tokyo', 'America/New_York'].map((TZ) => {
      process.env['TZ'] = TZ;
      return workbook(result, closed.flowsheet);
    });
    if (zone === undefined) delete process.env['TZ'];
    else process.env['TZ'] = zone;
    expect(bytes[1]).toEqual(bytes[0]);
    expect(bytes[2]).toEqual(bytes[0]);
  });
});

// Whatever the flowsheet, writing it throws where a formula does not give the number of the result.
test.each([
  { blocks: 10, recycles: 1, seed: 3 },
  { blocks: 30, recycles: 3, seed: 1 },
  { blocks: 60, recycles: 5, seed: 2 },
  { blocks: 200, recycles: 20, seed: 1 },
])('the workbook of a random flowsheet of $blocks blocks gives its numbers again', async (wanted) => {
  const closed = await closeText(randomFlowsheet(wanted));
  const book = read(closed);
  expectLive(book);
  expect(book.cells.get('Figures!C7')!.value).toBeGreaterThan(0);
});

describe('a workbook', () => {
  const book = read(loop, '1.2.3');

  test('follows a changed flow through totals, ledger, closures and figures', () => {
    const at = find(book, 'Streams', 'S1', 'Ar');
    const cells = new Map(book.cells).set(at, { value: 1e3, text: null, formula: null });
    const before = createEvaluator(book);
    const after = createEvaluator({ cells, names: book.names });
    const more = 1e3 - book.cells.get(at)!.value!;
    near(after.name('flow_S1') - before.name('flow_S1'), more, 1e-8);
    near(after.name('recycle_ratio'), after.name('flow_S10') / after.name('flow_S1'));
    near(
      after.cell(find(book, 'Ledger', 'closure, relative', 'Ar', 'kmol/h')),
      more / 1e3 + before.cell(find(book, 'Ledger', 'closure, relative', 'Ar', 'kmol/h')),
    );
    expect(after.cell(find(book, 'Closure', 'closure, relative', 'atoms Ar'))).toBeGreaterThan(0.9);
    expect(after.cell(find(book, 'Closure', 'closure, relative', 'mass'))).toBeGreaterThan(0.1);
  });

  test('has its sheets under names that every spreadsheet takes', () => {
    const names = [...book.sheets.keys()];
    expect(names).toEqual([
      'Figures',
      'Streams',
      'Ledger',
      'Closure',
      'Blocks',
      'Settings',
      'Assumptions',
      'Sources',
      'Components',
      'Trace',
      'Warnings',
    ]);
    for (const name of names) expect(name).toMatch(/^[A-Za-z]{1,31}$/);
  });

  test.each([...book.sheets])('says on the sheet %s what it is and what it is not', (name, xml) => {
    const head = [1, 2, 3, 4].map((row) => book.cells.get(`${name}!A${row}`)!.text);
    expect(head).toEqual([
      'Ammonia loop, 1,000 t/d',
      expect.stringMatching(/^Case: as in the file; closed in \d+ passes \(auto, residual .*, tear S10\)\.$/),
      expect.stringMatching(
        /^Looptally 1\.2\.3\. A study tool, not a design certificate\. Hydrogen, ammonia,/,
      ),
      'No warnings.',
    ]);
    expect(xml).toContain('<oddFooter>&amp;LA study tool, not a design certificate');
  });

  test('is set up for A3, landscape, one page wide, with heads in sight and on every page', () => {
    for (const xml of book.sheets.values()) {
      expect(xml).toContain('<pageSetUpPr fitToPage="1"/>');
      expect(elements(xml, 'pageSetup').map(({ attributes }) => attributes)).toEqual([
        { paperSize: '8', orientation: 'landscape', fitToWidth: '1', fitToHeight: '0' },
      ]);
    }
    expect(elements(book.sheets.get('Streams')!, 'pane')[0]!.attributes).toEqual({
      xSplit: '2',
      ySplit: '6',
      topLeftCell: 'C7',
      activePane: 'bottomRight',
      state: 'frozen',
    });
    expect(book.printTitles[1]).toBe('Streams!A:B,Streams!1:6');
    expect(book.printTitles).toHaveLength(book.sheets.size);
    expect(book.cells.get('Streams!A6')!.text).toBe('stream');
  });

  test('gives the stream table its units, whatever is asked for', () => {
    const heads = [...book.cells].flatMap(([at, { text }]) => (/^Streams!A/.test(at) && text ? [text] : []));
    expect(heads).toEqual(
      expect.arrayContaining([
        'temperature',
        'pressure',
        'phase',
        'flow',
        'mass',
        'normal volume (0 degC, 1.01325 bar)',
        'enthalpy',
        'density',
        'mole flows, kmol/h',
        'composition, mol %',
        'mass flows, kg/h',
        'composition, mass %',
      ]),
    );
    const units = [...book.cells].flatMap(([at, { text }]) => (/^Streams!B/.test(at) ? [text] : []));
    expect(new Set(units)).toEqual(
      new Set([
        null,
        'unit',
        'degC',
        'bar',
        'mol/mol',
        'kmol/h',
        'kg/h',
        'Nm3/h',
        'kW',
        'kW/K',
        'kg/m3',
        'mol %',
        'mass %',
      ]),
    );
  });

  test('lists settings with value and unit, assumptions, sources and passes', () => {
    expect(book.cells.get(find(book, 'Settings', 'value', 'condenser.temperature'))!.value).toBe(-8);
    expect(book.cells.get(find(book, 'Settings', 'unit', 'condenser.temperature'))!.text).toBe('degC');
    expect(book.cells.get(find(book, 'Settings', 'value', 'gas'))!.text).toBe('srk');
    const column = (sheet: string, letter: string) =>
      [...book.cells]
        .flatMap(([at, cell]) => (at.startsWith(`${sheet}!${letter}`) ? [cell] : []))
        .slice(letter === 'A' ? 5 : 1);
    expect(column('Assumptions', 'A').map(({ text }) => text)).toEqual(loop.result.assumptions);
    expect(column('Trace', 'B').map(({ value }) => value)).toEqual(
      loop.result.convergence.history.map(({ residual }) => residual),
    );
    expect(column('Sources', 'C').length).toBeGreaterThan(10);
  });

  test('names cells by valid names, none twice, each to one cell', () => {
    const names = [...book.names.keys()];
    expect(names).toContain('flow_S2');
    for (const [name, reference] of book.names) {
      expect(name).toMatch(/^[a-z]+_\w+$/);
      expect(book.cells.get(reference)?.value).not.toBeNull();
    }
    const twice = createNames();
    const made = ['flow_s1', 'flow_S1', `flow_${'x'.repeat(300)}`, `flow_${'x'.repeat(400)}`].map(
      (name) => twice.define(name, constant(1)).formula,
    );
    expect(made.slice(0, 2)).toEqual(['flow_s1', 'flow_S1_2']);
    expect(new Set(made.map((name) => name.toLowerCase())).size).toBe(4);
    for (const name of made) expect(name.length).toBeLessThanOrEqual(255);
  });

  test('says when an aim was missed, and where the setting ended', async () => {
    const aimed = await closeText(AIMED);
    const said = read(aimed);
    expect(said.cells.get('Figures!A4')!.text).toMatch(/^Aims NOT REACHED: cap\./);
    expect(said.cells.get(find(said, 'Settings', 'remark', 'purge.fractions.bleed'))!.text).toBe(
      'moved by the aim cap',
    );
    near(said.cells.get(find(said, 'Settings', 'value', 'purge.fractions.bleed'))!.value!, 20, 1e-6);
  });

  test('refuses a formula that gives another number than the result', () => {
    expect(() => agreed(over(constant(1), constant(3)), 0.3334)).toThrow(
      'the formula 1/3 gives 0.3333333333333333 where the result has 0.3334',
    );
  });
});

describe("the user's own words in a workbook", () => {
  const words = [
    '=1+1',
    '+cmd|calc!A1',
    '-2+3',
    '@SUM(A1)',
    '\t=1+1',
    '\r=1+1',
    '\uff1d1+1',
    '<c><f>1</f></c>&amp;"\'',
    '_x0041_',
    'a\u0000b\u001b[31m\u0008\ufffe\uffff\ud800c\ud83d\ude00',
    `x${'\ud83d\ude00'.repeat(20_000)}`,
  ];
  const hostile = {
    ...loop.result,
    title: words[0]!,
    case: words[1]!,
    warnings: words.map((message) => ({ code: message, where: message, message })),
    assumptions: words,
    aims: Object.fromEntries(
      words.map((word) => [
        word,
        {
          reached: false,
          setting: word,
          value: 1,
          unit: word,
          target: 1,
          until: word,
          achieved: 1,
          note: word,
        },
      ]),
    ),
  };
  const book = readWorkbook(workbook(hostile, loop.flowsheet, { version: '=1' }));

  test('are text, never formulas', () => {
    const plain = readWorkbook(workbook(loop.result, loop.flowsheet));
    const formulas = ({ cells }: ReadBook) => [...cells.values()].flatMap(({ formula }) => formula ?? []);
    expect(formulas(book)).toEqual(formulas(plain));
    const shown = [7, 8, 9, 10, 11, 12, 13].map((row) => book.cells.get(`Assumptions!A${row}`)!.text);
    expect(shown).toEqual(['=1+1', '+cmd|calc!A1', '-2+3', '@SUM(A1)', '=1+1', '=1+1', '\uff1d1+1']);
    expect(book.cells.get('Assumptions!A14')!.text).toBe(words[7]);
    expect(book.cells.get('Assumptions!A15')!.text).toBe('_x0041_');
  });

  test('stay text when a reader edits their cell', () => {
    const styles = elements(book.parts['xl/styles.xml']!.match(/<cellXfs.*<\/cellXfs>/s)![0], 'xf');
    const cells = elements(book.sheets.get('Assumptions')!, 'c');
    const style = cells.find(({ attributes }) => attributes['r'] === 'A7')!.attributes['s'];
    expect(styles[Number(style)]!.attributes['quotePrefix']).toBe('1');
  });

  test('lose what XML cannot hold and end where a cell ends', () => {
    expect(book.cells.get('Assumptions!A16')!.text).toBe('ab[31m\ufffdc\ud83d\ude00');
    const long = book.cells.get('Assumptions!A17')!.text!;
    expect(long.length).toBeLessThanOrEqual(32_767);
    expect(long.length).toBeGreaterThan(32_700);
    expect(long.endsWith('\ud83d\ude00 ... (cut: a cell holds no more)')).toBe(true);
  });
});

test('columns beyond Z have two letters', () => {
  const page: Page = {
    name: 'Wide',
    widths: [10],
    rows: [Array.from({ length: 705 }, (_, k) => ({ value: k }))],
    heights: new Map(),
    merged: [0],
    frozenRows: 1,
    frozenColumns: 0,
  };
  const { cells } = readWorkbook(workbookBytes({ pages: [page], names: new Map() }));
  expect([25, 26, 701, 702].map((k) => [...cells.keys()][k])).toEqual([
    'Wide!Z1',
    'Wide!AA1',
    'Wide!ZZ1',
    'Wide!AAA1',
  ]);
});

test('a book can be looked at without its bytes', () => {
  const { pages, names } = bookOf(loop.result, loop.flowsheet);
  expect(pages.map(({ rows }) => rows.length).every((count) => count > 6)).toBe(true);
  expect(names.get('fresh_feed')).toBe('Figures!C7');
});

/** Every formula gives the value beside it. */
function expectLive(book: ReadBook): void {
  const { cell } = createEvaluator(book);
  const live = [...book.cells].filter(([, { formula }]) => formula !== null);
  expect(live.length).toBeGreaterThan(100);
  for (const [at, { value }] of live) {
    // What is left open is the noise of large numbers: kmol/h, kg/h or kW, all below 1e7 here.
    const noise = /^(Ledger|Closure)!/.test(at) ? 1e-7 : 0;
    expect(Math.abs(cell(at) - value!), at).toBeLessThanOrEqual(1e-9 * Math.abs(value!) + noise);
  }
}

function near(value: number, expected: number, relative = 1e-9): void {
  expect(Math.abs(value - expected), `${value} is not ${expected}`).toBeLessThanOrEqual(
    relative * Math.abs(expected),
  );
}

function sum(values: readonly number[]): number {
  return values.reduce((all, value) => all + value, 0);
}

const AIMED = `
looptally: 1
title: out of reach
components: [H2, N2, NH3, Ar]
reactions: {synthesis: N2 + 3 H2 <=> 2 NH3}
feeds:
  makeup: {flow: 1000 kmol/h, temperature: 35 degC, pressure: 200 bar, composition: {H2: 74.2, N2: 24.7, Ar: 1.1}}
blocks:
  mixer: {kind: mixer}
  converter: {kind: reactor, reactions: {synthesis: {approach: 10 K}}, temperature: 450 degC}
  condenser: {kind: condenser, temperature: -5 degC}
  purge: {kind: splitter, fractions: {bleed: 3 %}}
  circulator: {kind: compressor, pressure: 200 bar}
streams:
  S1: makeup -> mixer
  S2: mixer -> converter
  S3: converter -> condenser
  S4: condenser.gas -> purge
  S5: condenser.liquid -> out
  S6: purge.bleed -> out
  S7: purge.rest -> circulator
  S8: circulator -> mixer
aims:
  cap: {move: purge.fractions.bleed, between: [1 %, 20 %], until: streams.S2.y.Ar = 0.1 %}
`;
