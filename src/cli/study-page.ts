import { existsSync, readFileSync } from 'node:fs';
import { basename, extname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { MOST_PAGE_ROWS, type StudyPageOptions } from '../sheets/study-page/study-document.ts';
import { usageRefusal } from './refusal.ts';
import { version } from './version.ts';

/** Is a file to be written as a page? */
export function isPage(path: string | undefined): boolean {
  return path !== undefined && extname(path).toLowerCase() === '.html';
}

/** What the page of a study takes from this program: version, script, and the name of its table. */
export function pageOptions(path: string): StudyPageOptions {
  return { version, script: pageScript(), csvName: `${basename(path, extname(path))}.csv` };
}

/** The bundled script lies beside the command line; run from its sources, pages do without. */
function pageScript(): string {
  const places = ['./study-page.js', '../study-page.js'].map((place) =>
    fileURLToPath(new URL(place, import.meta.url)),
  );
  const found = places.find(existsSync);
  return found === undefined ? '' : readFileSync(found, 'utf8').trim();
}

/** Told before the first case: nobody waits for a page that no browser opens at once. @throws Refusal */
export function checkPageRows(rows: number, path: string): void {
  if (rows <= MOST_PAGE_ROWS) return;
  throw usageRefusal(
    'grid-too-large',
    `${path} cannot hold ${rows} cases.`,
    `a page holds at most ${MOST_PAGE_ROWS}, so that a browser opens it at once`,
    'take fewer cases, or write the table: --out table.csv or table.parquet',
    path,
  );
}
