/** What the tests read out of a page of a study. */
export interface PageRead {
  /** names of all elements outside the style, the script and the data */
  readonly elements: readonly string[];
  /** the text a reader sees, blanks squeezed */
  readonly text: string;
  readonly csv: { readonly name: string; readonly text: string };
  readonly headings: readonly string[];
}

export function readPage(html: string): PageRead {
  const data = /<script type="application\/json" id="looptally-data">([\s\S]*?)<\/script>/.exec(html)![1]!;
  const body = html.replace(/<(style|script)[^>]*>[\s\S]*?<\/\1>/g, '');
  return {
    elements: [...body.matchAll(/<([a-z][\w-]*)/g)].map(([, name]) => name!),
    text: plain(body.replace(/<title[^>]*>[^<]*<\/title>|<wbr>/g, '').replace(/<[^>]*>/g, ' ')).replace(
      /\s+/g,
      ' ',
    ),
    csv: JSON.parse(data).csv,
    headings: [...body.matchAll(/<h2[^>]*>.*?<\/span>([^<]*)</g)].map(([, text]) => plain(text!)),
  };
}

/** Texts that try to become something else. */
export const HOSTILE = [
  '</title><script>alert(1)</script>',
  '"><img src=x onerror=alert(1)>',
  "'; alert(1); //",
  '<!-- </script>',
  '\u202etxt.exe\u2066',
  'x'.repeat(10_000),
  '=HYPERLINK("http://example.com")',
];

function plain(text: string): string {
  return text
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&quot;', '"')
    .replaceAll('&amp;', '&');
}
