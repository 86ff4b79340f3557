import type { GasModelName } from '../../src/model/flowsheet.ts';
import type { StreamState } from '../../src/model/stream.ts';
import type { Mixture } from '../../src/properties/mixture.ts';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import { mixtureOf, streamOf, trial } from '../blocks/helpers.ts';
import {
  airToFourBar,
  airToNineBar,
  ammoniaCompression,
  steam,
  synthesisGasCompression,
  throttling,
} from './deviations-machine-values.ts';
import type { Row } from './deviations-row.ts';
import { difference, percent } from './deviations-statistics.ts';

const KELVIN = 273.15;
const SMITH = 'Smith, Van Ness & Abbott';

/** Valves and compressors, run as blocks. */
export function machineRows(): Row[] {
  return [
    throttlingRow(
      'srk',
      'cubic equations misplace the inversion of hydrogen: it warms too much at 300 K and still warms at 150 K, where it should cool by 2 K',
    ),
    throttlingRow('pr', 'as above, to the other side: hydrogen warms too little'),
    ...airRows(),
    ...steamRows(),
    ...ammoniaRows(),
    ...synthesisGasRows(),
  ];
}

function throttlingRow(gas: GasModelName, remark: string): Row {
  return {
    what: `temperature behind a valve: H2, N2, CH4, CO2, C3H8, \`gas: ${gas}\``,
    source: `reference equations of state, from memory; ${SMITH}, Example 7.4`,
    unit: 'K',
    deviations: throttling.map(([id, kelvin, from, to, change]) => {
      const inlet = streamOf(mixtureOf([id], { gas }), { kelvin, bar: from, flows: { [id]: 1 } });
      const [outlet] = trial('valve', { pressure: `${to} bar` }, mixtureOf([id], { gas }), [inlet]).outlets;
      return difference(`${id}, ${kelvin} K, ${from} bar`, outlet!.temperatureK - kelvin, change);
    }),
    remark,
  };
}

function airRows(): Row[] {
  const mixture = mixtureOf(['N2', 'O2'], { gas: 'ideal' });
  const air = (kelvin: number, bar: number, flow: number) =>
    streamOf(mixture, { kelvin, bar, flows: { N2: 0.79 * flow, O2: 0.21 * flow } });
  const { inletK, fromBar, toBar, workKJPerKg } = airToNineBar;
  const nine = compress(mixture, air(inletK, fromBar, 1), { pressure: `${toBar} bar`, efficiency: 1 });
  const four = compress(mixture, air(airToFourBar.inletK, airToFourBar.fromBar, airToFourBar.flowMolPerS), {
    pressure: `${airToFourBar.toBar} bar`,
    efficiency: 1,
  });
  return [
    {
      what: 'isentropic work of compressing air, two worked examples, `gas: ideal`',
      source: 'Cengel & Boles, Example 7-13; Coulson & Richardson vol. 1, Example 8.3',
      unit: '%',
      deviations: [
        percent('100 to 900 kPa', nine.kJPerKg, workKJPerKg),
        percent('101.3 to 380 kPa', four.powerKW, airToFourBar.powerKW),
      ],
      remark: 'the books keep k at 1.4, ours falls as air warms; three and four digits printed',
    },
  ];
}

function steamRows(): Row[] {
  const { fromBar, toBar, efficiency, workKJPerKg, outletK } = steam;
  const { mixture, stream } = saturatedVapour('H2O', fromBar);
  const ours = compress(mixture, stream, { pressure: `${toBar} bar`, efficiency });
  const source = `${SMITH}, Example 7.8`;
  return [
    {
      what: 'saturated steam 100 to 300 kPa, efficiency 75 %, work',
      source,
      unit: '%',
      deviations: [percent('', ours.kJPerKg, workKJPerKg)],
      remark: '`gas: srk`; cubic equations give polar vapour near saturation too small a heat capacity',
    },
    {
      what: 'the same, discharge temperature',
      source,
      unit: 'K',
      deviations: [difference('', ours.outletK, outletK)],
    },
  ];
}

function ammoniaRows(): Row[] {
  const runs = ammoniaCompression.map(([cold, warm, from, to, work, discharge]) => {
    const { mixture, stream } = saturatedVapour('NH3', from);
    const ours = compress(mixture, stream, { pressure: `${to} bar`, efficiency: 1 });
    return { at: `${cold} to ${warm} degC`, ours, work, discharge };
  });
  const source = 'reference equation of state (Gao et al. 2020), from memory';
  return [
    {
      what: 'isentropic work of saturated NH3 vapour, 1 to 15.5 bar',
      source,
      unit: '%',
      deviations: runs.map(({ at, ours, work }) => percent(at, ours.kJPerKg, work)),
      remark: 'as steam',
    },
    {
      what: 'the same, discharge temperature',
      source,
      unit: 'K',
      deviations: runs.map(({ at, ours, discharge }) => difference(at, ours.outletK - KELVIN, discharge)),
    },
  ];
}

function synthesisGasRows(): Row[] {
  const source = 'ideal gas with NASA heat capacities, solved independently';
  const ideal = synthesisGasCompression.map(([stages, work, discharge]) => ({
    at: `${stages} ${stages === 1 ? 'stage' : 'stages'}`,
    ours: synthesisGas(stages, 'ideal'),
    work,
    discharge,
  }));
  const rise = percent('', synthesisGas(3, 'srk').kJPerKmol, synthesisGas(3, 'ideal').kJPerKmol).value;
  return [
    {
      what: '3:1 synthesis gas 25 to 200 bar in 1 to 4 stages, work, `gas: ideal`',
      source,
      unit: '%',
      deviations: ideal.map(({ at, ours, work }) => percent(at, ours.kJPerKmol, work)),
      remark: `the real gas takes ${rise.toFixed(1)} % more in three stages (\`gas: srk\`)`,
    },
    {
      what: 'the same, discharge temperature',
      source,
      unit: 'K',
      deviations: ideal.map(({ at, ours, discharge }) => difference(at, ours.outletK - KELVIN, discharge)),
    },
  ];
}

function synthesisGas(stages: number, gas: GasModelName): Compression {
  const mixture = mixtureOf(['H2', 'N2'], { gas });
  const inlet = streamOf(mixture, { celsius: 35, bar: 25, flows: { H2: 0.75, N2: 0.25 } });
  const intercooling = stages > 1 ? { intercooling: '35 degC' } : {};
  return compress(mixture, inlet, { pressure: '200 bar', efficiency: 0.8, stages, ...intercooling });
}

interface Compression {
  readonly kJPerKg: number;
  readonly kJPerKmol: number;
  readonly powerKW: number;
  readonly outletK: number;
}

function compress(mixture: Mixture, inlet: StreamState, settings: object): Compression {
  const { report, outlets } = trial('compressor', settings, mixture, [inlet]);
  return {
    kJPerKg: report.powerW / mixture.mass(inlet) / 1e3,
    kJPerKmol: report.powerW / mixture.total(inlet),
    powerKW: report.powerW / 1e3,
    outletK: outlets[0]!.temperatureK,
  };
}

/** One mole a second of dry saturated vapour. */
function saturatedVapour(id: string, bar: number): { mixture: Mixture; stream: StreamState } {
  const mixture = mixtureOf([id]);
  const [component] = mixture.components;
  let low = 200;
  let high = 400;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (lnVapourPressure(component!, middle) < Math.log(1e5 * bar)) low = middle;
    else high = middle;
  }
  // a hair above the boiling point: the phase split sees no liquid there
  return { mixture, stream: streamOf(mixture, { kelvin: high * (1 + 1e-9), bar, flows: { [id]: 1 } }) };
}
