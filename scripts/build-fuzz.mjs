import { rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

/** Bundle fuzz/ into a folder: all.mjs and worker.mjs, and the packages with them, so that the folder may lie anywhere. */
export async function buildFuzz(folder) {
  rmSync(folder, { recursive: true, force: true });
  await build({
    absWorkingDir: fileURLToPath(new URL('..', import.meta.url)),
    entryPoints: { all: 'fuzz/all.ts', worker: 'fuzz/worker.ts' },
    outdir: folder,
    outExtension: { '.js': '.mjs' },
    bundle: true,
    format: 'esm',
    platform: 'node',
    target: 'node20',
    banner: {
      js: "import { createRequire as fuzzRequire } from 'node:module'; const require = fuzzRequire(import.meta.url);",
    },
    logLevel: 'warning',
  });
}
