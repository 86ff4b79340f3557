import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Page } from 'playwright-core';
import { describe, expect, test } from 'vitest';
import { balance, readFlowsheet } from '../../src/index.ts';
import { figureLeaves } from '../../src/tally/figure-leaves.ts';
import { shippedText } from '../tally/shipped.ts';
import { bench, noBrowser } from './browser.ts';

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
const ammonia = shippedText('ammonia-loop.yaml');
const reference = shippedText('reference-loop.yaml');

describe.skipIf(noBrowser !== '')(`a page in the browser${noBrowser}`, () => {
  const { write, open, complaints } = bench();

  test('opened from disk it closes its loop without a word of complaint and shows the numbers it was written with', async () => {
    const address = await write('ammonia', ammonia);
    const page = await open(address);
    await page.getByText('all as in the file').waitFor();
    expect(await page.locator('[data-part="ledger"] table').first().textContent()).toContain('NH3');
    expectSame(await figuresIn(page), await figuresOf(ammonia, []));
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test('a slider moved closes the loop at once, and at rest the figures are those of balance --set', async () => {
    const page = await open(await write('slider', ammonia));
    const slider = page.getByRole('slider', { name: 'condenser.temperature' });
    const before = await page.locator('[data-part="glance"]').textContent();
    await slide(page, 'condenser.temperature', 20);
    await expect.poll(() => page.locator('[data-part="glance"]').textContent()).not.toBe(before);
    await page.getByText('1 setting is moved').waitFor();
    expect(await slider.getAttribute('aria-valuetext')).toBe('-20 degC');
    expectSame(await figuresIn(page), await figuresOf(ammonia, ['condenser.temperature=-20 degC']));
    expect(await page.locator('[data-job="case"]').textContent()).toBe(
      'as in the file; moved condenser.temperature = -20 degC',
    );
    expect(await page.locator('[data-part="settings"] mark').textContent()).toBe(
      'moved; in the file -8 degC',
    );
    const flag = await page.locator('[data-word="flag-5-1"]').innerHTML();
    expect(flag).toBe('-20.0 °C');
    await page.getByRole('button', { name: 'reset condenser.temperature' }).click();
    await page.getByText('all as in the file').waitFor();
    expectSame(await figuresIn(page), await figuresOf(ammonia, []));
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test('a value is typed as in the file or bare, with comma or point, and what will not do is told beside its field', async () => {
    const page = await open(await write('typed', ammonia));
    const field = page.getByRole('textbox', { name: 'condenser.temperature' });
    await type(page, 'condenser.temperature', '14 degF');
    await page.getByText('1 setting is moved').waitFor();
    expect(await field.inputValue()).toBe('-10');
    await type(page, 'purge.fractions.bleed', '2,75');
    await page.getByText('2 settings are moved').waitFor();
    expectSame(
      await figuresIn(page),
      await figuresOf(ammonia, ['condenser.temperature=14 degF', 'purge.fractions.bleed=2.75 %']),
    );
    const shown = await figuresIn(page);
    await type(page, 'condenser.temperature', '-5 bar');
    const fault = page.getByRole('alert').filter({ hasText: 'is no temperature' });
    await fault.waitFor();
    expect(await fault.textContent()).toContain('why: "bar" is a unit of pressure');
    expect(await field.getAttribute('aria-invalid')).toBe('true');
    expect(await figuresIn(page)).toEqual(shown);
    await type(page, 'condenser.temperature', '3 furlong');
    await page.getByText('the command line knows more').waitFor();
    await field.press('Escape');
    await page.getByText('1 setting is moved').waitFor();
    expect(await field.inputValue()).toBe('-8');
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test('where the loop does not close nothing passes for an answer', async () => {
    const page = await open(await write('open', reference));
    await type(page, 'purge.fractions.bleed', '0');
    await page.getByText('NOT CLOSED with these settings').waitFor();
    expect(await page.locator('#lead').textContent()).toMatch(/why: [\s\S]*mend: /);
    expect(await page.locator('[data-job="status"]').textContent()).toBe('NOT CLOSED');
    for (const part of ['glance', 'loop', 'streams', 'ledger', 'figures'])
      expect(await page.locator(`[data-part="${part}"]`).getAttribute('class')).toContain('void');
    await page.getByRole('button', { name: 'Reset all' }).click();
    await page.getByText('all as in the file').waitFor();
    expect(await page.locator('.void').count()).toBe(0);
    expect(await page.locator('#lead').textContent()).toBe('');
    await page.context().close();
  });

  test('a link opens the page with its settings, and a saved file is the original with its values replaced', async () => {
    const address = await write('round-trip', ammonia);
    const page = await open(
      `${address}#condenser.temperature=-12.5%20degC&purge.fractions.bleed=3%20%25&no.such=1`,
    );
    await page.getByText('The link moves no.such').waitFor();
    const set = ['condenser.temperature=-12.5 degC', 'purge.fractions.bleed=3 %'];
    expectSame(await figuresIn(page), await figuresOf(ammonia, set));
    await slide(page, 'converter.reactions.synthesis.approach', 5);
    await page.getByText('3 settings are moved').waitFor();
    const moved = await figuresIn(page);
    const download = page.waitForEvent('download');
    await page.getByRole('button', { name: 'Save as YAML' }).click();
    const saved = readFileSync(await (await download).path(), 'utf8');
    expect((await download).suggestedFilename()).toBe('round-trip-moved.yaml');
    expect(saved).toContain('temperature: -12.5 degC\n    pressure_drop: 4 bar');
    expect(saved.slice(saved.indexOf('# Ammonia loop')).split('\n')).toHaveLength(ammonia.split('\n').length);
    expectSame(await figuresOf(saved, []), moved);
    const again = await open(page.url());
    await again.getByText('3 settings are moved').waitFor();
    expect(await figuresIn(again)).toEqual(moved);
    expect(complaints).toEqual([]);
    await page.context().close();
    await again.context().close();
  });

  test('numbers are written as the reader of the page does, and the file stays with the point', async () => {
    const page = await open(await write('german', ammonia), { locale: 'de-DE' });
    await page.getByText('all as in the file').waitFor();
    expect(await page.locator('[data-part="loop"]').textContent()).toContain('16.938 kmol/h');
    expect(await page.getByRole('textbox', { name: 'purge.fractions.bleed' }).inputValue()).toBe('2,2');
    await type(page, 'purge.fractions.bleed', '1.234');
    await page.getByText('may mean two numbers').waitFor();
    await type(page, 'purge.fractions.bleed', '2,5 %');
    await page.getByText('1 setting is moved').waitFor();
    expect(decodeURIComponent(page.url())).toContain('#purge.fractions.bleed=2.5 %');
    await page.context().close();
  });

  test('markup in every text of a file is shown as text', async () => {
    const evil =
      '</script><img src=x onerror="document.title=1"><svg onload=alert(1)>&quot;\u05e9\u05dc\u05d5\u05dd';
    const text = reference
      .replace(/^title: .*$/m, `title: ${JSON.stringify(evil)}`)
      .replace(/^notes: .*$/m, `notes: ${JSON.stringify(`${evil} ${'long '.repeat(2000)}`)}`)
      .replace(
        /^handles:/m,
        `figures:\n  ${JSON.stringify('a_b')}: {formula: figures.recycle_ratio, unit: ${JSON.stringify('<b>"x')}}\nhandles:`,
      );
    const page = await open(await write('evil', text));
    await page.getByText('all as in the file').waitFor();
    expect(await page.title()).toContain('<img src=x');
    expect(await page.locator('h1').textContent()).toContain('<img src=x onerror="document.title=1">');
    expect(await page.locator('img, script:not([type]) ~ svg').count()).toBe(0);
    expect(await page.evaluate('document.documentElement.scrollWidth <= window.innerWidth')).toBe(true);
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test('it can be used by keyboard alone', async () => {
    const page = await open(await write('keys', ammonia));
    await page.keyboard.press('Tab');
    expect(await page.evaluate('document.activeElement.textContent')).toBe('To the sheet');
    await page.keyboard.press('Tab');
    await page.keyboard.press('ArrowRight');
    await page.getByText('1 setting is moved').waitFor();
    expect(await page.getByRole('textbox', { name: 'condenser.temperature' }).inputValue()).toBe('-7.5');
    await page.context().close();
  });

  test.each([
    ['light', 1280],
    ['dark', 1280],
    ['light', 390],
    ['dark', 390],
  ] as const)('axe finds nothing amiss in %s at %d', async (colorScheme, width) => {
    const page = await open(await write('axe', reference), { colorScheme, viewport: { width, height: 844 } });
    await slide(page, 'condenser.temperature', 20);
    await type(page, 'purge.fractions.bleed', 'much');
    await page.getByRole('alert').filter({ hasText: 'why:' }).waitFor();
    await page.evaluate(axe);
    const { violations } = (await page.evaluate('axe.run()')) as {
      violations: { id: string; nodes: { html: string }[] }[];
    };
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`)).toEqual([]);
    expect(await page.evaluate('document.documentElement.scrollWidth <= window.innerWidth')).toBe(true);
    await page.context().close();
  });

  test('it prints on A4, the flow diagram on a sheet laid across', async () => {
    const page = await open(await write('print', ammonia));
    await page.getByText('all as in the file').waitFor();
    const pdf = (await page.pdf({ preferCSSPageSize: true })).toString('latin1');
    const boxes = [...pdf.matchAll(/\/MediaBox\s*\[\s*0 0 ([\d.]+) ([\d.]+)/g)].map(([, w, h]) => [
      Math.round(Number(w) / 2.8346),
      Math.round(Number(h) / 2.8346),
    ]);
    expect(boxes.length).toBeGreaterThan(4);
    expect(new Set(boxes.map(String))).toEqual(new Set(['210,297', '297,210']));
    await page.context().close();
  });
});

async function slide(page: Page, path: string, place: number): Promise<void> {
  const slider = page.getByRole('slider', { name: path });
  await slider.evaluate((input, value) => {
    const one = input as unknown as { value: string; dispatchEvent(event: Event): boolean };
    one.value = String(value);
    one.dispatchEvent(new Event('input', { bubbles: true }));
  }, place);
}

async function type(page: Page, path: string, text: string): Promise<void> {
  const field = page.getByRole('textbox', { name: path });
  await field.fill(text);
  await field.press('Enter');
}

/** To 1e-9: engines differ in the last digits of their logarithms. */
function expectSame(found: Record<string, number>, wanted: Record<string, number>): void {
  expect(Object.keys(found)).toEqual(Object.keys(wanted));
  for (const [name, value] of Object.entries(wanted))
    expect(Math.abs(found[name]! - value), name).toBeLessThanOrEqual(1e-9 * Math.abs(value));
}

/** Key figures of the page as it keeps them beside what it shows. */
async function figuresIn(page: Page): Promise<Record<string, number>> {
  const cells = await page.locator('[data-part="figures"] tbody tr').evaluateAll((rows) =>
    (
      rows as unknown as {
        querySelector(s: string): { textContent: string; getAttribute(n: string): string };
      }[]
    ).map(
      (row) =>
        [
          row.querySelector('th').textContent,
          Number(row.querySelector('data').getAttribute('value')),
        ] as const,
    ),
  );
  return Object.fromEntries(cells);
}

async function figuresOf(text: string, set: string[]): Promise<Record<string, number>> {
  const { flowsheet } = await readFlowsheet(text, { file: 'a.yaml', set });
  return Object.fromEntries(figureLeaves(balance(flowsheet!).result.figures));
}
