import type { Result } from '../../model/result.ts';
import { madeBy, studyTool } from '../cautions.ts';
import { closingLine } from '../text.ts';
import { type Box, LINE, line, MAIN_LINE, type PlacedText, SMALL, text } from './svg.ts';
import { textWidth } from './text-width.ts';

const ROW = 13;

/** What the lines mean, what the user noted, what the drawing is not and who made it. */
export function drawNotes(
  box: Box,
  result: Result,
  ownNotes: string,
  version: string | undefined,
): { svg: string; texts: PlacedText[] } {
  const x = box.x + 10;
  const width = box.width - 20;
  const texts: PlacedText[] = [];
  let y = box.y + 16;
  const heads = [
    'At every stream its tag, temperature, pressure (absolute) and flow.',
    ...(result.convergence.converged ? [] : [closingLine(result)]),
    ...(result.warnings.length === 0
      ? []
      : [`Warnings (${result.warnings.length}) stand in the sheet of the result.`]),
  ];
  texts.push(text('Key and notes', x, y, { bold: true }));
  const maker = version === undefined ? '' : madeBy(version);
  if (maker !== '') texts.push(text(maker, x + width - textWidth(maker, SMALL), y));
  y += ROW + 2;
  const svg =
    line(
      [
        { x, y: y - 4 },
        { x: x + 34, y: y - 4 },
      ],
      MAIN_LINE,
    ) +
    line(
      [
        { x, y: y + ROW - 4 },
        { x: x + 34, y: y + ROW - 4 },
      ],
      LINE,
    ) +
    line(
      [
        { x: box.x, y: box.y },
        { x: box.x + box.width, y: box.y },
      ],
      LINE,
    );
  texts.push(
    text('heavy line: goes round in a recycle; double head: on the way back', x + 42, y, {
      width: width - 42,
    }),
  );
  y += ROW;
  texts.push(text('light line: passes once', x + 42, y, { width: width - 42 }));
  y += ROW;
  const rows = Math.floor((box.y + box.height - 6 - y) / ROW);
  const warning = broken(`${studyTool} What was assumed stands in the sheet of the result.`, width, 4);
  const own =
    ownNotes === ''
      ? []
      : broken(`Notes: ${ownNotes}`, width, Math.max(1, rows - warning.length - heads.length));
  for (const row of [...heads, ...own, ...warning]) {
    texts.push(text(row, x, y, { width }));
    y += ROW;
  }
  return { svg, texts };
}

/** Text in lines of a width; the last line that there is room for takes the rest and is clipped when drawn. */
function broken(content: string, width: number, most: number): string[] {
  const lines: string[] = [];
  let current = '';
  const words = content.split(/\s+/);
  for (const [k, word] of words.entries()) {
    const longer = current === '' ? word : `${current} ${word}`;
    if (current !== '' && textWidth(longer.slice(0, 400), SMALL) > width) {
      if (lines.length === most - 1) return [...lines, [current, ...words.slice(k)].join(' ')];
      lines.push(current);
      current = word;
    } else current = longer;
  }
  return [...lines, current];
}
