import type { AntoineSet, Component, LiquidData, Nasa9Interval } from '../model/component.ts';
import type { Elements } from './chemical-formula.ts';
import { molarMass, parseFormula } from './chemical-formula.ts';
import { R_NASA } from './constants.ts';

/**
 * A component as the user defines it, in SI. Everything but the formula may be missing; what then cannot be
 * computed is null (or empty) in the component.
 */
export interface CustomDefinition {
  readonly name?: string | undefined;
  /** as `parseFormula` reads it, e.g. C2H5OH */
  readonly formula: string;
  readonly cas?: string | undefined;
  /** true for a solid that is in neither gas nor liquid */
  readonly solid?: boolean | undefined;
  /** NASA polynomials, ascending and adjoining; they take precedence over the three entries below */
  readonly nasa9?: readonly CustomNasa9Interval[] | undefined;
  /** enthalpy of formation at 298.15 K [J/mol] */
  readonly formationEnthalpyJPerMol?: number | undefined;
  /** absolute entropy at 298.15 K and 1 bar [J/(mol K)]; needed for equilibrium, 0 where missing */
  readonly entropyJPerMolK?: number | undefined;
  /** Cp [J/(mol K)]: a constant, or a, b, c, d of Cp = a + bT + cT² + dT³ */
  readonly heatCapacity?: number | readonly number[] | undefined;
  /** range of the heat capacity [K] */
  readonly heatCapacityRange?: { readonly fromK: number; readonly toK: number } | undefined;
  readonly critical?:
    | { readonly temperatureK: number; readonly pressurePa: number; readonly acentricFactor: number }
    | undefined;
  readonly boilingK?: number | undefined;
  /** log10(P/bar) = A − B/(T + C), T in K; ascending and adjoining */
  readonly antoine?: AntoineSet | readonly AntoineSet[] | undefined;
  readonly liquidVolumeM3PerMol?: number | undefined;
  readonly rackettZ?: number | undefined;
  readonly vaporisationAtBoilingJPerMol?: number | undefined;
  readonly watsonExponent?: number | undefined;
  /** overrules the heating values worked out from the formation enthalpy [J/mol] */
  readonly lowerHeatingJPerMol?: number | undefined;
  readonly higherHeatingJPerMol?: number | undefined;
  readonly note?: string | undefined;
  readonly source?: string | undefined;
}

/** As in the tables; b1Atct is taken to equal b1 where it is left out. */
export type CustomNasa9Interval = Omit<Nasa9Interval, 'b1Atct'> & {
  readonly b1Atct?: number | null | undefined;
};

const REFERENCE_K = 298.15;
/** Range of a constant heat capacity, and of a cubic, where none is given [K]. @source common practice */
const CONSTANT_RANGE = { fromK: 200, toK: 6000 };
const CUBIC_RANGE = { fromK: 250, toK: 1500 };

/**
 * Enthalpies of formation of what a fuel burns to [J/mol]: CO2, SO2 and H2O as gas and as liquid.
 * @source NASA CEA thermo.inp (McBride, Zehe & Gordon, NASA/TP-2002-211556)
 */
const BURNT = { CO2: -393510, SO2: -296810, H2O_gas: -241826, H2O_liquid: -285830 };

/**
 * A component of the user's own.
 *
 * Formation enthalpy, entropy and heat capacity are turned into NASA polynomials exactly. The enthalpy the
 * user gave stands as it is, whether the others are referred to the Active Thermochemical Tables or not.
 *
 * @param definition  its formula must be one that `parseFormula` accepts
 * @throws Error for a formula that cannot be read: the reader of the file reports that before
 */
export function customComponent(id: string, definition: CustomDefinition): Component {
  const formula = parseFormula(definition.formula);
  if (!formula.ok) throw new Error(`component ${id}: ${formula.why}`);
  const idealGas = idealGasOf(definition);
  const heating = heatingValues(definition, formula.elements, idealGas);
  const source = definition.source ?? 'given without a source';
  return {
    id,
    name: definition.name ?? id,
    formula: definition.formula,
    cas: definition.cas ?? null,
    elements: formula.elements,
    molarMassKgPerMol: molarMass(formula.elements),
    solid: definition.solid ?? false,
    idealGas,
    critical: definition.critical ?? null,
    boilingK: definition.boilingK ?? null,
    antoine: antoineOf(definition),
    wideVapourPressure: null,
    liquid: liquidOf(definition),
    lowerHeatingJPerMol: heating.lower,
    higherHeatingJPerMol: heating.higher,
    note: definition.note ?? '',
    sources: {
      critical: source,
      'ideal gas': source,
      'vapour pressure': source,
      liquid: source,
      'heating value': heating.source ?? source,
    },
    custom: true,
  };
}

