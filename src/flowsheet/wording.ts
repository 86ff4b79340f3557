/** Our own words go on in small letters after a name and a colon. */
export function lowerArticle(text: string): string {
  return text.replace(/^(The|A|An|No|None|This|It|Only|Two|There)\b/, (word) => word.toLowerCase());
}
