import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll } from 'vitest';
import { buildPageScripts } from '../../scripts/build.mjs';
import type { StudyPageOptions } from '../../src/sheets/study-page/study-document.ts';
import { executablePath, FLAGS } from './browser.ts';

/** Pages of studies on the disk, opened in a browser without a network. */
export interface StudyBench {
  /** what a page takes from the program, the bundled script among it */
  options(): StudyPageOptions;
  /** write a page and open it; whatever the browser complains about is put into `complaints` */
  open(html: string, options?: BrowserContextOptions): Promise<Page>;
  readonly complaints: string[];
}

/** A browser for the tests of a file, started once. */
export function studyBench(): StudyBench {
  let browser: Browser | undefined;
  let folder = '';
  let pages = 0;
  const complaints: string[] = [];
  beforeAll(async () => {
    if (executablePath === undefined) return;
    folder = mkdtempSync(join(tmpdir(), 'looptally-study-'));
    await buildPageScripts(folder);
    browser = await chromium.launch({ executablePath, args: FLAGS.split(' ') });
  }, 120_000);
  afterAll(async () => {
    await browser?.close();
    if (folder !== '') rmSync(folder, { recursive: true, force: true });
  });
  return {
    complaints,
    options: () => ({
      version: '1.2.3',
      script: readFileSync(join(folder, 'study-page.js'), 'utf8').trim(),
      csvName: 'study.csv',
    }),
    async open(html, options = {}) {
      const file = join(folder, `page-${++pages}.html`);
      writeFileSync(file, html);
      const context = await browser!.newContext({ locale: 'en-GB', offline: true, ...options });
      const page = await context.newPage();
      page.on('console', (message) => {
        if (message.type() === 'error' || message.type() === 'warning') complaints.push(message.text());
      });
      page.on('pageerror', (error) => complaints.push(String(error)));
      page.on('requestfailed', (request) => complaints.push(`asked for ${request.url()}`));
      await page.goto(`file://${file}`);
      return page;
    },
  };
}
