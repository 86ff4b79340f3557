// npm run bench: builds the command line and bench/ afresh into dist/bench and prints what bench/all.ts measures.
import { spawnSync } from 'node:child_process';
import { rmSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';
import { buildCli } from './build.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const folder = join(root, 'dist', 'bench');
const program = join(folder, 'all.mjs');

rmSync(folder, { recursive: true, force: true });
await buildCli(join(folder, 'command'));
await build({
  absWorkingDir: root,
  entryPoints: ['bench/all.ts'],
  outfile: program,
  bundle: true,
  packages: 'external',
  format: 'esm',
  platform: 'node',
  target: 'node20',
  logLevel: 'warning',
});

// A young generation this large is not collected while allocation is counted.
const flags = ['--expose-gc', '--min-semi-space-size=64', '--max-semi-space-size=64'];
const words = process.argv.slice(2);
const { status } = spawnSync(process.execPath, [...flags, program, ...words], {
  stdio: 'inherit',
  cwd: root,
});
process.exitCode = status ?? 1;
