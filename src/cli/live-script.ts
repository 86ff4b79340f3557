import { readFileSync } from 'node:fs';

/**
 * The script of a live page, which the build lays beside the command.
 *
 * @throws Error where this build has none, which is a fault of the build
 */
export function liveScript(): string {
  for (const place of ['./live.js', '../live.js']) {
    try {
      return readFileSync(new URL(place, import.meta.url), 'utf8');
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
    }
  }
  throw new Error('this build of Looptally has no live.js');
}
