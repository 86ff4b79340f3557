import type { Box } from '../../../src/sheets/drawing/svg.ts';
import { textWidth } from '../../../src/sheets/drawing/text-width.ts';

export interface ChartText {
  readonly text: string;
  readonly box: Box;
}

/** The texts of a chart with the room that they take, read from its markup. */
export function textsOf(svg: string): ChartText[] {
  return [...svg.matchAll(/<text ([^>]*)>(?:<title>[^<]*<\/title>)?([^<]*)<\/text>/g)].map(
    ([, attributes, said]) => {
      const value = (name: string) => new RegExp(`(?:^| )${name}="([^"]*)"`).exec(attributes!)?.[1];
      const text = plain(said!);
      const size = Number(value('font-size') ?? 12);
      const width = textWidth(text, size, value('font-weight') === 'bold');
      const anchor = value('text-anchor') ?? 'start';
      const left = Number(value('x')) - (anchor === 'start' ? 0 : anchor === 'end' ? width : width / 2);
      return { text, box: { x: left, y: Number(value('y')) - 0.78 * size, width, height: size } };
    },
  );
}

/** Texts that lie over one another or reach out of the picture, in words. */
export function clashes(svg: string): string[] {
  const [width, height] = /viewBox="0 0 ([\d.]+) ([\d.]+)"/.exec(svg)!.slice(1).map(Number);
  const texts = textsOf(svg);
  const found: string[] = [];
  for (const [k, { text, box }] of texts.entries()) {
    if (box.x < 0 || box.y < 0 || box.x + box.width > width! + 0.5 || box.y + box.height > height!)
      found.push(`${text} reaches out of the picture`);
    for (const other of texts.slice(k + 1)) {
      if (
        box.x + 0.5 < other.box.x + other.box.width &&
        other.box.x + 0.5 < box.x + box.width &&
        box.y + 0.5 < other.box.y + other.box.height &&
        other.box.y + 0.5 < box.y + box.height
      )
        found.push(`${text} on ${other.text}`);
    }
  }
  return found;
}

/** Attributes of that name, in their order. */
export function attributesOf(svg: string, name: string): string[] {
  return [...svg.matchAll(new RegExp(` ${name}="([^"]*)"`, 'g'))].map((match) => plain(match[1]!));
}

function plain(text: string): string {
  return text
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&quot;', '"')
    .replaceAll('&amp;', '&');
}
