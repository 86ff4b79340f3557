import { readdirSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { basename, dirname } from 'node:path';
import { nearest } from '../units/nearest.ts';
import { type Refusal, type Source, usageRefusal } from './refusal.ts';

/** More than any flowsheet written by hand; keeps a mistyped disk image out of memory. */
const LARGEST_BYTES = 16 * 1024 * 1024;

/** The text of a file, `-` for standard input. Refuses what is no readable UTF-8 text. */
export async function readSource(file: string): Promise<Source> {
  const name = file === '-' ? 'standard input' : file;
  let bytes: Uint8Array;
  try {
    bytes = file === '-' ? await readStandardInput() : await readFile(file);
  } catch (error) {
    throw unreadable(file, error as NodeJS.ErrnoException);
  }
  if (bytes.length > LARGEST_BYTES) throw tooLarge(file, name);
  return { name, text: decoded(bytes, file, name) };
}

async function readStandardInput(): Promise<Uint8Array> {
  const chunks: Uint8Array[] = [];
  let length = 0;
  for await (const chunk of process.stdin) {
    chunks.push(chunk as Uint8Array);
    length += (chunk as Uint8Array).length;
    if (length > LARGEST_BYTES) break;
  }
  return Buffer.concat(chunks);
}

function decoded(bytes: Uint8Array, file: string, name: string): string {
  let text: string | null = null;
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    // told below, together with text that only looks like text
  }
  if (text === null || text.includes('\0')) {
    throw usageRefusal(
      'not-text',
      `${name} is not a text file.`,
      'it holds bytes that are no UTF-8 text; a flowsheet is a YAML file',
      'name the YAML file, or save it again with the encoding UTF-8',
      file,
    );
  }
  return text;
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

function tooLarge(file: string, name: string): Refusal {
  return usageRefusal(
    'too-large',
    `${name} is larger than 16 MB.`,
    'no flowsheet is; this is probably another kind of file',
    'name the YAML file of the flowsheet',
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
