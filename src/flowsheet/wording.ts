/** Our own words go on in small letters after a name and a colon. */
export function lowerArticle(text: string): string {
  return text.replace(/^(The|A|An|No|None|This|It|Only|Two|There)\b/, (word) => word.toLowerCase());
}

/** A message need not repeat a whole page of the file, nor list a thousand names. */
const LONGEST = 800;

/** A sentence of a message, cut short where it is longer than anybody reads. */
export function readable(text: string): string {
  return text.length > LONGEST ? `${text.slice(0, LONGEST)}...` : text;
}
