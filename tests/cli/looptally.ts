import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll } from 'vitest';
import { buildCli } from '../../scripts/build.mjs';

export interface Outcome {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

export interface RunOptions {
  readonly input?: string | Uint8Array;
  readonly env?: Readonly<Record<string, string>>;
}

/**
 * The built command line in a folder of its own with an empty folder to work in: what is tested is what is
 * shipped, and test files do not wait for one another.
 */
export function commandLine(): {
  run: (words: readonly string[], options?: RunOptions) => Outcome;
  folder: () => string;
  program: () => string;
} {
  let program = '';
  let folder = '';
  beforeAll(async () => {
    program = mkdtempSync(join(tmpdir(), 'looptally-built-'));
    folder = mkdtempSync(join(tmpdir(), 'looptally-work-'));
    await buildCli(program);
  }, 60_000);
  afterAll(() => {
    for (const made of [program, folder]) rmSync(made, { recursive: true, force: true });
  });
  return {
    folder: () => folder,
    program: () => join(program, 'cli.js'),
    run: (words, { input = '', env = {} } = {}) => {
      const { status, stdout, stderr } = spawnSync(process.execPath, [join(program, 'cli.js'), ...words], {
        cwd: folder,
        input,
        env: { PATH: process.env['PATH'] ?? '', ...env },
        encoding: 'utf8',
      });
      return { code: status, out: stdout, err: stderr };
    },
  };
}
