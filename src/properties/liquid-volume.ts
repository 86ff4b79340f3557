import type { Component, LiquidData } from '../model/component.ts';
import { R } from './constants.ts';
import type { MonotoneCubic } from './monotone-cubic.ts';
import { createMonotoneCubic, interpolate, interpolateSlope } from './monotone-cubic.ts';

/** Up to this share of the critical temperature the Rackett equation is used as it stands. @source common practice */
const RACKETT_UP_TO = 0.97;
/** Exponent of the Rackett equation. @source C. F. Spencer & R. P. Danner, J. Chem. Eng. Data 17, 236 (1972) */
const RACKETT_EXPONENT = 2 / 7;
/** Points of a table closer together than this share of the mean spacing count as one. @source common practice */
const LEAST_SPACING = 0.1;

/**
 * Molar volume of the saturated liquid [m3/mol]: from the table where the component has one, otherwise by
 * Rackett, V = (R Tc/Pc) Z^(1 + (1 − T/Tc)^(2/7)), otherwise one fixed value. Z is estimated from the
 * acentric factor where none is known. NaN where not even critical constants are known.
 *
 * Near and above the critical temperature, where a liquid's volume shoots up, the curve bends smoothly
 * towards the critical volume: what a solver meets there is no liquid, but it must not meet a jump either.
 */
export function liquidVolume(c: Component, T: number): number {
  const curve = curveOf(c);
  if (T > curve.toK) return curve.top - (curve.top - curve.atTo) * Math.exp(-decay(curve, T));
  if (T < curve.fromK) return curve.atFrom * Math.exp((curve.slopeFrom / curve.atFrom) * (T - curve.fromK));
  if (curve.table) return interpolate(curve.table, T);
  return curve.rackett ? rackett(curve.rackett, T) : curve.atTo;
}

/** dV/dT along the saturation line [m3/(mol K)], continuous. */
export function liquidVolumeSlope(c: Component, T: number): number {
  const curve = curveOf(c);
  if (T > curve.toK) return curve.slopeTo * Math.exp(-decay(curve, T));
  if (T < curve.fromK) return (curve.slopeFrom / curve.atFrom) * liquidVolume(c, T);
  if (curve.table) return interpolateSlope(curve.table, T);
  return curve.rackett ? rackettSlope(curve.rackett, T) : 0;
}

/** Where the liquid volume of a component is known [K]; null where it is one number or nothing for all temperatures. */
export function liquidVolumeRange(c: Component): { readonly fromK: number; readonly toK: number } | null {
  const { table, rackett: equation, fromK, toK } = curveOf(c);
  return table === null && equation === null ? null : { fromK, toK };
}

interface Rackett {
  readonly z: number;
  readonly criticalK: number;
  /** R Tc/Pc [m3/mol] */
  readonly scale: number;
}

/** The volume curve of one component: what holds between fromK and toK, and how it goes on outside. */
interface Curve {
  readonly table: MonotoneCubic | null;
  readonly rackett: Rackett | null;
  readonly fromK: number;
  readonly toK: number;
  readonly atFrom: number;
  readonly slopeFrom: number;
  readonly atTo: number;
  readonly slopeTo: number;
  /** volume approached above toK [m3/mol] */
  readonly top: number;
}

const curves = new WeakMap<Component, Curve>();

function curveOf(c: Component): Curve {
  const known = curves.get(c);
  if (known) return known;
  const curve = prepare(c);
  curves.set(c, curve);
  return curve;
}

function prepare(c: Component): Curve {
  const liquid = c.liquid;
  if (liquid && liquid.tableK.length > 1) {
    return fromTable(c, liquid);
  }
  if (liquid && liquid.fixedVolumeM3PerMol !== null && liquid.rackettZ === null) {
    return fixed(liquid.fixedVolumeM3PerMol);
  }
  const equation = rackettOf(c, liquid?.rackettZ ?? estimatedZ(c));
  return equation ? fromRackett(equation) : fixed(liquid?.fixedVolumeM3PerMol ?? Number.NaN);
}

function fromTable(c: Component, liquid: LiquidData): Curve {
  const kept = wellSpaced(liquid.tableK);
  const at = <T>(values: readonly T[]) => kept.map((k) => values[k]);
  const table = createMonotoneCubic(at(liquid.tableK), at(liquid.tableVolumeM3PerMol));
  const last = table.x.length - 1;
  const [toK, atTo] = [table.x[last], table.y[last]];
  return {
    table,
    rackett: null,
    fromK: table.x[0],
    toK,
    atFrom: table.y[0],
    slopeFrom: table.slope[0],
    atTo,
    slopeTo: table.slope[last],
    top: Math.max(criticalVolumeThrough(c, toK, atTo), 1.05 * atTo),
  };
}

/**
 * Points of a table that stand far enough apart: between two that nearly coincide (the boiling point or
 * 298.15 K beside a point of the even grid) the slope would be that of the rounded last digit.
 */
function wellSpaced(temperatures: readonly number[]): number[] {
  const last = temperatures.length - 1;
  const least = (LEAST_SPACING * (temperatures[last] - temperatures[0])) / last;
  const kept = [0];
  for (let k = 1; k < last; k++) {
    const room = Math.min(temperatures[k] - temperatures[kept.at(-1)!], temperatures[last] - temperatures[k]);
    if (room > least) kept.push(k);
  }
  return [...kept, last];
}

function fromRackett(equation: Rackett): Curve {
  const toK = RACKETT_UP_TO * equation.criticalK;
  return {
    table: null,
    rackett: equation,
    fromK: 0,
    toK,
    atFrom: rackett(equation, 0),
    slopeFrom: 0,
    atTo: rackett(equation, toK),
    slopeTo: rackettSlope(equation, toK),
    top: equation.scale * equation.z,
  };
}

function fixed(volume: number): Curve {
  return {
    table: null,
    rackett: null,
    fromK: 0,
    toK: Number.POSITIVE_INFINITY,
    atFrom: volume,
    slopeFrom: 0,
    atTo: volume,
    slopeTo: 0,
    top: volume,
  };
}

function rackettOf(c: Component, z: number | null): Rackett | null {
  if (!c.critical || z === null) return null;
  const { temperatureK, pressurePa } = c.critical;
  return { z, criticalK: temperatureK, scale: (R * temperatureK) / pressurePa };
}

/** @source T. Yamada & R. D. Gunn, J. Chem. Eng. Data 18, 234 (1973), from memory */
function estimatedZ(c: Component): number | null {
  return c.critical && 0.29056 - 0.08775 * c.critical.acentricFactor;
}

/** Critical volume of the Rackett curve through one point of the table [m3/mol]. */
function criticalVolumeThrough(c: Component, T: number, volume: number): number {
  const equation = rackettOf(c, 1);
  if (!equation || T >= equation.criticalK) return volume;
  const exponent = 1 + (1 - T / equation.criticalK) ** RACKETT_EXPONENT;
  return equation.scale * (volume / equation.scale) ** (1 / exponent);
}

function rackett(equation: Rackett, T: number): number {
  return equation.scale * equation.z ** (1 + (1 - T / equation.criticalK) ** RACKETT_EXPONENT);
}

function rackettSlope(equation: Rackett, T: number): number {
  const t = 1 - T / equation.criticalK;
  const exponentSlope = (-RACKETT_EXPONENT * t ** (RACKETT_EXPONENT - 1)) / equation.criticalK;
  return rackett(equation, T) * Math.log(equation.z) * exponentSlope;
}

function decay(curve: Curve, T: number): number {
  return (curve.slopeTo * (T - curve.toK)) / (curve.top - curve.atTo);
}
