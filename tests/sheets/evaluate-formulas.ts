import type { ReadBook } from './read-workbook.ts';

/**
 * Works out the formulas of a workbook from its numbers alone, whatever values stand beside the formulas: + − * /,
 * >, brackets, SUM, SUMPRODUCT, ABS, IF, cells, ranges and names.
 */
export function createEvaluator({ cells, names }: Pick<ReadBook, 'cells' | 'names'>) {
  const known = new Map<string, number>();
  const busy = new Set<string>();

  function cell(address: string): number {
    const found = known.get(address);
    if (found !== undefined) return found;
    const { value, formula } = cells.get(address) ?? { value: null, formula: null };
    if (busy.has(address)) throw new Error(`${address} depends on itself`);
    busy.add(address);
    const number = formula === null ? (value ?? 0) : evaluate(formula);
    busy.delete(address);
    known.set(address, number);
    return number;
  }

  function evaluate(formula: string): number {
    const tokens =
      formula.match(
        /[A-Za-z_]\w*![A-Z]+\d+(?::[A-Z]+\d+)?|[A-Za-z_]\w*|\d+(?:\.\d+)?(?:E[+-]?\d+)?|[-+*/(),>]/g,
      ) ?? [];
    if (tokens.join('') !== formula) throw new Error(`what is ${formula}?`);
    let at = 0;
    const take = (wanted: string) => {
      if (tokens[at++] !== wanted)
        throw new Error(`${formula}: ${wanted} is missing before ${tokens[at - 1]}`);
    };
    const one = (values: readonly number[]) => {
      if (values.length !== 1) throw new Error(`${formula}: one number is wanted`);
      return values[0]!;
    };

    const comparison = (): number[] => {
      const left = sum();
      if (tokens[at] !== '>') return left;
      at++;
      return [one(left) > one(sum()) ? 1 : 0];
    };
    const sum = (): number[] => {
      let value = term();
      while (tokens[at] === '+' || tokens[at] === '-') {
        const sign = tokens[at++] === '+' ? 1 : -1;
        value = [one(value) + sign * one(term())];
      }
      return value;
    };
    const term = (): number[] => {
      let value = factor();
      while (tokens[at] === '*' || tokens[at] === '/') {
        const isProduct = tokens[at++] === '*';
        const by = one(factor());
        value = [isProduct ? one(value) * by : one(value) / by];
      }
      return value;
    };
    const factor = (): number[] => {
      const token = tokens[at++]!;
      if (token === '-') return [-one(factor())];
      if (token === '(') {
        const value = comparison();
        take(')');
        return value;
      }
      if (/^\d/.test(token)) return [Number(token)];
      if (tokens[at] === '(') return call(token);
      const reference = token.includes('!') ? token : names.get(token);
      if (reference === undefined) throw new Error(`nothing is called ${token}`);
      return range(reference).map(cell);
    };
    const call = (name: string): number[] => {
      const given: number[][] = [];
      take('(');
      do given.push(comparison());
      while (tokens[at++] === ',');
      const [a = [], b = [], c = []] = given;
      if (name === 'SUM') return [given.flat().reduce((all, value) => all + value, 0)];
      if (name === 'ABS') return a.map(Math.abs);
      if (name === 'IF') return one(a) === 1 ? b : c;
      if (name === 'SUMPRODUCT') {
        if (given.some((values) => values.length !== a.length)) throw new Error(`${formula}: lengths differ`);
        return [a.reduce((all, _, k) => all + given.reduce((p, values) => p * values[k]!, 1), 0)];
      }
      throw new Error(`${name} is not known`);
    };
    const value = one(comparison());
    if (at !== tokens.length) throw new Error(`${formula}: ${tokens[at]} is left over`);
    return value;
  }
  return { cell, name: (name: string) => evaluate(name) };
}

/** The addresses of a range, row by row. */
function range(reference: string): string[] {
  const [, sheet, from, top, to = from, bottom = top] = /^(\w+)!([A-Z]+)(\d+)(?::([A-Z]+)(\d+))?$/.exec(
    reference,
  )!;
  const addresses: string[] = [];
  for (let row = Number(top); row <= Number(bottom); row++)
    for (let column = columnNumber(from!); column <= columnNumber(to!); column++)
      addresses.push(`${sheet}!${columnLetters(column)}${row}`);
  return addresses;
}

export function columnNumber(letters: string): number {
  return [...letters].reduce((number, letter) => 26 * number + letter.charCodeAt(0) - 64, 0);
}

function columnLetters(number: number): string {
  if (number === 0) return '';
  return columnLetters(Math.floor((number - 1) / 26)) + String.fromCharCode(65 + ((number - 1) % 26));
}
