import { execFileSync, spawnSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const { run, folder, program } = commandLine();
let loop = '';

beforeAll(() => {
  loop = run(['new', 'methanol']).out;
  const write = (name: string, content: string | Uint8Array) => writeFileSync(join(folder(), name), content);
  write('loop.yaml', loop);
  write('big.yaml', `${loop}${`# ${'x'.repeat(98)}\n`.repeat(11_000)}`);
  write('latin1.yaml', Buffer.from('looptally: 1\ntitle: caf\u00e9 loop\n', 'latin1'));
  write('utf16.yaml', Buffer.from('\ufefflooptally: 1\n', 'utf16le'));
  write('surrogate.yaml', Buffer.from([...Buffer.from('looptally: 1\r\ntitle: é '), 0xed, 0xa0, 0x80]));
  write('cut.yaml', Buffer.from([...Buffer.from('title: é'), 0xe2, 0x82]));
  write('overlong.yaml', Buffer.from([0x61, 0xc0, 0xaf]));
  write('marked.yaml', `\ufeff${loop.replaceAll('\n', '\r\n')}`);
});

/** Run the shipped command behind a shell, for what only a shell can set up. */
function shell(script: string): { code: number | null; out: string; err: string } {
  const { status, stdout, stderr } = spawnSync('sh', ['-c', script], {
    cwd: folder(),
    env: { PATH: process.env['PATH'] ?? '', LOOPTALLY: `${process.execPath} ${program()}` },
    encoding: 'utf8',
    timeout: 30_000,
  });
  return { code: status, out: stdout, err: stderr };
}

const notText = (
  name: string,
  place: string,
  why: string,
  line: string,
  column: number,
) => `${name}:${place} error not-text
  ${name} is no text in UTF-8.
   ${place.split(':')[0]} | ${line}
     | ${' '.repeat(column - 1)}^
  why:  ${why}
  mend: name the YAML file, or save it again with the encoding UTF-8

1 error
`;

describe('bytes that are no UTF-8 are told with the byte and its line:', () => {
  test.each([
    [
      'latin1.yaml',
      '2:11',
      'byte 24 of the file is 0xE9, which is no character of UTF-8',
      'title: caf\ufffd loop',
      11,
    ],
    [
      'surrogate.yaml',
      '2:10',
      'byte 25 of the file is 0xED, which is no character of UTF-8',
      'title: é \ufffd\ufffd\ufffd',
      10,
    ],
    ['cut.yaml', '1:9', 'byte 10 of the file is 0xE2, which is no character of UTF-8', 'title: é\ufffd', 9],
    [
      'overlong.yaml',
      '1:2',
      'byte 2 of the file is 0xC0, which is no character of UTF-8',
      'a\ufffd\ufffd',
      2,
    ],
  ])('%s', (name, place, why, line, column) => {
    const { code, out, err } = run(['check', name]);
    expect({ code, out, err }).toEqual({ code: 2, out: '', err: notText(name, place, why, line, column) });
  });

  test('UTF-16 is called by its name', () => {
    const { code, err } = run(['check', 'utf16.yaml']);
    expect(code).toBe(2);
    expect(err).toContain(`utf16.yaml:1:1 error not-text
  utf16.yaml is no text in UTF-8.`);
    expect(err).toContain(`  why:  it begins with the mark of UTF-16, which some editors call Unicode
  mend: save it again with the encoding UTF-8

1 error
`);
  });

  test('standard input is checked alike', () => {
    const { code, err } = run(['check', '-'], { input: Uint8Array.from([0x61, 0xff]) });
    expect(code).toBe(2);
    expect(err).toContain('standard input:1:2 error not-text\n  standard input is no text in UTF-8.');
  });
});

test('a byte-order mark and CRLF change nothing', () => {
  const [plain, marked] = ['loop.yaml', 'marked.yaml'].map((name) => run(['balance', name, '--json']));
  expect(marked!.code).toBe(0);
  expect(marked!.out).toBe(plain!.out);
});

describe('a file larger than 1 MiB', () => {
  const refused = (name: string, line: string) => `${name}:1:1 error file-too-large
  ${name} is larger than 1 MiB.
   1 | ${line}
     | ^
  why:  a plant of 2,000 blocks takes some 0.2 MiB; this is probably another kind of file
  mend: name the flowsheet itself, or allow more: --max-size '4 MiB'

1 error
`;
  const firstLine = () => {
    const line = loop.split('\n')[0]!;
    return line.length > 110 ? `${line.slice(0, 110)}...` : line;
  };

  test.each(['balance', 'sweep', 'compare', 'optimise'])('is refused by %s', (name) => {
    expect(run([name, 'big.yaml'])).toEqual({ code: 2, out: '', err: refused('big.yaml', firstLine()) });
  });

  test('is read where --max-size allows it, a sweep in its workers too', () => {
    expect(run(['check', 'big.yaml', '--max-size', '2 MiB']).code).toBe(0);
    expect(run(['compare', 'big.yaml', 'loop.yaml', '--max-size', '2MB']).code).toBe(0);
    expect(run(['check', '-', '--max-size', '2e3 kB'], { input: 'a: 1' }).err).toContain(
      '--max-size cannot be 2e3 kB.',
    );
    const over = ['--over', 'purge.fractions.bleed=2 %..3 %:2', '--workers', '2', '--quiet'];
    const [plain, big] = ['loop.yaml', 'big.yaml'].map((file) =>
      run(['sweep', file, '--max-size', '2 MiB', ...over]),
    );
    expect(big).toEqual(plain);
    expect(big!.code).toBe(0);
  });

  test('a smaller limit holds as well', () => {
    expect(run(['check', 'loop.yaml', '--max-size', '1 KiB']).err).toContain(
      "allow more: --max-size '4 KiB'",
    );
  });

  test.each(['0', '65 MiB', 'much', '1 MiB MiB'])('--max-size %j is refused', (size) => {
    const { code, err } = run(['check', 'loop.yaml', `--max-size=${size}`]);
    expect(code).toBe(2);
    expect(err).toMatch(/error bad-value\n {2}--max-size cannot be /);
  });
});

describe.skipIf(process.platform === 'win32')('what is no plain file', () => {
  test('a device without an end is left after the limit', () => {
    const { code, err } = shell('$LOOPTALLY check /dev/zero');
    expect({ code, first: err.split('\n').slice(0, 2) }).toEqual({
      code: 2,
      first: ['/dev/zero:1:1 error file-too-large', '  /dev/zero is larger than 1 MiB.'],
    });
    expect(shell('$LOOPTALLY check - < /dev/zero').err).toContain('standard input is larger than 1 MiB.');
  });

  test('an empty device is an empty file', () => {
    expect(shell('$LOOPTALLY check /dev/null')).toEqual({
      code: 2,
      out: '',
      err: `/dev/null:1:1 error empty-file
  The file is empty.
   1 | 
     | ^
  why:  there is no flowsheet in it
  mend: write one, or start from \`looptally new ammonia\`

1 error
`,
    });
  });

  test('a pipe with a name is read like a file', () => {
    execFileSync('mkfifo', [join(folder(), 'pipe')]);
    const { code, out } = shell('cat loop.yaml > pipe & $LOOPTALLY check pipe');
    expect(code).toBe(0);
    expect(out).toBe(run(['check', 'loop.yaml']).out);
  });
});

test('an escape sequence in a file does not reach the terminal', () => {
  writeFileSync(join(folder(), 'escape.yaml'), loop.replace('kind: mixer', 'kind: "\\e[2Jmixer"'));
  const { code, err } = run(['check', 'escape.yaml']);
  expect(code).toBe(2);
  expect(err).toContain('is of kind "?[2Jmixer".');
  expect(err).not.toContain('\u001b');
});
