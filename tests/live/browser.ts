import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll } from 'vitest';
import { buildLive } from '../../scripts/build.mjs';
import { balance, readFlowsheet, renderers } from '../../src/index.ts';

const PLACES = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];
export const executablePath = [process.env['LOOPTALLY_BROWSER'] ?? '', ...PLACES].find(
  (path) => path !== '' && existsSync(path),
);

/** Why the tests in a browser are left out; '' where there is one. */
export const noBrowser =
  executablePath === undefined
    ? ` (SKIPPED: no Chromium found; scripts/install-browser.sh installs one, LOOPTALLY_BROWSER names another)`
    : '';

export const FLAGS =
  '--headless --no-sandbox --disable-gpu --no-first-run --disable-background-networking --disable-component-update --disable-sync';

/** Pages of flowsheets on the disk, opened in a browser without a network. */
export interface Bench {
  /** write the page of a flowsheet to a file and hand back its address */
  write(name: string, text: string, options?: { set?: string[]; case?: string }): Promise<string>;
  /** open an address; whatever the browser complains about is put into `complaints` */
  open(address: string, options?: BrowserContextOptions): Promise<Page>;
  readonly complaints: string[];
}

/** A browser for the tests of a file, started once. */
export function bench(): Bench {
  let browser: Browser | undefined;
  let folder = '';
  let script = '';
  const complaints: string[] = [];
  beforeAll(async () => {
    if (executablePath === undefined) return;
    folder = mkdtempSync(join(tmpdir(), 'looptally-page-'));
    await buildLive(folder);
    script = readFileSync(join(folder, 'live.js'), 'utf8');
    browser = await chromium.launch({ executablePath, args: FLAGS.split(' ') });
  }, 120_000);
  afterAll(async () => {
    await browser?.close();
    if (folder !== '') rmSync(folder, { recursive: true, force: true });
  });
  return {
    complaints,
    async write(name, text, options = {}) {
      const file = join(folder, `${name}.html`);
      writeFileSync(file, await pageOf(`${name}.yaml`, text, script, options));
      return `file://${file}`;
    },
    async open(address, options = {}) {
      const context = await browser!.newContext({
        locale: 'en-GB',
        viewport: { width: 1280, height: 900 },
        offline: true,
        ...options,
      });
      // On a machine with other work, half a minute is soon gone.
      context.setDefaultTimeout(40_000);
      const page = await context.newPage();
      page.on('console', (message) => {
        if (message.type() === 'error' || message.type() === 'warning') complaints.push(message.text());
      });
      page.on('pageerror', (error) => complaints.push(String(error)));
      page.on('requestfailed', (request) => complaints.push(`asked for ${request.url()}`));
      await page.goto(address);
      await page.locator('.panel:not([hidden])').waitFor();
      return page;
    },
  };
}

/** The page as the command line writes it; without a script one that stands still. */
export async function pageOf(
  file: string,
  text: string,
  script: string | null,
  options: { set?: string[]; case?: string } = {},
): Promise<string> {
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file, ...options });
  if (flowsheet === null) throw new Error(diagnostics.map(({ what }) => what).join('\n'));
  const { result } = balance(flowsheet);
  const live = script === null ? {} : { live: { script, text, set: options.set ?? [] } };
  return (await renderers.get('.html')!.render(result, { flowsheet, ...live })) as string;
}
