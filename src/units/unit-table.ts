import type { Dimension } from './dimension.ts';

/** value [SI] = (number + offset) × factor */
export interface UnitFactor {
  readonly factor: number;
  readonly offset: number;
}

/**
 * The units of the trade, ready without any unit engine. A gauge pressure counts from one standard
 * atmosphere, 1.01325 bar. Normal is 0 degC and 1.01325 bar, standard cubic metre 15 degC and 1.01325 bar,
 * standard cubic foot 60 degF and 14.696 psia.
 *
 * @source BIPM, The International System of Units, 9th ed. (2019); NIST SP 811 (2008), app. B (pound, psi,
 * British thermal unit IT, calorie IT and thermochemical, horsepower 550 ft lbf/s, torr); DIN 1343 (normal
 * state); ISO 13443 (standard cubic metre); standard cubic foot: common practice
 */
export function unitFactor(unit: string, dimension: Dimension): UnitFactor | undefined {
  return table[dimension].get(unit);
}

/** Every unit the table knows for a dimension. */
export function knownUnits(dimension: Dimension): readonly string[] {
  return [...table[dimension].keys()];
}

/** The dimensions in which a unit is known; empty for an unknown unit. */
export function dimensionsOf(unit: string): readonly Dimension[] {
  return (Object.keys(table) as Dimension[]).filter((dimension) => table[dimension].has(unit));
}

const ATM = 101325;
const POUND = 0.45359237;
const CUBIC_FOOT = 0.3048 ** 3;
const PSI = (POUND * 9.80665) / 0.0254 ** 2;
const BTU = 1055.05585262;
const KCAL = 4186.8;
const CAL_THERMOCHEMICAL = 4.184;
/** normal cubic metres in one standard cubic metre and one standard cubic foot */
const STANDARD_M3 = 273.15 / 288.15;
const STANDARD_FT3 = (CUBIC_FOOT * 14.696 * PSI * 273.15) / (ATM * ((60 + 459.67) / 1.8));

const times = { s: 1, min: 60, h: 3600, d: 86400 };
const moles = { mol: 1, kmol: 1e3, lbmol: POUND * 1e3 };
const masses = { g: 1e-3, kg: 1, t: 1e3, kt: 1e6, lb: POUND };
const normalVolumes = {
  Nm3: 1,
  kNm3: 1e3,
  Sm3: STANDARD_M3,
  kSm3: STANDARD_M3 * 1e3,
  scf: STANDARD_FT3,
  Mscf: STANDARD_FT3 * 1e3,
  MMscf: STANDARD_FT3 * 1e6,
};
const absolutePressures = {
  Pa: 1,
  kPa: 1e3,
  MPa: 1e6,
  mbar: 100,
  bar: 1e5,
  atm: ATM,
  psi: PSI,
  torr: ATM / 760,
  mmHg: 133.322387415,
  inHg: 133.322387415 * 25.4,
  'kg/cm2': 98066.5,
};

