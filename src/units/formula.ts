import { formulaFunctions } from './formula-functions.ts';
import { type FormulaFault, FormulaRefusal, refuse, type Token, tokensOf } from './formula-tokens.ts';
import { nearest } from './nearest.ts';
import { isTooSmall } from './no-quantity.ts';

export type { FormulaFault };

/** A dotted name in a formula, e.g. streams.S2.y.Ar, and where it stands in the text. */
export interface FormulaName {
  readonly parts: readonly string[];
  readonly offset: number;
  readonly length: number;
}

export type FormulaScope = Readonly<Record<string, unknown>>;

export interface CompiledFormula {
  readonly ok: true;
  /** the value; NaN where a name does not lead to a number */
  readonly evaluate: (scope: FormulaScope) => number;
  readonly names: readonly FormulaName[];
}

/**
 * Compile the text of a formula into nested closures over numbers:
 *
 *   sum     = product { (+|-) product }        product = signed { (*|/) signed }
 *   signed  = (+|-) signed | power             power   = atom [ ^ signed ]
 *   atom    = number | pi | e | function ( sum {, sum} ) | name { . name } | ( sum )
 *
 * so that -2^2 is -4 and 2^3^2 is 2^9. Names are looked up among the own properties of the scope and nowhere
 * else; all that is not in this grammar is refused, with its place.
 *
 * @param roots  what names may begin with, e.g. streams, or T
 */
export function compileFormula(text: string, roots: readonly string[]): CompiledFormula | FormulaFault {
  try {
    const parser: Parser = { text, roots, tokens: tokensOf(text), at: 0, depth: 0, names: [] };
    const evaluate = readSum(parser);
    const rest = peek(parser);
    if (rest !== null) throw refusedRest(rest);
    return { ok: true, evaluate, names: parser.names };
  } catch (trouble) {
    if (trouble instanceof FormulaRefusal) return trouble.fault;
    throw trouble;
  }
}

type Evaluate = (scope: FormulaScope) => number;

interface Parser {
  readonly text: string;
  readonly roots: readonly string[];
  readonly tokens: readonly Token[];
  at: number;
  depth: number;
  readonly names: FormulaName[];
}

const constants: ReadonlyMap<string, number> = new Map([
  ['pi', Math.PI],
  ['e', Math.E],
]);
/** Brackets and signs inside each other: more than any formula needs. */
const DEEPEST = 60;
const GRAMMAR = 'a formula knows numbers, names, + - * / ^, brackets and a few functions, nothing else';
const EXAMPLE = 'write it as in streams.S2.y.Ar + 2 * streams.S2.y.CH4';

function peek(parser: Parser): Token | null {
  return parser.tokens[parser.at] ?? null;
}

/** Take the next token where it is this sign. */
function takes(parser: Parser, sign: string): boolean {
  const token = peek(parser);
  if (token?.kind !== 'sign' || token.text !== sign) return false;
  parser.at++;
  return true;
}

function readSum(parser: Parser): Evaluate {
  let left = readProduct(parser);
  for (;;) {
    const a = left;
    if (takes(parser, '+')) {
      const b = readProduct(parser);
      left = (scope) => a(scope) + b(scope);
    } else if (takes(parser, '-')) {
      const b = readProduct(parser);
      left = (scope) => a(scope) - b(scope);
    } else return left;
  }
}

function readProduct(parser: Parser): Evaluate {
  let left = readSigned(parser);
  for (;;) {
    const a = left;
    if (takes(parser, '*')) {
      const b = readSigned(parser);
      left = (scope) => a(scope) * b(scope);
    } else if (takes(parser, '/')) {
      const b = readSigned(parser);
      left = (scope) => a(scope) / b(scope);
    } else return left;
  }
}

function readSigned(parser: Parser): Evaluate {
  const here = peek(parser) ?? endOf(parser);
  if (++parser.depth > DEEPEST) {
    throw refuse(
      here,
      'the formula nests too deep.',
      `more than ${DEEPEST} brackets or signs inside each other cannot be meant`,
      'split it into figures',
    );
  }
  const value = takes(parser, '-')
    ? negative(readSigned(parser))
    : takes(parser, '+')
      ? readSigned(parser)
      : readPower(parser);
  parser.depth--;
  return value;
}

function negative(value: Evaluate): Evaluate {
  return (scope) => -value(scope);
}

function readPower(parser: Parser): Evaluate {
  const base = readAtom(parser);
  if (!takes(parser, '^')) return base;
  const exponent = readSigned(parser);
  return (scope) => base(scope) ** exponent(scope);
}

