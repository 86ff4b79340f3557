import { mkdirSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const { run, folder } = commandLine();
const names = [
  'balance',
  'check',
  'sweep',
  'gather',
  'levers',
  'compare',
  'uncertainty',
  'optimise',
  'sheet',
  'equilibrium',
  'data',
  'new',
  'schema',
];

beforeAll(() => {
  mkdirSync(join(folder(), 'plans'));
  writeFileSync(join(folder(), 'picture.yaml'), Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 0, 1, 2, 0xff]));
  writeFileSync(join(folder(), 'zeros.yaml'), 'looptally: 1\0');
  writeFileSync(join(folder(), 'methanol.yaml'), run(['new', 'methanol']).out);
  symlinkSync('methanol.yaml', join(folder(), 'link.md'));
});

describe('help', () => {
  test('without a command the overview goes to standard error, with exit code 2', () => {
    const { code, out, err } = run([]);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    for (const name of names) expect(err).toContain(`\n  ${name} `);
  });

  test.each([['--help'], ['-h'], ['help']])('looptally %s prints the overview', (word) => {
    const { code, out, err } = run([word]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toContain('Usage: looptally COMMAND FILE [options]');
  });

  test.each(names)('%s --help shows its options and an example', (name) => {
    const { code, out, err } = run([name, '--help']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toContain(`Usage: looptally ${name} `);
    expect(out).toContain('--json');
    expect(out).toMatch(/\nExamples?:\n {2}looptally /);
  });

  test('help COMMAND and COMMAND --help say the same usage', () => {
    expect(run(['help', 'sheet']).out.split('\n')[0]).toBe(run(['sheet', '--help']).out.split('\n')[0]);
  });

  test('--version prints the version and nothing else', () => {
    expect(run(['--version']).out).toMatch(/^\d+\.\d+\.\d+\n$/);
  });
});

describe('a command line that cannot be followed is told in four parts with exit code 2:', () => {
  test.each<{ words: string[]; message: string }>([
    {
      words: ['balanc', 'methanol.yaml'],
      message: `command line:1:11 error unknown-command
  There is no command balanc.
   1 | looptally balanc methanol.yaml
     |           ^^^^^^
  why:  the nearest command is balance
  mend: write looptally balance

1 error
`,
    },
    {
      words: ['methanol.yaml'],
      message: `command line:1:11 error unknown-command
  There is no command methanol.yaml.
   1 | looptally methanol.yaml
     |           ^^^^^^^^^^^^^
  why:  the commands are ${names.join(', ')}
  mend: write looptally balance methanol.yaml

1 error
`,
    },
    {
      words: ['--json', 'balance', 'methanol.yaml'],
      message: '',
    },
    {
      words: ['balance'],
      message: `command line:1:1 error missing-argument
  looptally balance needs a file.
   1 | looptally balance
     | ^^^^^^^^^
  why:  nothing was given after the command
  mend: write looptally balance [options] <file>

1 error
`,
    },
    {
      words: ['balance', 'methanol.yaml', '--methd', 'direct'],
      message: `command line:1:33 error unknown-option
  looptally balance has no option --methd.
   1 | looptally balance methanol.yaml --methd direct
     |                                 ^^^^^^^
  why:  the nearest option is --method
  mend: write --method

1 error
`,
    },
    {
      words: ['balance', 'methanol.yaml', '--method', 'magic'],
      message: `command line:1:33 error bad-value
  --method cannot be magic.
   1 | looptally balance methanol.yaml --method magic
     |                                 ^^^^^^^^
  why:  it must be one of auto, direct, wegstein, eigenvalue, anderson, broyden, newton
  mend: looptally balance --help tells the options and shows an example

1 error
`,
    },
    {
      words: ['balance', 'methanol.yaml', '--tolerance', '-1'],
      message: `command line:1:33 error bad-value
  --tolerance cannot be -1.
   1 | looptally balance methanol.yaml --tolerance -1
     |                                 ^^^^^^^^^^^
  why:  it must be a number above 0 and below 1
  mend: looptally balance --help tells the options and shows an example

1 error
`,
    },
    {
      words: ['balance', 'methanol.yaml', '--max-passes', '2.5'],
      message: `command line:1:33 error bad-value
  --max-passes cannot be 2.5.
   1 | looptally balance methanol.yaml --max-passes 2.5
     |                                 ^^^^^^^^^^^^
  why:  it must be a whole number above 0
  mend: looptally balance --help tells the options and shows an example

1 error
`,
    },
    {
      words: ['balance', 'methanol.yaml', '--case'],
      message: `command line:1:33 error missing-value
  The option --case needs a value.
   1 | looptally balance methanol.yaml --case
     |                                 ^^^^^^
  why:  it is written --case <name>
  mend: looptally balance --help tells the options and shows an example

1 error
`,
    },
    {
      words: ['balance', 'methanol.yaml', 'cold', 'condenser'],
      message: `command line:1:33 error too-many-arguments
  looptally balance cannot make sense of cold.
   1 | looptally balance methanol.yaml cold condenser
     |                                 ^^^^
  why:  this command takes one name; a value with blanks needs quotes
  mend: looptally balance --help tells the options and shows an example

1 error
`,
    },
    {
      words: ['balance', 'methanl.yaml'],
      message: `command line:1:19 error no-such-file
  There is no file methanl.yaml.
   1 | looptally balance methanl.yaml
     |                   ^^^^^^^^^^^^
  why:  the nearest name there is methanol.yaml
  mend: write methanol.yaml

1 error
`,
    },
    {
      words: ['balance', 'nowhere/loop.yaml'],
      message: `command line:1:19 error no-such-file
  There is no file nowhere/loop.yaml.
   1 | looptally balance nowhere/loop.yaml
     |                   ^^^^^^^^^^^^^^^^^
  why:  nothing of that name is there
  mend: check the path, or write a first file with: looptally new ammonia --out loop.yaml

1 error
`,
    },
    {
      words: ['check', 'plans'],
      message: `command line:1:17 error is-a-folder
  plans is a folder.
   1 | looptally check plans
     |                 ^^^^^
  why:  a flowsheet is one YAML file
  mend: name the file inside the folder

1 error
`,
    },
    {
      words: ['check', 'picture.yaml'],
      message: `picture.yaml:1:1 error not-text
  picture.yaml is no text in UTF-8.
   1 | \ufffdPNG???\ufffd
     | ^
  why:  byte 1 of the file is 0x89, which is no character of UTF-8
  mend: name the YAML file, or save it again with the encoding UTF-8

1 error
`,
    },
    {
      words: ['check', 'zeros.yaml'],
      message: `zeros.yaml:1:13 error not-text
  zeros.yaml is no text in UTF-8.
   1 | looptally: 1?
     |             ^
  why:  byte 13 of the file is 0x00, which no text has
  mend: name the YAML file, or take that character out

1 error
`,
    },
    {
      words: ['sheet', 'methanol.yaml'],
      message: `command line:1:11 error missing-output
  looptally sheet needs to know what to write.
   1 | looptally sheet methanol.yaml
     |           ^^^^^
  why:  no --out was given
  mend: write --out loop.md, or looptally balance for the sheet on the terminal

1 error
`,
    },
    {
      words: ['sheet', 'methanol.yaml', '--out', 'loop.pdf'],
      message: `command line:1:37 error unknown-format
  There is no sheet of the format .pdf.
   1 | looptally sheet methanol.yaml --out loop.pdf
     |                                     ^^^^^^^^
  why:  the ending of the name says the format; there are .csv, .html, .md, .svg and .xlsx
  mend: write --out loop.md

1 error
`,
    },
    {
      words: ['sheet', 'methanol.yaml', '--out', 'link.md'],
      message: `command line:1:37 error bad-output
  link.md is read and would be written.
   1 | looptally sheet methanol.yaml --out link.md
     |                                     ^^^^^^^
  why:  the result would overwrite the file it is made from
  mend: give --out another name

1 error
`,
    },
    {
      words: ['sheet', 'methanol.yaml', '--out', 'a.md', '--out', './a.md'],
      message: `command line:1:48 error bad-output
  ./a.md is named twice.
   1 | looptally sheet methanol.yaml --out a.md --out ./a.md
     |                                                ^^^^^^
  why:  two sheets cannot be written to one file
  mend: give each --out a name of its own

1 error
`,
    },
    {
      words: ['sheet', 'methanol.yaml', '--out', 'gone/a.md'],
      message: `command line:1:37 error bad-output
  gone/a.md cannot be written.
   1 | looptally sheet methanol.yaml --out gone/a.md
     |                                     ^^^^^^^^^
  why:  there is no folder gone
  mend: make the folder first, or name another one

1 error
`,
    },
    {
      words: ['new', 'amonia'],
      message: `command line:1:15 error unknown-starter
  There is no starter file amonia.
   1 | looptally new amonia
     |               ^^^^^^
  why:  the nearest is ammonia
  mend: write looptally new ammonia

1 error
`,
    },
    {
      words: ['new', 'ammonia', '--out', 'methanol.yaml'],
      message: `command line:1:29 error file-exists
  methanol.yaml is there already.
   1 | looptally new ammonia --out methanol.yaml
     |                             ^^^^^^^^^^^^^
  why:  a starter file does not overwrite your work
  mend: name another file, or add --force

1 error
`,
    },
    {
      words: ['data', 'NH33'],
      message: `command line:1:16 error unknown-data
  There are no data of NH33.
   1 | looptally data NH33
     |                ^^^^
  why:  the nearest name is NH3
  mend: write looptally data NH3

1 error
`,
    },
  ])('looptally $words', ({ words, message }) => {
    const { code, out, err } = run(words);
    if (message === '') {
      expect({ code, err }).toEqual({ code: 2, err: '' });
      expect(JSON.parse(out).diagnostics[0].code).toBe('option-before-command');
    } else {
      expect({ code, out, err }).toEqual({ code: 2, out: '', err: message });
    }
  });
});

describe('with --json', () => {
  test('an error is JSON on standard output and nothing on standard error', () => {
    const { code, out, err } = run(['balance', 'methanl.yaml', '--json']);
    expect({ code, err }).toEqual({ code: 2, err: '' });
    expect(JSON.parse(out)).toEqual({
      diagnostics: [
        {
          code: 'no-such-file',
          severity: 'error',
          file: 'command line',
          line: 1,
          column: 19,
          length: 12,
          what: 'There is no file methanl.yaml.',
          why: 'the nearest name there is methanol.yaml',
          mend: 'write methanol.yaml',
          also: null,
        },
      ],
    });
  });
});
