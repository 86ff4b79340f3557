/**
 * Is a text well-formed XML, as strictly as a drawing needs it: one root, every tag closed in order, attributes quoted
 * and not given twice, only the five named entities, no character that XML 1.0 forbids? Hands back the names of the
 * elements and the text in them; throws where it is not.
 */
export function parseXml(source: string): { elements: string[]; texts: string[] } {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: exactly those are forbidden
  const forbidden = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|\p{Cs}/u;
  if (forbidden.test(source)) throw new Error('a character that XML forbids');
  const elements: string[] = [];
  const texts: string[] = [];
  const open: string[] = [];
  const token = /<(\/?)([A-Za-z][\w:-]*)((?:\s+[A-Za-z][\w:-]*="[^"<]*")*)\s*(\/?)>|([^<]+)/gy;
  let roots = 0;
  while (token.lastIndex < source.length) {
    const at = token.lastIndex;
    const match = token.exec(source);
    if (match === null) throw new Error(`no XML: ${source.slice(at, at + 60)}`);
    const [, closes, name, attributes = '', empty, text] = match;
    checkEntities(text ?? attributes);
    if (text !== undefined) {
      if (open.length === 0 && text.trim() !== '') throw new Error('text outside the root');
      texts.push(text);
    } else if (closes === '/') {
      if (open.pop() !== name) throw new Error(`</${name}> closes nothing`);
    } else {
      if (open.length === 0) roots++;
      const names = [...attributes.matchAll(/([\w:-]+)="[^"]*"/g)].map((each) => each[1]);
      if (new Set(names).size < names.length) throw new Error(`an attribute given twice:${attributes}`);
      elements.push(name!);
      if (empty !== '/') open.push(name!);
    }
  }
  if (open.length > 0 || roots !== 1) throw new Error(`left open: ${open.join(', ')}; roots: ${roots}`);
  return { elements, texts };
}

function checkEntities(text: string): void {
  if (/&(?!(?:amp|lt|gt|quot|apos);)/.test(text)) throw new Error('a bare &');
}
