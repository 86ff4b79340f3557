import type { Result } from '../../model/result.ts';
import { plainText } from '../plain.ts';
import { arrange } from './arrange.ts';
import { giveDirections } from './directions.ts';
import { flagOf, pressureDecimals } from './flags.ts';
import { type DrawnStream, networkOf } from './network.ts';
import { bareFrame, drawFrame, frameFor } from './sheet-frame.ts';
import {
  type Box,
  escaped,
  FACES,
  LINE,
  line,
  MAIN_LINE,
  MM,
  num,
  type PlacedText,
  type Point,
  SMALL,
} from './svg.ts';
import type { TitleBlock } from './title-block.ts';
import { flagWord, nodeWord } from './words.ts';

export interface DrawingOptions {
  /** the notes of the flowsheet */
  readonly notes?: string;
  /** tag of the product stream */
  readonly product?: string;
  readonly titleBlock?: TitleBlock;
  /**
   * for a page that has a title block of its own: the diagram alone, and words that follow the numbers carry the key
   * by which `drawingWords` names them in data-word
   */
  readonly forPage?: boolean;
  /** version of Looptally, said below the notes */
  readonly version?: string;
}

/** A small flowsheet is drawn larger than a large one, up to this. */
const LARGEST_SCALE = 1.5;
const ORIGIN = { x: 0, y: 0 };

/** Room left around the diagram on a page. */
const MARGIN = 8;

/** A drawing as SVG, and where everything on it stands. */
export interface Drawing {
  readonly svg: string;
  readonly texts: readonly { readonly text: string; readonly box: Box }[];
  readonly symbols: readonly { readonly name: string; readonly kind: string; readonly box: Box }[];
  readonly lines: readonly { readonly tag: string; readonly points: readonly Point[] }[];
}

/** The flow diagram of a result on a sheet with a title block: black on white, in millimetres, without script. */
export async function drawingOf(result: Result, options: DrawingOptions = {}): Promise<Drawing> {
  const network = networkOf(result);
  giveDirections(network);
  const decimals = pressureDecimals(network.streams.map(({ state }) => state.pressure_bar));
  const flags = network.streams.map(({ tag, state }) => flagOf(tag, state, decimals));
  const { boxes, layout } = await arrange(network, result, flags, options.product ?? null);
  const forPage = options.forPage ?? false;
  const frame = forPage ? bareFrame(layout.width, layout.height) : frameFor(layout.width, layout.height);
  const { field } = frame;
  const scale = Math.min(LARGEST_SCALE, field.width / layout.width, field.height / layout.height);
  const by = {
    x: field.x + (field.width - scale * layout.width) / 2,
    y: field.y + (field.height - scale * layout.height) / 2,
  };
  const onSheet = ({ x, y }: Point): Point => ({ x: by.x + scale * x, y: by.y + scale * y });
  const boxOnSheet = (box: Box, corner: Point): Box => ({
    ...onSheet({ x: box.x + corner.x, y: box.y + corner.y }),
    width: scale * box.width,
    height: scale * box.height,
  });

  const edge = forPage
    ? { svg: '', texts: [] }
    : drawFrame(frame, result, {
        notes: options.notes ?? '',
        titleBlock: options.titleBlock ?? {},
        version: options.version,
      });
  const drawnFlags = flags.map((flag, k) => flag.draw(layout.flags[k]!));
  const texts: { text: string; box: Box }[] = [
    ...edge.texts,
    ...drawnFlags.flatMap((flag) =>
      flag.texts.map(({ text, box }) => ({ text, box: boxOnSheet(box, ORIGIN) })),
    ),
  ];
  const symbols: { name: string; kind: string; box: Box }[] = [];
  const nodes = boxes.map((box, k) => {
    const corner = layout.nodes[k]!;
    symbols.push({ name: box.node.name, kind: box.node.kind, box: boxOnSheet(box.symbol, corner) });
    texts.push(...box.texts.map(({ text, box: inner }) => ({ text, box: boxOnSheet(inner, corner) })));
    return `<g transform="translate(${num(corner.x)} ${num(corner.y)})">${box.svg}${words(box.texts, forPage ? nodeWord(k) : null)}</g>`;
  });
  const lines = network.streams.map(({ tag }, k) => ({ tag, points: layout.lines[k]!.map(onSheet) }));
  const { x, y, width, height } = forPage
    ? around([...texts, ...symbols], lines)
    : { x: 0, y: 0, width: frame.width, height: frame.height };
  const corner = x === 0 && y === 0 ? '' : `x="${x}" y="${y}" `;
  const svg = [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width / MM}mm" height="${height / MM}mm" viewBox="${x} ${y} ${width} ${height}">`,
    `<title>${escaped(plainText(result.title) || 'Untitled flowsheet')}</title>`,
    `<rect ${corner}width="${width}" height="${height}" fill="#fff"/>`,
    `<g fill="none" stroke="#000" stroke-width="${LINE}" font-family="${FACES}" font-size="${SMALL}">`,
    ...(forPage ? [] : [`<g id="frame">${edge.svg}${words(edge.texts)}</g>`]),
    `<g transform="translate(${num(by.x)} ${num(by.y)}) scale(${num(scale)})">`,
    `<g ${layer('streams')}>`,
    ...network.streams.map((stream, k) => drawStream(stream, layout.lines[k]!, isReturn(stream))),
    `</g>`,
    `<g ${layer('blocks')}>`,
    ...nodes,
    `</g>`,
    `<g ${layer('flags')}>`,
    ...drawnFlags.map((flag, k) => flag.svg + words(flag.texts, forPage ? flagWord(k) : null)),
    `</g>`,
    `</g>`,
    `</g>`,
    `</svg>`,
    '',
  ].join('\n');
  return { svg, texts, symbols, lines };

  /** An id belongs to one drawing in a file of its own; in a page it might meet another. */
  function layer(name: string): string {
    return forPage ? `class="${name}"` : `id="${name}"`;
  }

  function isReturn({ loop, back, from }: DrawnStream): boolean {
    return back || (loop && network.lanes[from]!.returning);
  }
}

