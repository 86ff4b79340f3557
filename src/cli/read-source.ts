import { readdirSync } from 'node:fs';
import { type FileHandle, open } from 'node:fs/promises';
import { basename, dirname } from 'node:path';
import { limits, sizeText } from '../flowsheet/limits.ts';
import { nearest } from '../units/nearest.ts';
import { decodeText } from './decode-text.ts';
import { Refusal, type Source, usageRefusal } from './refusal.ts';

/** The text of a file, `-` for standard input. Refuses what is too large or no readable UTF-8 text. */
export async function readSource(file: string, maxBytes: number = limits.bytes): Promise<Source> {
  const name = file === '-' ? 'standard input' : file;
  let bytes: Uint8Array;
  try {
    bytes = file === '-' ? await readUpTo(process.stdin, maxBytes) : await readFileUpTo(file, maxBytes);
  } catch (error) {
    throw error instanceof Refusal ? error : unreadable(file, error as NodeJS.ErrnoException);
  }
  if (bytes.length > maxBytes) throw tooLarge(name, bytes, maxBytes);
  return decodeText(bytes, name);
}

/** A file, or what comes through a pipe; of either no more than one chunk beyond the limit is taken into memory. */
async function readFileUpTo(file: string, maxBytes: number): Promise<Uint8Array> {
  let handle: FileHandle | null = null;
  try {
    handle = await open(file);
    const stat = await handle.stat();
    if (stat.isDirectory()) throw Object.assign(new Error('a folder'), { code: 'EISDIR' });
    if (stat.isBlockDevice()) throw noFile(file);
    return await readUpTo(handle.createReadStream({ autoClose: false, end: maxBytes }), maxBytes);
  } finally {
    await handle?.close();
  }
}

async function readUpTo(stream: AsyncIterable<unknown>, maxBytes: number): Promise<Uint8Array> {
  const chunks: Uint8Array[] = [];
  let length = 0;
  for await (const chunk of stream) {
    chunks.push(chunk as Uint8Array);
    length += (chunk as Uint8Array).length;
    if (length > maxBytes) break;
  }
  return Buffer.concat(chunks);
}

function unreadable(file: string, error: NodeJS.ErrnoException): Refusal {
  switch (error.code) {
    case 'ENOENT':
    case 'ENOTDIR': {
      const near = nearestFile(file);
      return usageRefusal(
        'no-such-file',
        `There is no file ${file}.`,
        near === null ? 'nothing of that name is there' : `the nearest name there is ${near}`,
        near === null
          ? 'check the path, or write a first file with: looptally new ammonia --out loop.yaml'
          : `write ${near}`,
        file,
      );
    }
    case 'EISDIR':
      return usageRefusal(
        'is-a-folder',
        `${file} is a folder.`,
        'a flowsheet is one YAML file',
        'name the file inside the folder',
        file,
      );
    case 'EACCES':
    case 'EPERM':
      return usageRefusal(
        'no-permission',
        `${file} may not be read.`,
        'the system denies access to it',
        'check the permissions of the file and its folder',
        file,
      );
    default:
      return usageRefusal(
        'cannot-read',
        `${file} cannot be read.`,
        `the system says ${error.code ?? error.message}`,
        'check the path and the device it is on',
        file,
      );
  }
}

function tooLarge(name: string, bytes: Uint8Array, maxBytes: number): Refusal {
  const more = Math.min(4 * maxBytes, limits.mostBytes);
  const where = { file: name, line: 1, column: 1, length: 1 };
  return new Refusal(
    [
      {
        code: 'file-too-large',
        severity: 'error',
        where,
        what: `${name} is larger than ${sizeText(maxBytes)}.`,
        why: 'a plant of 2,000 blocks takes some 0.2 MiB; this is probably another kind of file',
        mend: `name the flowsheet itself${more > maxBytes ? `, or allow more: --max-size '${sizeText(more)}'` : ''}`,
      },
    ],
    { name, text: new TextDecoder().decode(bytes.subarray(0, 200)) },
  );
}

function noFile(file: string): Refusal {
  return usageRefusal(
    'is-a-device',
    `${file} is a disk or another device.`,
    'a flowsheet is one YAML file',
    'name the file itself',
    file,
  );
}

function nearestFile(file: string): string | null {
  const folder = dirname(file);
  try {
    const near = nearest(basename(file), readdirSync(folder));
    if (near === null || near === basename(file)) return null;
    return file.slice(0, file.length - basename(file).length) + near;
  } catch {
    return null;
  }
}
