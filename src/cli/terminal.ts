import { noPaint, type Paint } from '../sheets/sheet.ts';
import { exitCodes } from './exit-codes.ts';

/** Results go here. */
export function print(text: string): void {
  process.stdout.write(text);
}

/** Results as JSON: one value, indented, nothing else. */
export function printJson(value: unknown): void {
  print(`${JSON.stringify(value, null, 2)}\n`);
}

/** Warnings, progress and errors go here. */
export function say(text: string): void {
  process.stderr.write(text.endsWith('\n') ? text : `${text}\n`);
}

/** Colours for a stream: only on a terminal and never with NO_COLOR (https://no-color.org). */
export function paintFor(stream: NodeJS.WriteStream): Paint {
  return inColour(stream) ? terminalPaint : noPaint;
}

export function inColour(stream: NodeJS.WriteStream): boolean {
  return stream.isTTY === true && !process.env['NO_COLOR'] && process.env['TERM'] !== 'dumb';
}

/** A reader that stops reading (`| head`) ends the program without a word; a full disk is told in one line. */
export function endQuietlyOnClosedPipe(): void {
  for (const stream of [process.stdout, process.stderr]) {
    stream.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code === 'EPIPE') process.exit(process.exitCode ?? exitCodes.done);
      if (stream === process.stdout)
        say(`looptally: the output cannot be written (${error.code ?? error.message})`);
      process.exit(exitCodes.badInput);
    });
  }
}

const terminalPaint: Paint = {
  head: (text) => `\u001b[1m${text}\u001b[22m`,
  alarm: (text) => `\u001b[33m${text}\u001b[39m`,
};
