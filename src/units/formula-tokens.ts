/** Why a formula is refused, and the stretch of its text that is to blame; plain sentences for a Diagnostic. */
export interface FormulaFault {
  readonly ok: false;
  readonly offset: number;
  readonly length: number;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

/** Thrown inside the compiler only; compileFormula hands its fault back as a value. */
export class FormulaRefusal extends Error {
  readonly fault: FormulaFault;

  constructor(fault: FormulaFault) {
    super(fault.what);
    this.fault = fault;
  }
}

export interface Token {
  readonly kind: 'number' | 'name' | 'sign';
  readonly text: string;
  readonly offset: number;
  readonly length: number;
}

export function refuse(
  { offset, length }: { readonly offset: number; readonly length: number },
  what: string,
  why: string,
  mend: string,
): FormulaRefusal {
  return new FormulaRefusal({ ok: false, offset, length, what, why, mend });
}

const LONGEST = 1000;
const pattern =
  /\s+|(?<number>(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)|(?<name>[A-Za-z_][A-Za-z0-9_]*(?:\.[A-Za-z_][A-Za-z0-9_]*)*)|(?<sign>[-+*/^(),])/y;

/** Numbers, dotted names and signs of a formula. @throws FormulaRefusal at the first character of none of them */
export function tokensOf(text: string): readonly Token[] {
  if (text.length > LONGEST) {
    const why = `a formula has at most ${LONGEST} characters`;
    throw refuse(
      { offset: 0, length: text.length },
      'the formula is too long.',
      why,
      'split it into shorter figures',
    );
  }
  const tokens: Token[] = [];
  pattern.lastIndex = 0;
  while (pattern.lastIndex < text.length) {
    const offset = pattern.lastIndex;
    const match = pattern.exec(text);
    if (match === null) throw refuseCharacter(text, offset);
    const { number, name, sign } = match.groups ?? {};
    const kind = number !== undefined ? 'number' : name !== undefined ? 'name' : 'sign';
    if ((number ?? name ?? sign) !== undefined)
      tokens.push({ kind, text: match[0], offset, length: match[0].length });
  }
  return tokens;
}

function refuseCharacter(text: string, offset: number): FormulaRefusal {
  const place = { offset, length: 1 };
  const character = text[offset];
  if (character === '%') {
    const why = 'a fraction in a formula is 0 to 1';
    return refuse(place, 'a formula has no per cent sign.', why, 'write 0.03 for 3 %');
  }
  if (character === '=') {
    const why = 'a formula computes one value and changes nothing';
    return refuse(place, 'a formula has no = in it.', why, 'take it out, and what stands before it');
  }
  if (character === '.') {
    const why = 'a dot joins two names or stands in a number';
    return refuse(place, 'a dot stands alone in the formula.', why, 'write it as in streams.S2.y.Ar');
  }
  const why = 'a formula knows numbers, names, + - * / ^, brackets ( ) and a few functions, nothing else';
  return refuse(
    place,
    `"${character}" has no meaning in a formula.`,
    why,
    'write it as in streams.S2.y.Ar + 2 * streams.S2.y.CH4',
  );
}
