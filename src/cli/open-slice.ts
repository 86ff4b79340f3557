import { usageRefusal } from './refusal.ts';
import { openTextSlice, type Slice } from './slice-file.ts';
import { tableKind } from './table-file.ts';

/** Open a slice of any kind, and see that it is whole. @throws Refusal */
export async function openSlice(path: string): Promise<Slice> {
  try {
    if (tableKind(path) !== '.parquet') return openTextSlice(path);
    const { openParquetSlice } = await import('./parquet-slices.ts');
    return await openParquetSlice(path);
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === undefined || !/^E[A-Z]/.test(code)) throw error;
    throw usageRefusal(
      'cannot-read',
      `${path} cannot be read.`,
      code === 'ENOENT' ? 'there is no such file' : `the system says ${code}`,
      'check its name',
      path,
    );
  }
}
