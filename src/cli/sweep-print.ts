import { sweepJsonRows, sweepText } from '../sheets/sweep.ts';
import type { PathTable } from '../study/sweep.ts';
import { print } from './terminal.ts';

/** What stands behind the rows. */
interface End {
  readonly cases: number;
  readonly not_converged: number;
  readonly note: readonly string[];
}

/** The table on standard output, as it comes: aligned for reading, or one JSON value. */
export function printedTable(heads: readonly string[], json: boolean) {
  return json ? asJson(heads) : asText(heads);
}

function asText(heads: readonly string[]) {
  print(sweepText.head(heads));
  return {
    add: (table: PathTable) => print(sweepText.rows(table, heads)),
    end: ({ note }: End) => {
      if (note.length > 0) print(`\n${note.map((line) => `${line}\n`).join('')}`);
    },
  };
}

function asJson(heads: readonly string[]) {
  let between = '\n    ';
  print(`{\n  "columns": ${JSON.stringify(heads)},\n  "rows": [`);
  return {
    add(table: PathTable) {
      for (const row of sweepJsonRows(table)) {
        print(`${between}${row}`);
        between = ',\n    ';
      }
    },
    end(end: End) {
      const rest = JSON.stringify(end, null, 2).slice(1);
      print(`\n  ],${rest}\n`);
    },
  };
}
