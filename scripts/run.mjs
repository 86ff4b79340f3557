// Runs a TypeScript file of this project: node scripts/run.mjs bench/startup.ts [arguments]
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { basename, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = fileURLToPath(new URL('..', import.meta.url));
const [file, ...words] = process.argv.slice(2);
// Inside node_modules, so that packages are found; removed again below.
const folder = mkdtempSync(join(root, 'node_modules', '.run-'));
try {
  const outfile = join(folder, `${basename(file, '.ts')}.mjs`);
  await build({
    entryPoints: [file],
    outfile,
    bundle: true,
    packages: 'external',
    format: 'esm',
    platform: 'node',
    target: 'node20',
    logLevel: 'warning',
  });
  process.exitCode =
    spawnSync(process.execPath, [outfile, ...words], { stdio: 'inherit', cwd: root }).status ?? 1;
} finally {
  rmSync(folder, { recursive: true, force: true });
}
