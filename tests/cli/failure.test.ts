import { spawn, spawnSync } from 'node:child_process';
import { closeSync, existsSync, openSync } from 'node:fs';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { tellFailure } from '../../src/cli/messages.ts';
import { usageRefusal } from '../../src/cli/refusal.ts';
import { commandLine } from './looptally.ts';

const { program } = commandLine();

describe('a command that fails', () => {
  let out = '';
  let err = '';
  beforeEach(() => {
    out = '';
    err = '';
    vi.spyOn(process.stdout, 'write').mockImplementation((text) => {
      out += text;
      return true;
    });
    vi.spyOn(process.stderr, 'write').mockImplementation((text) => {
      err += text;
      return true;
    });
  });
  afterEach(() => {
    vi.restoreAllMocks();
    vi.unstubAllEnvs();
    process.exitCode = undefined;
  });

  const fault =
    'looptally: this is a fault of Looptally: x is not a function (please report this line with the command and the ' +
    'file to the maintainers; LOOPTALLY_DEBUG=1 shows where it happened)\n';

  test('through a fault of ours says so in one line without a stack, exit code 1', () => {
    tellFailure(new TypeError('x is\nnot a function'), false);
    expect({ out, err, code: process.exitCode }).toEqual({ out: '', err: fault, code: 1 });
  });

  test('shows the stack only with LOOPTALLY_DEBUG=1', () => {
    vi.stubEnv('LOOPTALLY_DEBUG', '1');
    tellFailure(new TypeError('x is not a function'), false);
    expect(err.startsWith(`${fault}TypeError: x is not a function\n    at `)).toBe(true);
  });

  test('says it as JSON with --json', () => {
    tellFailure(new TypeError('x is not a function'), true);
    expect(err).toBe('');
    expect(process.exitCode).toBe(1);
    expect(JSON.parse(out).diagnostics).toMatchObject([{ code: 'fault', severity: 'error' }]);
  });

  test('through bad input has exit code 2', () => {
    tellFailure(usageRefusal('some-code', 'This is wrong.', 'because', 'do that'), false);
    expect(process.exitCode).toBe(2);
    expect(err).toMatch(/^command line:1:1 error some-code\n {2}This is wrong\.\n/);
  });
});

describe('a reader that stops reading', () => {
  test('ends the program without a word', async () => {
    const child = spawn(process.execPath, [program(), 'data', '--json'], {
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    child.stdout.destroy();
    let err = '';
    child.stderr.on('data', (chunk) => {
      err += chunk;
    });
    const code = await new Promise((resolve) => child.on('close', resolve));
    expect({ code, err }).toEqual({ code: 0, err: '' });
  });
});

describe('an output that cannot be written', () => {
  test.skipIf(!existsSync('/dev/full'))('is told in one line, exit code 2', () => {
    const full = openSync('/dev/full', 'w');
    const { status, stderr } = spawnSync(process.execPath, [program(), 'data'], {
      stdio: ['ignore', full, 'pipe'],
      encoding: 'utf8',
    });
    closeSync(full);
    expect({ status, stderr }).toEqual({
      status: 2,
      stderr: 'looptally: the output cannot be written (ENOSPC)\n',
    });
  });
});
