import { createLnK } from '../../src/chemistry/equilibrium-constant.ts';
import type { Component } from '../../src/model/component.ts';
import type { GasModelName } from '../../src/model/flowsheet.ts';
import { builtInComponent } from '../../src/properties/components.ts';
import { createGasModel } from '../../src/properties/gas-models.ts';
import { henryConstant, lnHenry } from '../../src/properties/henry.ts';
import { createIdealGas } from '../../src/properties/ideal-gas.ts';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import { copyOf, fractionOf, mixtureOf, streamOf } from '../blocks/helpers.ts';
import { reaction } from '../chemistry/helpers.ts';
import { ammoniaVapourPressure } from './ammonia-vapour-liquid.ts';
import { compressibilities, dissolvedHydrogen } from './deviations-machine-values.ts';
import type { Row } from './deviations-row.ts';
import { type Deviation, difference, percent } from './deviations-statistics.ts';
import { readTable } from './read-table.ts';

const KELVIN = 273.15;
const NORMAL_CM3_PER_MOL = 22_414;

const component = (id: string): Component => builtInComponent(id)!;

const saturation = readTable('liquid-saturation.csv').map((row) => ({
  id: row['id']!,
  T: Number(row['T_K']),
  bar: Number(row['Psat_bar']),
  heat: 1e3 * Number(row['dHvap_kJ_mol']),
}));
const checkpoints = readTable('checkpoints.csv').map((row) => ({
  quantity: row['quantity']!,
  id: row['id']!,
  T: Number(row['T_K']),
  value: Number(row['value']),
}));

/** Pure components and what dissolves. */
export function propertyRows(): Row[] {
  return [
    heatOfVaporisation('NH3', 240, 370, 'reference equation of state (Gao et al. 2020)'),
    heatOfVaporisation('CH3OH', 300, 480, 'reference equation of state (de Reuck & Craven 1993)', 'as above'),
    heatOfVaporisation('H2O', 300, 480, 'IAPWS-95 (Wagner & Pruss 2002)', 'as above'),
    {
      what: 'vapour pressure, all liquids',
      source: 'reference equations of state, saturation tables',
      unit: '%',
      deviations: saturation.map(({ id, T, bar }) => vapourPressure(id, T, 1e5 * bar)),
      remark: 'the Antoine sets were fitted to the same equations within 0.5 %',
    },
    {
      what: 'vapour pressure of NH3, -40 to 50 degC',
      source: 'reference equation of state (Gao et al. 2020), from memory',
      unit: '%',
      deviations: ammoniaVapourPressure.map(([t, kPa]) => vapourPressure('NH3', t + KELVIN, 1e3 * kPa)),
    },
    {
      what: 'vapour pressure of water, 300 to 600 K',
      source: 'IAPWS R7-97(2012), test values',
      unit: '%',
      deviations: [
        vapourPressure('H2O', 300, 0.353658941e4),
        vapourPressure('H2O', 500, 2.63889776e6),
        vapourPressure('H2O', 600, 12.3443146e6),
      ],
    },
    ...checkpointRows(),
    compressibility('srk', 'the error of a cubic equation; it goes into volumes and compression work'),
    compressibility('pr', ''),
    {
      what: 'hydrogen dissolved in NH3 at 25 degC, 50 to 400 atm',
      source: 'Wiebe & Tremearne 1934, from memory',
      unit: '%',
      deviations: dissolvedHydrogen.map(([atm, cm3PerG]) =>
        percent(`${atm} atm`, hydrogenInAmmonia(atm), cm3PerG),
      ),
      remark: 'through the phase split, `gas: srk`; at 400 atm part of it is the fugacity of hydrogen, see Z',
    },
  ];
}

function heatOfVaporisation(
  id: string,
  from: number,
  to: number,
  source: string,
  remark = 'by Clapeyron; the volumes of both phases come from the same reference, the slope dP/dT does not',
): Row {
  const mixture = mixtureOf([id]);
  const inside = saturation.filter((row) => row.id === id && row.T >= from && row.T <= to);
  return {
    what: `heat of vaporisation of ${id}, ${from} to ${to} K`,
    source,
    unit: '%',
    deviations: inside.map(({ T, heat }) => {
      const bar = Math.exp(lnVapourPressure(component(id), T)) / 1e5;
      const gas = streamOf(mixture, { kelvin: T, bar, flows: { [id]: 1 } });
      const liquid = copyOf(gas);
      gas.liquidMolPerS.fill(0);
      liquid.liquidMolPerS.set(liquid.flowsMolPerS);
      mixture.settlePhases(gas);
      mixture.settlePhases(liquid);
      return percent(`${T.toFixed(0)} K`, gas.enthalpyW - liquid.enthalpyW, heat);
    }),
    remark,
  };
}

