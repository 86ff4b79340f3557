import { extname } from 'node:path';
import { usageRefusal } from './refusal.ts';

/** The renderer for a file by its ending; `noun` is what is written. */
export function rendererOf<Render>(
  path: string,
  renderers: ReadonlyMap<string, Render>,
  noun: string,
): Render {
  const extension = extname(path).toLowerCase();
  const render = renderers.get(extension);
  if (render !== undefined) return render;
  const endings = [...renderers.keys()];
  throw usageRefusal(
    'unknown-format',
    extension === ''
      ? `${path} does not say its format.`
      : `No ${noun} is written in the format ${extension}.`,
    `the ending of the name says the format; there are ${endings.join(' and ')}`,
    `write --out ${path.slice(0, path.length - extension.length)}${endings[0]}`,
    path,
  );
}
