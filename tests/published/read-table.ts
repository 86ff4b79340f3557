import { readFileSync } from 'node:fs';

/** Rows of a CSV table beside this file, by column name; cells in double quotes may hold commas. */
export function readTable(name: string): readonly Readonly<Record<string, string>>[] {
  const text = readFileSync(new URL(name, import.meta.url), 'utf8');
  const [head, ...rows] = text.trim().split('\n').map(cells);
  return rows.map((row) => Object.fromEntries(head!.map((column, i) => [column, row[i] ?? ''])));
}

function cells(line: string): string[] {
  return [...line.matchAll(/(?:^|,)(?:"([^"]*)"|([^,]*))/g)].map(
    ([, quoted, plain]) => quoted ?? plain ?? '',
  );
}
