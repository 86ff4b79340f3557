import type { Chance } from './chance.ts';

/** Pieces that mean something to YAML, to JavaScript or to a terminal. */
const JUNK = [
  ...[
    '\t',
    '\r',
    '\n\n',
    ':',
    ': ',
    '- ',
    '{',
    '}',
    '[',
    ']',
    '"',
    "'",
    '&a ',
    '*a',
    '!!x ',
    '!!binary ',
    '#',
    '|',
    '>',
    '%',
  ],
  ...[
    '@',
    '\0',
    '\ufeff',
    '---\n',
    '...\n',
    '->',
    '<<: ',
    '? ',
    '__proto__: ',
    'constructor: ',
    'toString',
    'null',
    '~',
    'yes',
  ],
  ...[
    '1e999',
    '-1e999',
    '.nan',
    '.inf',
    '0x1F',
    '1_000',
    '-0',
    '9007199254740993',
    '\u202e',
    '\u0085',
    '\u2028',
    '\ud83d\ude00',
    '\u001b[31m',
  ],
];

/** A text after one to four slips of an editor, as bytes: it need not be UTF-8 any more. */
export function mutateText(text: string, chance: Chance): Uint8Array {
  let bytes: Uint8Array = Buffer.from(text);
  for (let left = 1 + chance.below(4); left > 0; left--) bytes = slip(bytes, chance);
  return bytes;
}

/** The same to bytes of any kind: some are changed, lost, repeated or moved. */
export function slip(bytes: Uint8Array, chance: Chance): Uint8Array {
  const at = chance.below(bytes.length + 1);
  const length = 1 + chance.below(chance.once(4) ? 400 : 12);
  const [head, piece, tail] = [
    bytes.subarray(0, at),
    bytes.subarray(at, at + length),
    bytes.subarray(at + length),
  ];
  switch (chance.below(7)) {
    case 0:
      return Buffer.concat([head, tail]);
    case 1:
      return Buffer.concat([head, Buffer.from(chance.pick(JUNK)), bytes.subarray(at)]);
    case 2:
      return Buffer.concat([head, piece, piece, tail]);
    case 3: {
      const flipped = Buffer.from(bytes);
      if (at < flipped.length) flipped[at] = flipped[at]! ^ (1 << chance.below(8));
      return flipped;
    }
    case 4: {
      const other = chance.below(bytes.length + 1);
      const rest = Buffer.concat([head, tail]);
      return Buffer.concat([rest.subarray(0, other), piece, rest.subarray(other)]);
    }
    case 5:
      return chance.once(8) ? head : swapLines(bytes, chance);
    default:
      return repeatLine(bytes, chance);
  }
}

function swapLines(bytes: Uint8Array, chance: Chance): Uint8Array {
  const lines = Buffer.from(bytes).toString('latin1').split('\n');
  const [a, b] = [chance.below(lines.length), chance.below(lines.length)];
  [lines[a], lines[b]] = [lines[b]!, lines[a]!];
  return Buffer.from(lines.join('\n'), 'latin1');
}

function repeatLine(bytes: Uint8Array, chance: Chance): Uint8Array {
  const lines = Buffer.from(bytes).toString('latin1').split('\n');
  const at = chance.below(lines.length);
  lines.splice(chance.once(2) ? at : chance.below(lines.length), 0, lines[at]!);
  return Buffer.from(lines.join('\n'), 'latin1');
}
