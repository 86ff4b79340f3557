import { nearest } from '../diagnostics/nearest.ts';
import { R } from '../properties/constants.ts';
import { formatTerms } from './reaction-format.ts';

/** An equilibrium constant of the literature, for one reaction. */
export interface PublishedConstant {
  /** what a flowsheet calls it; several reactions of one author share a name */
  readonly name: string;
  /** the reaction it was published for, products positive */
  readonly stoichiometry: Readonly<Record<string, number>>;
  /** ln K at T [K], activities referred to standardPressurePa */
  readonly lnK: (T: number) => number;
  readonly standardPressurePa: number;
  /** where the authors use it; outside it is an extrapolation */
  readonly range: { readonly fromK: number; readonly toK: number };
  readonly source: string;
  readonly note: string;
}

const atm = 101_325;
const bar = 1e5;
const ln10 = Math.LN10;

/** ln K of Graaf & Winkelman: (a1 + a2 T + ... + a6 T⁵ + a7 T ln T)/(R T), R = 8.314 */
function graafWinkelman(a: readonly [number, number, number, number, number, number, number]) {
  return (T: number): number =>
    (a[0] + T * (a[1] + T * (a[2] + T * (a[3] + T * (a[4] + T * a[5])))) + a[6] * T * Math.log(T)) /
    (8.314 * T);
}
const methanolFromCO = graafWinkelman([
  74414.0, 189.26, 0.032443, 7.0432e-6, -5.6053e-9, 1.0344e-12, -64.364,
]);
const reverseShift = graafWinkelman([
  -39412.1, -54.1516, -0.055642, 2.576e-5, -7.6594e-9, 1.0161e-12, 18.429,
]);

const graaf1986 =
  'G. H. Graaf, P. J. J. M. Sijtsema, E. J. Stamhuis & G. E. H. Joosten, Chem. Eng. Sci. 41 (1986) 2883-2890';
const graaf2016 = 'G. H. Graaf & J. G. M. Winkelman, Ind. Eng. Chem. Res. 55 (2016) 5854-5864';
const graafRange = { fromK: 453, toK: 673 };
const graafNote = 'range: from memory';

const fromCO = { CO: -1, H2: -2, CH3OH: 1 };
const shiftBack = { CO2: -1, H2: -1, CO: 1, H2O: 1 };
const fromCO2 = { CO2: -1, H2: -3, CH3OH: 1, H2O: 1 };

export const publishedConstants: readonly PublishedConstant[] = [
  {
    name: 'gillespie-beattie-1930',
    stoichiometry: { N2: -0.5, H2: -1.5, NH3: 1 },
    // log10 K = −2.691122 log10 T − 5.519265e-5 T + 1.848863e-7 T² + 2001.6/T + 2.6899
    lnK: (T) =>
      ln10 * (-2.691122 * Math.log10(T) - 5.519265e-5 * T + 1.848863e-7 * T * T + 2001.6 / T + 2.6899),
    standardPressurePa: atm,
    range: { fromK: 598, toK: 1225 },
    source: 'L. J. Gillespie & J. A. Beattie, Phys. Rev. 36 (1930) 743-753',
    note: 'fitted to measurements at 325-952 degC, 10-1000 atm',
  },
  {
    name: 'graaf-1986',
    stoichiometry: fromCO,
    lnK: (T) => ln10 * (5139 / T - 12.621),
    standardPressurePa: bar,
    range: graafRange,
    source: graaf1986,
    note: graafNote,
  },
  {
    name: 'graaf-1986',
    stoichiometry: shiftBack,
    lnK: (T) => ln10 * (-2073 / T + 2.029),
    standardPressurePa: bar,
    range: graafRange,
    source: graaf1986,
    note: graafNote,
  },
  {
    name: 'graaf-1986',
    stoichiometry: fromCO2,
    lnK: (T) => ln10 * (3066 / T - 10.592),
    standardPressurePa: bar,
    range: graafRange,
    source: graaf1986,
    note: `the product of the two others; ${graafNote}`,
  },
  {
    name: 'graaf-winkelman-2016',
    stoichiometry: fromCO,
    lnK: methanolFromCO,
    standardPressurePa: bar,
    range: graafRange,
    source: graaf2016,
    note: graafNote,
  },
  {
    name: 'graaf-winkelman-2016',
    stoichiometry: shiftBack,
    lnK: reverseShift,
    standardPressurePa: bar,
    range: graafRange,
    source: graaf2016,
    note: graafNote,
  },
  {
    name: 'graaf-winkelman-2016',
    stoichiometry: fromCO2,
    lnK: (T) => methanolFromCO(T) + reverseShift(T),
    standardPressurePa: bar,
    range: graafRange,
    source: graaf2016,
    note: `the product of the two others; ${graafNote}`,
  },
  {
    name: 'moe-1962',
    stoichiometry: { CO: -1, H2O: -1, CO2: 1, H2: 1 },
    lnK: (T) => 4577.8 / T - 4.33,
    standardPressurePa: bar,
    range: { fromK: 473, toK: 873 },
    source: 'J. M. Moe, Chem. Eng. Prog. 58 (1962) 33',
    note: 'for shift converters (range: common practice); 13-20 % low at 800-1000 degC, so not for reforming',
  },
  {
    name: 'twigg-reforming',
    stoichiometry: { CH4: -1, H2O: -1, CO: 1, H2: 3 },
    lnK: (T) => 30.114 - 26830 / T,
    standardPressurePa: bar,
    range: { fromK: 673, toK: 1273 },
    source: 'M. V. Twigg (ed.), Catalyst Handbook, 2nd ed., Wolfe 1989',
    note: 'quoted in bar² by some and atm² by others (2.7 % apart); bar² agrees better with Gibbs energies',
  },
  {
    name: 'eklund-1956',
    stoichiometry: { SO2: -1, O2: -0.5, SO3: 1 },
    lnK: (T) => ln10 * (4956 / T - 4.678),
    standardPressurePa: atm,
    range: { fromK: 673, toK: 923 },
    source:
      'R. Eklund, The Rate of Oxidation of Sulphur Dioxide, Stockholm 1956, as quoted in M. Martin, Industrial Chemical Process Analysis and Design, Elsevier 2016',
    note: 'range: common practice',
  },
  {
    name: 'king-2013',
    stoichiometry: { SO2: -1, O2: -0.5, SO3: 1 },
    // ΔG° = 0.09357 T − 98.41 kJ/mol
    lnK: (T) => -(93.57 * T - 98_410) / (R * T),
    standardPressurePa: bar,
    range: { fromK: 600, toK: 950 },
    source:
      'M. King, M. Moats & W. G. Davenport, Sulfuric Acid Manufacture, 2nd ed., Elsevier 2013 (from memory)',
    note: 'range: from memory',
  },
];

