import { Refusal, type Source } from './refusal.ts';

/** The text of bytes in UTF-8. @throws Refusal that points at the first byte that is no text */
export function decodeText(bytes: Uint8Array, name: string): Source {
  const bad = firstBadByte(bytes);
  if (bad === null) return { name, text: lossy.decode(bytes) };
  const before = bytes.subarray(0, bad);
  const line = before.reduce((lines, byte) => (byte === LF ? lines + 1 : lines), 1);
  const column = lossy.decode(before.subarray(before.lastIndexOf(LF) + 1)).length + 1;
  const [why, mend] = explain(bytes, bad);
  throw new Refusal(
    [
      {
        code: 'not-text',
        severity: 'error',
        where: { file: name, line, column, length: 1 },
        what: `${name} is no text in UTF-8.`,
        why,
        mend,
      },
    ],
    { name, text: lossy.decode(bytes) },
  );
}

const LF = 0x0a;
/** Puts a mark in place of what is no text, and leaves a byte-order mark out. */
const lossy = new TextDecoder('utf-8');

/** Offset of the first byte that is NUL or no UTF-8; null where there is none. */
function firstBadByte(bytes: Uint8Array): number | null {
  for (let i = 0; i < bytes.length; ) {
    const first = bytes[i]!;
    if (first === 0) return i;
    const length =
      first < 0x80 ? 1 : first < 0xc2 ? 0 : first < 0xe0 ? 2 : first < 0xf0 ? 3 : first < 0xf5 ? 4 : 0;
    if (length === 0 || !isCharacter(bytes, i, length)) return i;
    i += length;
  }
  return null;
}

/** Do the bytes behind the first one of a character belong to it? @source Unicode Standard 15, table 3-7 */
function isCharacter(bytes: Uint8Array, at: number, length: number): boolean {
  for (let k = 1; k < length; k++) if ((bytes[at + k]! & 0xc0) !== 0x80) return false;
  const [first, second] = [bytes[at]!, bytes[at + 1]!];
  if (first === 0xe0) return second >= 0xa0;
  if (first === 0xed) return second < 0xa0;
  if (first === 0xf0) return second >= 0x90;
  return first !== 0xf4 || second < 0x90;
}

function explain(bytes: Uint8Array, bad: number): readonly [string, string] {
  const place = `byte ${bad + 1} of the file`;
  const hex = `0x${bytes[bad]!.toString(16).toUpperCase().padStart(2, '0')}`;
  const mark = (bytes[0]! << 8) | (bytes[1] ?? 0);
  if (mark === 0xfffe || mark === 0xfeff) {
    return [
      'it begins with the mark of UTF-16, which some editors call Unicode',
      'save it again with the encoding UTF-8',
    ];
  }
  if (bytes[bad] === 0) {
    return [`${place} is 0x00, which no text has`, 'name the YAML file, or take that character out'];
  }
  return [
    `${place} is ${hex}, which is no character of UTF-8`,
    'name the YAML file, or save it again with the encoding UTF-8',
  ];
}
