import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { chromium } from 'playwright-core';
import { column, median, title } from './measure.ts';
import { AMMONIA, REFERENCE } from './shipped.ts';

const CLI = 'dist/bench/command/cli.js';
const MOVES = 60;
/** What one frame at 60 a second leaves. */
const ALLOWED_MS = 16;

/**
 * A frame in the browser while a slider moves: the loop closed again and all that is in sight shown, without the time the
 * browser takes to paint. The frame is called at once instead of at the next refresh, to be timed alone.
 */
export async function benchPage(): Promise<void> {
  title(`Live page: one frame of a moving slider, median of ${MOVES}`);
  const executablePath = [
    process.env['LOOPTALLY_BROWSER'] ?? '',
    '/usr/bin/chromium',
    '/usr/bin/google-chrome',
  ].find((path) => path !== '' && existsSync(path));
  if (executablePath === undefined) {
    console.log('  left out: no Chromium found (scripts/install-browser.sh)');
    return;
  }
  const folder = mkdtempSync(join(tmpdir(), 'looptally-bench-'));
  const browser = await chromium.launch({
    executablePath,
    args: ['--headless', '--no-sandbox', '--disable-gpu'],
  });
  console.log(`  ${'flowsheet'.padEnd(36)}       ms  slowest`);
  for (const flowsheet of [REFERENCE, AMMONIA]) {
    const file = join(folder, 'page.html');
    const { status } = spawnSync(process.execPath, [CLI, 'sheet', flowsheet, '--quiet', '--out', file]);
    if (status !== 0) throw new Error(`sheet of ${flowsheet} ended with ${status}`);
    const page = await browser.newPage({ viewport: { width: 1280, height: 900 } });
    await page.goto(`file://${file}`);
    await page.locator('.panel:not([hidden])').waitFor();
    await page.waitForTimeout(1500);
    const times = (await page.evaluate(SLIDE)) as number[];
    const verdict =
      flowsheet === REFERENCE
        ? `  (below ${ALLOWED_MS}: ${median(times) < ALLOWED_MS ? 'kept' : 'MISSED'})`
        : '';
    console.log(
      `  ${flowsheet.padEnd(36)} ${column(median(times), 8)} ${column(Math.max(...times), 8)}${verdict}`,
    );
    await page.close();
  }
  await browser.close();
  rmSync(folder, { recursive: true, force: true });
}

/** Moves the first slider place by place; runs in the page. */
const SLIDE = `(async () => {
  const slider = document.querySelector('input[type=range]');
  const times = [];
  window.requestAnimationFrame = (frame) => {
    const from = performance.now();
    frame(from);
    times.push(performance.now() - from);
    return 0;
  };
  for (let move = 0; move < ${MOVES}; move++) {
    slider.value = String(20 + (move % 40));
    slider.dispatchEvent(new Event('input', { bubbles: true }));
    await new Promise((done) => setTimeout(done, 20));
  }
  return times;
})()`;