const table: Readonly<Record<Dimension, ReadonlyMap<string, UnitFactor>>> = {
  temperature: new Map([
    ['K', unit(1)],
    ...['degC', 'C'].map((name) => [name, unit(1, 273.15)] as const),
    ...['degF', 'F'].map((name) => [name, unit(1 / 1.8, 459.67)] as const),
    ...['degR', 'R'].map((name) => [name, unit(1 / 1.8)] as const),
  ]),
  temperatureDifference: new Map([
    ...['K', 'degC', 'C'].map((name) => [name, unit(1)] as const),
    ...['degF', 'F', 'degR', 'R'].map((name) => [name, unit(1 / 1.8)] as const),
  ]),
  pressure: new Map([
    ...each(absolutePressures),
    ['bara', unit(1e5)],
    ['psia', unit(PSI)],
    ['barg', unit(1e5, ATM / 1e5)],
    ['mbarg', unit(100, ATM / 100)],
    ['kPag', unit(1e3, ATM / 1e3)],
    ['MPag', unit(1e6, ATM / 1e6)],
    ['psig', unit(PSI, ATM / PSI)],
    ['kg/cm2g', unit(98066.5, ATM / 98066.5)],
  ]),
  pressureDifference: new Map(each(absolutePressures)),
  molarFlow: new Map(perTime(moles)),
  massFlow: new Map(perTime(masses)),
  normalVolumeFlow: new Map(perTime(normalVolumes)),
  power: new Map(
    each({
      W: 1,
      kW: 1e3,
      MW: 1e6,
      GW: 1e9,
      hp: 550 * 0.3048 * POUND * 9.80665,
      'kJ/s': 1e3,
      'kJ/h': 1e3 / 3600,
      'MJ/h': 1e6 / 3600,
      'GJ/h': 1e9 / 3600,
      'GJ/d': 1e9 / 86400,
      'kcal/h': KCAL / 3600,
      'Mcal/h': (KCAL * 1e3) / 3600,
      'Gcal/h': (KCAL * 1e6) / 3600,
      'Btu/h': BTU / 3600,
      'MMBtu/h': (BTU * 1e6) / 3600,
    }),
  ),
  fraction: new Map(
    each({
      '': 1,
      '%': 0.01,
      'mol%': 0.01,
      'mol %': 0.01,
      'vol%': 0.01,
      'vol %': 0.01,
      ppm: 1e-6,
      ppb: 1e-9,
    }),
  ),
  molarEnergy: new Map(
    each({
      'J/mol': 1,
      'kJ/mol': 1e3,
      'MJ/mol': 1e6,
      'kJ/kmol': 1,
      'MJ/kmol': 1e3,
      'cal/mol': CAL_THERMOCHEMICAL,
      'kcal/mol': CAL_THERMOCHEMICAL * 1e3,
      'Btu/lbmol': BTU / (POUND * 1e3),
    }),
  ),
  molarHeatCapacity: new Map(
    each({
      'J/(mol K)': 1,
      'J/mol/K': 1,
      'kJ/(mol K)': 1e3,
      'kJ/(kmol K)': 1,
      'kJ/kmol/K': 1,
      'cal/(mol K)': CAL_THERMOCHEMICAL,
      'cal/mol/K': CAL_THERMOCHEMICAL,
    }),
  ),
  molarVolume: new Map(
    each({ 'm3/mol': 1, 'm3/kmol': 1e-3, 'cm3/mol': 1e-6, 'L/mol': 1e-3, 'l/mol': 1e-3, 'L/kmol': 1e-6 }),
  ),
  volume: new Map(each({ m3: 1, L: 1e-3, l: 1e-3, ft3: CUBIC_FOOT })),
  mass: new Map(each(masses)),
  density: new Map(
    each({ 'kg/m3': 1, 'g/cm3': 1e3, 'kg/L': 1e3, 't/m3': 1e3, 'lb/ft3': POUND / CUBIC_FOOT }),
  ),
  heatTransferPerVolume: new Map(
    each({
      'W/(m3 K)': 1,
      'kW/(m3 K)': 1e3,
      'MW/(m3 K)': 1e6,
      'W/m3/K': 1,
      'kW/m3/K': 1e3,
      'kcal/(m3 h K)': KCAL / 3600,
    }),
  ),
  number: new Map(each({ '': 1 })),
};

function unit(factor: number, offset = 0): UnitFactor {
  return { factor, offset };
}

function each(factors: Readonly<Record<string, number>>): [string, UnitFactor][] {
  return Object.entries(factors).map(([name, factor]) => [name, unit(factor)]);
}

function perTime(amounts: Readonly<Record<string, number>>): [string, UnitFactor][] {
  return Object.entries(amounts).flatMap(([amount, size]) =>
    Object.entries(times).map(([time, seconds]): [string, UnitFactor] => [
      `${amount}/${time}`,
      unit(size / seconds),
    ]),
  );
}
