// npm run fuzz: builds fuzz/ afresh into dist/fuzz and runs it; what it takes is told in fuzz/all.ts.
import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildFuzz } from './build-fuzz.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const folder = join(root, 'dist', 'fuzz');

await buildFuzz(folder);
const { status } = spawnSync(process.execPath, [join(folder, 'all.mjs'), ...process.argv.slice(2)], {
  stdio: 'inherit',
  cwd: root,
});
process.exitCode = status ?? 1;