function idealGasOf(definition: CustomDefinition): readonly Nasa9Interval[] {
  if (definition.nasa9) {
    return definition.nasa9.map((interval) => ({
      ...interval,
      b1Atct: interval.b1Atct === undefined ? interval.b1 : interval.b1Atct,
    }));
  }
  const { heatCapacity, formationEnthalpyJPerMol } = definition;
  if (heatCapacity === undefined || formationEnthalpyJPerMol === undefined) return [];
  const cubic = typeof heatCapacity === 'number' ? [heatCapacity] : heatCapacity;
  const range = definition.heatCapacityRange ?? (cubic.length > 1 ? CUBIC_RANGE : CONSTANT_RANGE);
  return [fromCubic(cubic, formationEnthalpyJPerMol, definition.entropyJPerMolK ?? 0, range)];
}

/** Cp = a + bT + cT² + dT³ is a NASA polynomial with a1 = a2 = a7 = 0; b1 and b2 follow from H and S at 298.15 K. */
function fromCubic(
  cubic: readonly number[],
  enthalpy: number,
  entropy: number,
  range: { readonly fromK: number; readonly toK: number },
): Nasa9Interval {
  const [a = 0, b = 0, c = 0, d = 0] = cubic.map((coefficient) => coefficient / R_NASA);
  const T = REFERENCE_K;
  const b1 = enthalpy / R_NASA - T * (a + T * (b / 2 + T * (c / 3 + (T * d) / 4)));
  const b2 = entropy / R_NASA - a * Math.log(T) - T * (b + T * (c / 2 + (T * d) / 3));
  return { fromK: range.fromK, toK: range.toK, a: [0, 0, a, b, c, d, 0], b1, b1Atct: b1, b2 };
}

function antoineOf(definition: CustomDefinition): readonly AntoineSet[] {
  if (!definition.antoine) return [];
  return 'A' in definition.antoine ? [definition.antoine] : definition.antoine;
}

function liquidOf(definition: CustomDefinition): LiquidData | null {
  const { liquidVolumeM3PerMol, rackettZ, vaporisationAtBoilingJPerMol, watsonExponent } = definition;
  if ([liquidVolumeM3PerMol, rackettZ, vaporisationAtBoilingJPerMol].every((v) => v === undefined)) {
    return null;
  }
  return {
    rackettZ: rackettZ ?? null,
    tableK: [],
    tableVolumeM3PerMol: [],
    tableGasCompressibility: [],
    vaporisationAtBoilingJPerMol: vaporisationAtBoilingJPerMol ?? null,
    watsonExponent: watsonExponent ?? null,
    fixedVolumeM3PerMol: liquidVolumeM3PerMol ?? null,
  };
}

interface HeatingValues {
  readonly lower: number;
  readonly higher: number;
  readonly source: string | null;
}

/**
 * Heating values: given, or formation enthalpy less that of the products CO2, SO2, N2 and H2O. 0 for what
 * takes up no oxygen and for elements whose combustion products are not known here.
 */
function heatingValues(
  definition: CustomDefinition,
  elements: Elements,
  idealGas: readonly Nasa9Interval[],
): HeatingValues {
  const { lowerHeatingJPerMol: given, higherHeatingJPerMol } = definition;
  if (given !== undefined) return { lower: given, higher: higherHeatingJPerMol ?? given, source: null };
  const { C = 0, H = 0, O = 0, N: _nitrogen, S = 0, ...others } = elements;
  const oxygenTaken = C + H / 4 + S - O / 2;
  const formation = formationEnthalpy(idealGas);
  if (oxygenTaken <= 0 || Object.keys(others).length > 0 || formation === null) {
    return { lower: 0, higher: 0, source: 'taken as 0: it does not burn, or what it burns to is not known' };
  }
  const products = C * BURNT.CO2 + S * BURNT.SO2;
  return {
    lower: formation - products - (H / 2) * BURNT.H2O_gas,
    higher: formation - products - (H / 2) * BURNT.H2O_liquid,
    source: 'from the formation enthalpy (products CO2, SO2, N2, H2O)',
  };
}

/** H at 298.15 K on NASA's own basis [J/mol]; null without coefficients. */
function formationEnthalpy(idealGas: readonly Nasa9Interval[]): number | null {
  const interval = idealGas.find((i) => i.toK >= REFERENCE_K) ?? idealGas.at(-1);
  if (!interval) return null;
  const [a1, a2, a3, a4, a5, a6, a7] = interval.a;
  const T = REFERENCE_K;
  const power = a3 + T * (a4 / 2 + T * (a5 / 3 + T * (a6 / 4 + (T * a7) / 5)));
  return R_NASA * (-a1 / T + a2 * Math.log(T) + T * power + interval.b1);
}
