/** The kinds of quantity a flowsheet file speaks of. */
export type Dimension =
  | 'temperature'
  | 'temperatureDifference'
  | 'pressure'
  | 'pressureDifference'
  | 'molarFlow'
  | 'massFlow'
  | 'normalVolumeFlow'
  | 'power'
  | 'fraction'
  | 'molarEnergy'
  | 'molarHeatCapacity'
  | 'molarVolume'
  | 'volume'
  | 'mass'
  | 'density'
  | 'heatTransferPerVolume'
  | 'number';

export interface DimensionFacts {
  /** for messages, with its article */
  readonly noun: string;
  /** unit of the value inside Looptally; empty where it has none */
  readonly si: string;
  /** unit that messages and starter files show, from the table of units.ts */
  readonly shown: string;
  /** units offered when one is missing or wrong */
  readonly offered: readonly string[];
  readonly examples: readonly string[];
  /** least value that makes sense [SI]; `above` excludes it */
  readonly min?: number;
  readonly above?: number;
  /** greatest value that makes sense [SI]: beyond it states and balances lose their digits or overflow */
  readonly max?: number;
  /** smallest size other than 0 [SI] */
  readonly least?: number;
}

export const dimensions: Readonly<Record<Dimension, DimensionFacts>> = {
  temperature: {
    noun: 'a temperature',
    si: 'K',
    shown: 'degC',
    offered: ['degC', 'K', 'degF'],
    examples: ['450 degC', '723.15 K'],
    above: 0,
    max: 1e5,
    least: 1,
  },
  temperatureDifference: {
    noun: 'a temperature difference',
    si: 'K',
    shown: 'K',
    offered: ['K', 'degF'],
    examples: ['10 K'],
    min: -1e5,
    max: 1e5,
  },
  pressure: {
    noun: 'a pressure',
    si: 'Pa',
    shown: 'bar',
    offered: ['bar', 'barg', 'MPa', 'atm', 'psia', 'psig'],
    examples: ['200 bar', '199 barg', '20 MPa'],
    above: 0,
    max: 1e12,
    least: 1e-3,
  },
  pressureDifference: {
    noun: 'a pressure difference',
    si: 'Pa',
    shown: 'bar',
    offered: ['bar', 'kPa', 'mbar', 'psi'],
    examples: ['4 bar', '50 mbar'],
    min: -1e12,
    max: 1e12,
  },
  molarFlow: {
    noun: 'a molar flow',
    si: 'mol/s',
    shown: 'kmol/h',
    offered: ['kmol/h', 'mol/s', 'lbmol/h'],
    examples: ['6500 kmol/h', '1800 mol/s'],
    min: 0,
    max: 1e15,
    least: 1e-15,
  },
  massFlow: {
    noun: 'a mass flow',
    si: 'kg/s',
    shown: 'kg/h',
    offered: ['kg/h', 't/d', 'kg/s', 'lb/h'],
    examples: ['50000 kg/h', '1200 t/d'],
    min: 0,
    max: 1e15,
    least: 1e-15,
  },
  normalVolumeFlow: {
    noun: 'a normal volume flow',
    si: 'Nm3/s',
    shown: 'Nm3/h',
    offered: ['Nm3/h', 'Sm3/h', 'MMscf/d'],
    examples: ['145000 Nm3/h', '120 MMscf/d'],
    min: 0,
    max: 1e15,
    least: 1e-15,
  },
  power: {
    noun: 'a heat flow or power',
    si: 'W',
    shown: 'kW',
    offered: ['kW', 'MW', 'GJ/h', 'kcal/h', 'MMBtu/h'],
    examples: ['1500 kW', '-12 MW'],
    min: -1e20,
    max: 1e20,
  },
  fraction: {
    noun: 'a fraction',
    si: '',
    shown: '%',
    offered: ['%', 'ppm'],
    examples: ['3 %', '0.03'],
  },
  molarEnergy: {
    noun: 'a molar energy',
    si: 'J/mol',
    shown: 'kJ/mol',
    offered: ['kJ/mol', 'J/mol', 'kcal/mol'],
    examples: ['-45.9 kJ/mol'],
    min: -1e9,
    max: 1e9,
  },
  molarHeatCapacity: {
    noun: 'a molar entropy or heat capacity',
    si: 'J/(mol K)',
    shown: 'J/(mol K)',
    offered: ['J/(mol K)', 'cal/(mol K)'],
    examples: ['192.8 J/(mol K)'],
    min: -1e6,
    max: 1e6,
  },
  molarVolume: {
    noun: 'a molar volume',
    si: 'm3/mol',
    shown: 'cm3/mol',
    offered: ['cm3/mol', 'm3/kmol', 'L/mol'],
    examples: ['25 cm3/mol'],
    above: 0,
    max: 1e6,
  },
  volume: {
    noun: 'a volume',
    si: 'm3',
    shown: 'm3',
    offered: ['m3', 'L', 'ft3'],
    examples: ['60 m3'],
    above: 0,
    max: 1e15,
    least: 1e-15,
  },
  mass: {
    noun: 'a mass',
    si: 'kg',
    shown: 'kg',
    offered: ['kg', 't', 'g', 'lb'],
    examples: ['40 t', '34.8 g'],
    above: 0,
    max: 1e15,
    least: 1e-15,
  },
  density: {
    noun: 'a density',
    si: 'kg/m3',
    shown: 'kg/m3',
    offered: ['kg/m3', 'kg/L', 'lb/ft3'],
    examples: ['1100 kg/m3'],
    above: 0,
    max: 1e15,
    least: 1e-15,
  },
  heatTransferPerVolume: {
    noun: 'a heat transfer per volume',
    si: 'W/(m3 K)',
    shown: 'kW/(m3 K)',
    offered: ['kW/(m3 K)', 'W/(m3 K)'],
    examples: ['50 kW/(m3 K)'],
    min: 0,
    max: 1e15,
  },
  number: { noun: 'a plain number', si: '', shown: '', offered: [], examples: ['3', '0.85'] },
};