/** @param key  names each word for a script that lets it follow the numbers; null where nothing does */
function words(texts: readonly PlacedText[], key: ((line: number) => string) | null = null): string {
  const each = texts.map(({ svg }, line) =>
    key === null ? svg : svg.replace('<text ', `<text data-word="${key(line)}" `),
  );
  return `<g fill="#000" stroke="none">${each.join('')}</g>`;
}

const HEAD = 9;

/** A stream with its head; two heads on the way back of a recycle. */
function drawStream({ loop }: DrawnStream, points: readonly Point[], isReturn: boolean): string {
  const end = points.at(-1)!;
  const before = points.at(-2) ?? end;
  const length = Math.hypot(end.x - before.x, end.y - before.y) || 1;
  const along = { x: (end.x - before.x) / length, y: (end.y - before.y) / length };
  const head = (back: number): string => {
    const tip = { x: end.x - back * along.x, y: end.y - back * along.y };
    const foot = { x: tip.x - HEAD * along.x, y: tip.y - HEAD * along.y };
    const [a, b] = [1, -1].map(
      (side) => `${num(foot.x - 4 * side * along.y)} ${num(foot.y + 4 * side * along.x)}`,
    );
    return `<path d="M${num(tip.x)} ${num(tip.y)}L${a}L${b}Z" fill="#000" stroke="none"/>`;
  };
  // The line ends inside its head, so that the tip stays sharp.
  const shortened = [
    ...points.slice(0, -1),
    { x: end.x - 0.6 * HEAD * along.x, y: end.y - 0.6 * HEAD * along.y },
  ];
  return line(shortened, loop ? MAIN_LINE : LINE) + head(0) + (isReturn ? head(HEAD) : '');
}

/** The whole numbers around all that is drawn. */
function around(boxed: readonly { readonly box: Box }[], lines: Drawing['lines']): Box {
  const points = [
    ...boxed.flatMap(({ box }) => [box, { x: box.x + box.width, y: box.y + box.height }]),
    ...lines.flatMap((line) => line.points),
  ];
  const low = (values: number[]) => Math.floor(Math.min(...values) - MARGIN);
  const high = (values: number[]) => Math.ceil(Math.max(...values) + MARGIN);
  const xs = points.map((point) => point.x);
  const ys = points.map((point) => point.y);
  return { x: low(xs), y: low(ys), width: high(xs) - low(xs), height: high(ys) - low(ys) };
}
