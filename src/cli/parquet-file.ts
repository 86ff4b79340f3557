import { createHash } from 'node:crypto';
import { ByteWriter, ParquetWriter, schemaFromColumnData } from 'hyparquet-writer';
import { plainText } from '../sheets/plain.ts';
import type { PathTable } from '../study/sweep.ts';
import type { SliceMark, TableSink, Write } from './table-file.ts';

/** Rows that are packed together: what is kept in memory, and what a reader may skip as one. */
const GROUP_ROWS = 20_000;

/** Name of the mark of a slice among the key-value metadata of the file; with it goes the checksum of the file. */
export const SLICE_KEY = 'looptally_slice';

/** Stands for the checksum while the checksum is taken, so that it covers the metadata that hold it: heads, types, offsets. */
export const NO_SUM = '0'.repeat(64);

type Cell = number | boolean | string | null;

/** A Parquet file: settings and figures as optional doubles, then converged, passes and note. */
export function createParquetSink(heads: readonly string[], write: Write): TableSink {
  const numbers = heads.length - 3;
  const columns = heads.map((name, c) => ({
    name,
    data: [] as Cell[],
    type: c < numbers ? ('DOUBLE' as const) : (['BOOLEAN', 'INT32', 'STRING'] as const)[c - numbers]!,
    nullable: c < numbers,
    offsetIndex: false,
  }));
  const bytes = new ByteWriter();
  const writer = new ParquetWriter({
    writer: bytes,
    schema: schemaFromColumnData({ columnData: columns }),
    createdBy: 'looptally',
  });
  const sum = createHash('sha256');
  const taken = () => {
    const chunk = Buffer.from(new Uint8Array(bytes.getBytes()));
    sum.update(chunk);
    bytes.index = 0;
    return chunk;
  };
  const pack = () => {
    writer.write({ columnData: columns, rowGroupSize: GROUP_ROWS });
    for (const { data } of columns) data.length = 0;
    write(taken());
  };
  return {
    add({ cells, rows, converged, passes, notes }: PathTable) {
      for (let row = 0; row < rows; row++) {
        for (let c = 0; c < numbers; c++) {
          const value = cells[row * numbers + c]!;
          columns[c]!.data.push(Number.isNaN(value) ? null : value);
        }
        columns[numbers]!.data.push(converged[row] === 1);
        columns[numbers + 1]!.data.push(passes[row]!);
        columns[numbers + 2]!.data.push(plainText(notes[row]!));
        if (columns[0]!.data.length === GROUP_ROWS) pack();
      }
    },
    end(mark: SliceMark | null) {
      if (columns[0]!.data.length > 0) pack();
      if (mark !== null)
        writer.kvMetadata = [{ key: SLICE_KEY, value: JSON.stringify({ ...mark, sha256: NO_SUM }) }];
      writer.finish();
      const end = taken();
      // The last one, for a head may look like it: the writer puts key-value metadata behind the columns.
      if (mark !== null) end.write(sum.digest('hex'), end.lastIndexOf(NO_SUM), 'latin1');
      write(end);
    },
  };
}
