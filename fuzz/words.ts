import type { Chance } from './chance.ts';
import type { Corpus } from './corpus.ts';

const EXTREMES = [
  ...[
    '0',
    '-0',
    '1',
    '-1',
    '1e-300',
    '5e-324',
    '1e300',
    '1.7976931348623157e308',
    '-1e300',
    '1e9',
    '1e-9',
    '1e15',
    '-273.15',
  ],
  ...[
    '1e999',
    'NaN',
    'Infinity',
    '.inf',
    '',
    '100',
    '99.999999999',
    '1e-16',
    '0.5',
    '3,5',
    '1e',
    '--1',
    '0x10',
    '1_0',
  ],
];
const UNITS = [
  ...[
    '',
    '%',
    'K',
    'degC',
    'degF',
    'bar',
    'barg',
    'psig',
    'atm',
    'Pa',
    'kmol/h',
    't/d',
    'kg/h',
    'Nm3/h',
    'MMscf/d',
    'kW',
    'MW',
  ],
  ...[
    'kJ/mol',
    'mol',
    'furlong',
    'hour',
    'bar/bar',
    'm3 Pa',
    'EUR/t',
    'EUR/MWh',
    'kmol/h kmol/h',
    '1/s',
    'm^1000',
    'degC/K',
  ],
];
const PIECES = [
  ...[
    '+',
    '-',
    '*',
    '/',
    '^',
    '(',
    ')',
    '.',
    ',',
    ' ',
    '1',
    '2.5',
    '1e308',
    '.5',
    'e',
    'pi',
    '%',
    '!',
    '=',
    '[',
    ']',
    '"',
    '\\',
  ],
  ...[
    'min',
    'max',
    'sqrt',
    'exp',
    'log',
    'abs',
    'streams',
    'S2',
    'y',
    'Ar',
    'n',
    'T',
    'P',
    'blocks',
    'figures',
    'user',
    'power',
  ],
  ...[
    '__proto__',
    'constructor',
    'toString',
    'hasOwnProperty',
    'streams.S2.y.Ar',
    'figures.recycle_ratio',
    'process',
    '\u00b2',
    '\u0661',
  ],
];

/** A number, or what looks like one, with a unit that may or may not fit. */
export function quantityText(chance: Chance, corpus: Corpus): string {
  switch (chance.below(4)) {
    case 0:
      return chance.pick(corpus.scalars);
    case 1:
      return `${chance.pick(EXTREMES)} ${chance.pick(UNITS)}`;
    case 2:
      return `${(chance.below(2000) - 500) / 10 ** chance.below(5)} ${chance.pick(UNITS)}`;
    default:
      return Array.from({ length: chance.below(6) }, () => chance.pick([...EXTREMES, ...UNITS, ' '])).join(
        '',
      );
  }
}

/** A scalar where another stood: near to it most times, far off at others. */
export function scalarInstead(old: string, chance: Chance, corpus: Corpus): string {
  const parts = /^\s*([-+]?[\d.]+(?:e[-+]?\d+)?)(.*)$/is.exec(old);
  if (parts === null) return chance.once(3) ? quantityText(chance, corpus) : chance.pick(corpus.scalars);
  const [, number, unit] = parts as unknown as [string, string, string];
  switch (chance.below(8)) {
    case 0:
    case 1:
    case 2:
      return `${Number(number) * (0.5 + chance.below(1000) / 1000)}${unit}`;
    case 3:
    case 4:
      return `${Number(number) * 10 ** (chance.below(13) - 6)}${unit}`;
    case 5:
      return `${chance.pick(EXTREMES)}${unit}`;
    case 6:
      return `${number} ${chance.pick(UNITS)}`;
    default:
      return quantityText(chance, corpus);
  }
}

/** A formula, more or less. */
export function formulaText(chance: Chance, corpus: Corpus): string {
  const known = corpus.scalars.filter((text) => /^(streams|figures|blocks)\./.test(text));
  const length = 1 + chance.below(chance.once(20) ? 400 : 12);
  const pieces = Array.from({ length }, () => (chance.once(6) ? chance.pick(known) : chance.pick(PIECES)));
  return pieces.join(chance.once(2) ? '' : ' ');
}

/** Values of a setting as `--over` takes them, more or less. */
export function valuesText(chance: Chance, corpus: Corpus): string {
  const one = () => quantityText(chance, corpus);
  const count = chance.pick(['2', '3', '8', '0', '-1', '1e9', '1.5', '', 'n', '999999999999']);
  switch (chance.below(4)) {
    case 0:
      return `${one()}..${one()}:${count}${chance.pick(['', ' log', ' lin', 'log'])}`;
    case 1:
      return Array.from({ length: 1 + chance.below(4) }, one).join(',');
    case 2:
      return `${-30 + chance.below(20)} degC..${chance.below(20)} degC:${count}`;
    default:
      return `${one()}..${one()}..${one()}:${count}:${count},${one()}`;
  }
}