/** Every name once, in the order of the table. */
export const publishedConstantNames: readonly string[] = [...new Set(publishedConstants.map((c) => c.name))];

/** A constant and the factor that turns it into that of the user's reaction: lnK = factor × constant.lnK. */
export interface PublishedMatch {
  readonly constant: PublishedConstant;
  readonly factor: number;
}

export interface PublishedFault {
  readonly code: string;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

/**
 * The constant called `name` for a reaction, which may be written as any multiple of the published one or
 * the other way round.
 *
 * @param stoichiometry coefficients by component id, products positive; zeros may be left out
 */
export function matchPublished(
  name: string,
  stoichiometry: Readonly<Record<string, number>>,
): PublishedMatch | PublishedFault {
  const named = publishedConstants.filter((c) => c.name === name);
  if (named.length === 0) return unknownName(name);
  for (const constant of named) {
    const factor = multiple(stoichiometry, constant.stoichiometry);
    if (factor !== null) return { constant, factor };
  }
  const others = publishedConstants.filter((c) => multiple(stoichiometry, c.stoichiometry) !== null);
  const has = named.map((c) => formatTerms(c.stoichiometry)).join(', or ');
  return {
    code: 'constant-mismatch',
    what: `The published constant ${name} is not for the reaction ${formatTerms(stoichiometry)}.`,
    why: `${name} is for ${has}, or a multiple or the reverse of ${named.length > 1 ? 'one of them' : 'it'}`,
    mend:
      others.length > 0
        ? `name one that is for this reaction (${others.map((c) => c.name).join(', ')}), or leave the constant out to take K from Gibbs energies`
        : 'leave the constant out to take K from Gibbs energies, or write lnK as a formula',
  };
}

/** True for what matchPublished hands back when nothing fits. */
export function isPublishedFault(x: PublishedMatch | PublishedFault): x is PublishedFault {
  return 'code' in x;
}

/** user = factor × published, or null */
function multiple(
  user: Readonly<Record<string, number>>,
  published: Readonly<Record<string, number>>,
): number | null {
  const ids = Object.keys(published);
  if (Object.keys(user).some((id) => user[id] !== 0 && published[id] === undefined)) return null;
  const factor = (user[ids[0]] ?? 0) / published[ids[0]];
  if (factor === 0) return null;
  const fits = ids.every(
    (id) => Math.abs((user[id] ?? 0) - factor * published[id]) <= 1e-9 * Math.abs(factor),
  );
  return fits ? factor : null;
}

function unknownName(name: string): PublishedFault {
  const near = nearest(name, publishedConstantNames);
  return {
    code: 'unknown-constant',
    what: `There is no published constant called "${name}".`,
    why:
      near === null
        ? `known are ${publishedConstantNames.join(', ')}`
        : `no constant of that name; the nearest known one is ${near}`,
    mend:
      near === null
        ? 'write one of these names, or leave the constant out to take K from Gibbs energies'
        : `write ${near}`,
  };
}
