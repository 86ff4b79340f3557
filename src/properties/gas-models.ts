import type { Component } from '../model/component.ts';
import type { GasModelName } from '../model/flowsheet.ts';
import { gasInteractions, isQuantumGas, liquidInteractions } from './binary-interaction.ts';
import { R } from './constants.ts';
import { type CubicComponent, type CubicForm, createCubic } from './cubic.ts';
import { hydrogenAlpha, pengRobinsonSlope, soaveSlope, squareRootAlpha } from './cubic-alpha.ts';
import type { GasModel } from './gas-model.ts';

/**
 * The vapour-phase model of a flowsheet's components.
 *
 * - `ideal`: no departures.
 * - `srk`: Soave-Redlich-Kwong with the hydrogen function of Graboski and Daubert and the volume shift of
 *   Péneloux and co-workers. Without the shift the equilibrium conversion of ammonia falls short above
 *   100 atm and so does the ammonia left over its condensate above 150 bar.
 * - `pr`: Peng-Robinson as published in 1976. For gas rich in hydrogen over a condensate prefer `srk`.
 */
export function createGasModel(name: GasModelName, components: readonly Component[]): GasModel {
  switch (name) {
    case 'ideal':
      return createIdealGasModel(components.length);
    case 'srk':
      return createCubic(SOAVE, components.map(soaveComponent), gasInteractions('srk', components));
    case 'pr':
      return createCubic(
        PENG_ROBINSON,
        components.map(pengRobinsonComponent),
        gasInteractions('pr', components),
      );
  }
}

/** Gas and liquid of one equation of state with one set of parameters, for `liquid: eos`. */
export function createCubicPhases(
  name: Exclude<GasModelName, 'ideal'>,
  components: readonly Component[],
): { readonly gas: GasModel; readonly liquid: GasModel } {
  const form = name === 'srk' ? SOAVE : PENG_ROBINSON;
  const entries = components.map(name === 'srk' ? soaveComponent : pengRobinsonComponent);
  const interactions = liquidInteractions(name, components);
  return {
    gas: createCubic(form, entries, interactions, 'vapour'),
    liquid: createCubic(form, entries, interactions, 'liquid'),
  };
}

/** What each model is and where it comes from, for the assumptions of a result. */
export const gasModelSources: Readonly<Record<GasModelName, string>> = {
  ideal: 'ideal gas',
  srk:
    'Soave-Redlich-Kwong (Soave 1972), hydrogen by Graboski and Daubert (1979), volumes shifted after Péneloux, ' +
    'Rauzy and Frèze (1982)',
  pr: 'Peng-Robinson (1976)',
};

/** Ids of the components that are in the gas but have no critical data: ideal gas under every model. */
export function withoutEquationOfState(components: readonly Component[]): readonly string[] {
  return components.filter((c) => !c.solid && !c.critical).map((c) => c.id);
}

/** Ωa = 1/(9 (2^(1/3) − 1)) and Ωb = (2^(1/3) − 1)/3 place the critical point at Tc, Pc */
const SOAVE_A = 0.42748023354034137;
const SOAVE_B = 0.08664034996495773;
/** @source G. Soave, Chem. Eng. Sci. 27 (1972) 1197 */
const SOAVE: CubicForm = {
  name: 'srk',
  delta1: 1,
  delta2: 0,
  criticalAttraction: SOAVE_A / SOAVE_B,
  criticalVolume: 1 / 3 / SOAVE_B,
};

/** the digits that place the critical point at Tc, Pc exactly; printed in 1976 as 0.45724, 0.07780 and 0.307 */
const PENG_ROBINSON_A = 0.4572355289213822;
const PENG_ROBINSON_B = 0.07779607390388846;
const PENG_ROBINSON_CRITICAL_Z = 0.3074013086987038;
/** @source D.-Y. Peng, D. B. Robinson, Ind. Eng. Chem. Fundam. 15 (1976) 59 */
const PENG_ROBINSON: CubicForm = {
  name: 'pr',
  delta1: 1 + Math.SQRT2,
  delta2: 1 - Math.SQRT2,
  criticalAttraction: PENG_ROBINSON_A / PENG_ROBINSON_B,
  criticalVolume: PENG_ROBINSON_CRITICAL_Z / PENG_ROBINSON_B,
};

/**
 * Helium's constants in the classical limit, right for temperatures far above its critical 5.2 K, where the
 * measured critical constants make its attraction rise with temperature.
 * @source R. D. Gunn, P. L. Chueh, J. M. Prausnitz, AIChE J. 12 (1966) 937, from memory
 */
const HELIUM = { temperatureK: 10.47, pressurePa: 6.76e5, acentricFactor: 0 };

function soaveComponent(component: Component): CubicComponent | null {
  const critical = constantsOf(component);
  if (!critical) return null;
  const { temperatureK, pressurePa, acentricFactor } = critical;
  return {
    attraction: (SOAVE_A * (R * temperatureK) ** 2) / pressurePa,
    covolume: (SOAVE_B * R * temperatureK) / pressurePa,
    shift: penelouxShift(component),
    alpha:
      component.formula === 'H2'
        ? hydrogenAlpha(temperatureK)
        : squareRootAlpha(temperatureK, soaveSlope(acentricFactor)),
  };
}

function pengRobinsonComponent(component: Component): CubicComponent | null {
  const critical = constantsOf(component);
  if (!critical) return null;
  const { temperatureK, pressurePa, acentricFactor } = critical;
  return {
    attraction: (PENG_ROBINSON_A * (R * temperatureK) ** 2) / pressurePa,
    covolume: (PENG_ROBINSON_B * R * temperatureK) / pressurePa,
    shift: 0,
    alpha: squareRootAlpha(temperatureK, pengRobinsonSlope(acentricFactor)),
  };
}

function constantsOf(component: Component): Component['critical'] {
  if (component.solid) return null;
  return component.id === 'He' && !component.custom ? HELIUM : component.critical;
}

/**
 * c = 0.40768 (0.29441 − Z_RA) RTc/Pc [m3/mol], held at 0 where it would be negative and for hydrogen and
 * helium: there Rackett's parameter tells of a quantum liquid or a mixture, and the shift would take the gas
 * density of hydrogen further off (2.5 % at 25 degC and 300 bar without it).
 * @source A. Péneloux, E. Rauzy, R. Frèze, Fluid Phase Equilib. 8 (1982) 7
 */
function penelouxShift(component: Component): number {
  const rackettZ = component.liquid?.rackettZ ?? null;
  if (!component.critical || rackettZ === null || isQuantumGas(component)) return 0;
  const { temperatureK, pressurePa } = component.critical;
  return Math.max(0, (0.40768 * (0.29441 - rackettZ) * R * temperatureK) / pressurePa);
}

function createIdealGasModel(size: number): GasModel {
  return {
    name: 'ideal',
    size,
    lnPhi: (_T, _P, _y, out) => {
      out.fill(0);
    },
    lnPhiSlopes: (_T, _P, _y, perKelvin, perPascal) => {
      perKelvin.fill(0);
      perPascal.fill(0);
    },
    lnPhiByAmount: (_T, _P, _y, out) => {
      out.fill(0);
    },
    compressibility: () => 1,
    isLiquidLike: () => false,
    enthalpyDeparture: () => 0,
    enthalpyDepartureSlopes: (_T, _P, _y, out) => {
      out.perKelvin = 0;
      out.perPascal = 0;
    },
    entropyDeparture: () => 0,
    pureLnPhi: () => 0,
    pureCompressibility: () => 1,
    pureEnthalpyDeparture: () => 0,
  };
}
