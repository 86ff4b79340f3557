import { strFromU8, unzipSync } from 'fflate';

export interface ReadCell {
  readonly value: number | null;
  readonly text: string | null;
  readonly formula: string | null;
}

export interface ReadBook {
  /** XML by the name of the part */
  readonly parts: Readonly<Record<string, string>>;
  /** XML of a sheet by its name */
  readonly sheets: ReadonlyMap<string, string>;
  /** cells by sheet!address */
  readonly cells: Map<string, ReadCell>;
  /** what each defined name stands for, $ left out; print titles are not among them */
  readonly names: ReadonlyMap<string, string>;
  readonly printTitles: readonly string[];
}

/** A workbook taken apart; throws where a part is no well-formed XML. */
export function readWorkbook(bytes: Uint8Array): ReadBook {
  const parts = Object.fromEntries(
    Object.entries(unzipSync(bytes)).map(([name, content]) => [name, strFromU8(content)]),
  );
  for (const [name, xml] of Object.entries(parts)) checkXml(name, xml);
  const book = parts['xl/workbook.xml']!;
  const targets = new Map(
    elements(parts['xl/_rels/workbook.xml.rels']!, 'Relationship').map(({ attributes: a }) => [
      a['Id']!,
      `xl/${a['Target']!}`,
    ]),
  );
  const sheets = new Map(
    elements(book, 'sheet').map(({ attributes: a }) => [a['name']!, parts[targets.get(a['r:id']!)!]!]),
  );
  const shared = elements(parts['xl/sharedStrings.xml'] ?? '', 'si').map(({ inside }) => textOf(inside));
  const cells = new Map<string, ReadCell>();
  for (const [name, xml] of sheets) {
    for (const { attributes, inside } of elements(xml, 'c')) {
      const v = elements(inside, 'v')[0]?.inside;
      const kind = attributes['t'] ?? 'n';
      const text = kind === 'inlineStr' ? textOf(inside) : kind === 's' ? shared[Number(v)]! : null;
      const formula = elements(inside, 'f')[0]?.inside;
      cells.set(`${name}!${attributes['r']}`, {
        value: text !== null || v === undefined ? null : Number(v),
        text,
        formula: formula === undefined ? null : plain(formula),
      });
    }
  }
  const defined = elements(book, 'definedName').map(
    ({ attributes, inside }) => [attributes['name']!, plain(inside).replaceAll('$', '')] as const,
  );
  return {
    parts,
    sheets,
    cells,
    names: new Map(defined.filter(([name]) => !name.startsWith('_xlnm'))),
    printTitles: defined.filter(([name]) => name === '_xlnm.Print_Titles').map(([, range]) => range),
  };
}

interface Element {
  readonly attributes: Readonly<Record<string, string>>;
  readonly inside: string;
}

/** All elements of a name that do not hold one of the same name. */
export function elements(xml: string, name: string): Element[] {
  const found = new RegExp(`<${name}((?:\\s[^>]*?)?)(?:/>|>(.*?)</${name}>)`, 'gs');
  return [...xml.matchAll(found)].map(([, head, inside]) => ({
    attributes: Object.fromEntries(
      [...head!.matchAll(/([\w:]+)="([^"]*)"/g)].map(([, key, value]) => [key, plain(value!)]),
    ),
    inside: inside ?? '',
  }));
}

function textOf(xml: string): string {
  return elements(xml, 't')
    .map(({ inside }) => plain(inside))
    .join('')
    .replace(/_x([0-9A-Fa-f]{4})_/g, (_, code) => String.fromCharCode(Number.parseInt(code, 16)));
}

function plain(xml: string): string {
  const marks: Record<string, string> = { lt: '<', gt: '>', quot: '"', apos: "'", amp: '&' };
  return xml.replace(/&(\w+);/g, (_, mark) => marks[mark]!);
}

/** Tags that close in order, no bare & or <, no character that XML 1.0 forbids. */
function checkXml(name: string, xml: string): void {
  const open: string[] = [];
  const body = xml.replace(/^<\?xml [^?]*\?>\s*/, '');
  for (const token of body.match(/<[^>]*>|[^<]+/g) ?? []) {
    const [, closing, tag, selfClosing] =
      /^<(\/?)([\w:]+)(?:\s+[\w:]+="[^"<]*")*\s*(\/?)>$/.exec(token) ?? [];
    if (tag === undefined) {
      if (token.startsWith('<') || />|&(?!(?:lt|gt|quot|apos|amp|#\d+);)/.test(token))
        throw new Error(`${name}: ${token.slice(0, 80)} is no XML`);
    } else if (closing) {
      if (open.pop() !== tag) throw new Error(`${name}: </${tag}> closes nothing`);
    } else if (!selfClosing) open.push(tag);
  }
  if (open.length > 0) throw new Error(`${name}: ${open.join(', ')} left open`);
  // biome-ignore lint/suspicious/noControlCharactersInRegex: exactly those must be absent
  const forbidden = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])/;
  if (forbidden.test(xml)) throw new Error(`${name}: a character that XML does not allow`);
}