function readAtom(parser: Parser): Evaluate {
  const token = peek(parser);
  if (token === null) {
    const what = parser.tokens.length === 0 ? 'the formula is empty.' : 'the formula breaks off.';
    throw refuse(endOf(parser), what, 'a number, a name or a bracket is expected here', EXAMPLE);
  }
  parser.at++;
  if (token.kind === 'number') {
    const value = Number(token.text);
    const [size, mend] = Number.isFinite(value)
      ? ['small', 'write a larger number, or 0']
      : ['large', 'write a smaller number'];
    if (size === 'large' || isTooSmall(value, token.text)) {
      throw refuse(token, `${token.text} is too ${size}.`, 'it is beyond what a number can hold', mend);
    }
    return () => value;
  }
  if (token.kind === 'name') {
    const next = peek(parser);
    return next?.kind === 'sign' && next.text === '(' ? readCall(parser, token) : nameOf(parser, token);
  }
  if (token.text !== '(') {
    throw refuse(
      token,
      `"${token.text}" cannot stand here.`,
      'a number, a name or a bracket is expected here',
      EXAMPLE,
    );
  }
  const value = readSum(parser);
  closeBracket(parser, token);
  return value;
}

function closeBracket(parser: Parser, opening: Token): void {
  if (takes(parser, ')')) return;
  const rest = peek(parser);
  if (rest !== null && !(rest.kind === 'sign' && rest.text === ',')) throw refusedRest(rest);
  throw refuse(
    opening,
    'a bracket of the formula is never closed.',
    'the matching ) is missing',
    'close it with )',
  );
}

function readCall(parser: Parser, token: Token): Evaluate {
  const name = token.text;
  const known = formulaFunctions.get(name);
  if (known === undefined) {
    const near = nearest(name, formulaFunctions.keys());
    const why =
      near === null ? 'no function of that name' : `no function of that name; the nearest is ${near}`;
    const list = [...formulaFunctions.keys()].join(', ');
    throw refuse(token, `the function ${name} is not known in a formula.`, why, `use one of ${list}`);
  }
  const opening = parser.tokens[parser.at++];
  const args: Evaluate[] = [];
  if (!takes(parser, ')')) {
    do args.push(readSum(parser));
    while (takes(parser, ','));
    closeBracket(parser, opening);
  }
  const { apply, least, most } = known;
  if (args.length < least || args.length > most) {
    const wants = least === most ? `${least}` : `${least} to ${most}`;
    const why = `it takes ${wants} value${wants === '1' ? '' : 's'}, and ${args.length} stand${args.length === 1 ? 's' : ''} here`;
    throw refuse(token, `the function ${name} has the wrong number of values.`, why, `give it ${wants}`);
  }
  const [first, second] = args;
  if (args.length === 1) return (scope) => apply(first(scope));
  if (args.length === 2) return (scope) => apply(first(scope), second(scope));
  return (scope) => apply(...args.map((arg) => arg(scope)));
}

function nameOf(parser: Parser, token: Token): Evaluate {
  const parts = token.text.split('.');
  const { offset, length } = token;
  const constant = constants.get(token.text);
  if (constant !== undefined && !parser.roots.includes(token.text)) return () => constant;
  const forbidden = parts.find(
    (part) => part === '__proto__' || part === 'constructor' || part === 'prototype',
  );
  if (forbidden !== undefined) {
    throw refuse(token, `${token.text} is refused.`, `no part of a plant is called ${forbidden}`, EXAMPLE);
  }
  if (!parser.roots.includes(parts[0])) {
    const near = nearest(parts[0], parser.roots);
    const known = parser.roots.join(', ');
    const why =
      near === null ? `a name begins with: ${known}` : `a name begins with: ${known}; the nearest is ${near}`;
    const mend =
      near === null ? `begin with ${parser.roots[0]}` : `write ${[near, ...parts.slice(1)].join('.')}`;
    throw refuse(token, `${token.text} is not known here.`, why, mend);
  }
  parser.names.push({ parts, offset, length });
  return (scope) => lookUp(scope, parts);
}

function lookUp(scope: FormulaScope, parts: readonly string[]): number {
  let value: unknown = scope;
  for (const part of parts) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, part)) return Number.NaN;
    value = (value as FormulaScope)[part];
  }
  return typeof value === 'number' ? value : Number.NaN;
}

/** What cannot follow a finished expression. */
function refusedRest(token: Token): FormulaRefusal {
  if (token.kind !== 'sign' || token.text === '(') {
    const why = 'two values stand side by side with nothing between them';
    return refuse(
      token,
      'an operator is missing in the formula.',
      why,
      'write * for a product; a unit has no place in a formula',
    );
  }
  if (token.text === ')') {
    return refuse(
      token,
      'a bracket of the formula was never opened.',
      'this ) has no ( before it',
      'take it out, or open it',
    );
  }
  return refuse(token, `"${token.text}" cannot stand here.`, GRAMMAR, EXAMPLE);
}

function endOf(parser: Parser): { readonly offset: number; readonly length: number } {
  return { offset: Math.max(0, parser.text.trimEnd().length - 1), length: 1 };
}