function vapourPressure(id: string, T: number, pascal: number): Deviation {
  return percent(`${id}, ${T.toFixed(0)} K`, Math.exp(lnVapourPressure(component(id), T)), pascal);
}

/** Checkpoints computed outside this program: they show that the polynomials are read right, not that they are true. */
function checkpointRows(): Row[] {
  const source = 'NASA/TP-2002-211556, evaluated independently';
  const of = (quantity: string) => checkpoints.filter((row) => row.quantity === quantity);
  const at = ({ id, T }: { id: string; T: number }) => `${id}, ${T} K`;
  return [
    {
      what: 'heat capacity of ideal gases',
      source,
      unit: '%',
      deviations: of('Cp').map((row) => percent(at(row), ideal('heatCapacities', row.id, row.T), row.value)),
      remark: 'the same polynomials: this and the next three lines check the arithmetic, not the data',
    },
    {
      what: 'enthalpy above 298.15 K of ideal gases',
      source,
      unit: '%',
      deviations: of('H-H298')
        .filter((row) => row.value !== 0)
        .map((row) => {
          const rise = ideal('enthalpies', row.id, row.T) - ideal('enthalpies', row.id, 298.15);
          return percent(at(row), rise, row.value);
        }),
    },
    {
      what: 'entropy of ideal gases',
      source,
      unit: '%',
      deviations: of('S').map((row) => percent(at(row), ideal('entropies', row.id, row.T), row.value)),
    },
    {
      what: 'ln K of eleven reactions, 298 to 1200 K',
      source,
      unit: 'in ln K',
      deviations: of('lnK').map((row) => difference(at(row), nasaLnK(row.id, row.T), row.value)),
    },
    {
      what: 'Henry constants in NH3',
      source: 'EOS-CG-2021 (Neumann et al. 2023), evaluated independently',
      unit: '%',
      deviations: of('Henry_NH3').map((row) => {
        const ours = Math.exp(lnHenry(henryConstant('NH3', row.id)!, row.T)) / 1e5;
        return percent(at(row), ours, row.value);
      }),
      remark:
        'the same source as the data, so only the arithmetic is checked; CH4, Ar and CO may be off by a third or more',
    },
  ];
}

function ideal(name: 'enthalpies' | 'entropies' | 'heatCapacities', id: string, T: number): number {
  const out = new Float64Array(1);
  createIdealGas([component(id)], 'nasa')[name](T, out);
  return out[0]!;
}

/** ln K of a reaction as the checkpoints write it, on NASA's own formation enthalpies. */
function nasaLnK(written: string, T: number): number {
  const names: Readonly<Record<string, string>> = { 'C(gr)': 'C_gr', HCOOCH3: 'MF' };
  const equation = Object.entries(names).reduce(
    (text, [theirs, ours]) => text.replace(theirs, ours),
    written,
  );
  const ids = ['N2', 'H2', 'NH3', 'CO', 'CO2', 'H2O', 'CH3OH', 'CH4', 'DME', 'C_gr', 'SO2', 'O2', 'SO3'];
  const components = [...ids, 'NO', 'NO2', 'N2O4', 'MF'].map(component);
  return createLnK(reaction(equation, components), createIdealGas(components, 'nasa')).lnK(T);
}

function compressibility(gas: GasModelName, remark: string): Row {
  const pure = new Float64Array([1]);
  return {
    what: `Z of H2 and N2 at 25 degC, 50 to 300 bar, \`gas: ${gas}\``,
    source: 'reference equations of state (Leachman 2009, Span 2000), from memory',
    unit: '%',
    deviations: compressibilities.map(([id, bar, Z]) => {
      const ours = createGasModel(gas, [component(id)]).compressibility(298.15, 1e5 * bar, pure);
      return percent(`${id}, ${bar} bar`, ours, Z);
    }),
    remark,
  };
}

/** Normal cm3 of hydrogen per gram of ammonia in the liquid of an equal mixture at 25 degC. */
function hydrogenInAmmonia(atm: number): number {
  const mixture = mixtureOf(['H2', 'NH3']);
  const stream = streamOf(mixture, { kelvin: 298.15, bar: 1.01325 * atm, flows: { H2: 1, NH3: 1 } });
  const liquid = copyOf(stream);
  liquid.flowsMolPerS.set(stream.liquidMolPerS);
  const x = fractionOf(liquid, mixture, 'H2');
  return ((x / (1 - x)) * NORMAL_CM3_PER_MOL) / (1e3 * component('NH3').molarMassKgPerMol);
}
