import { constantHeatGas } from '../blocks/constant-heat-gas.ts';
import { mixtureOf, streamOf, trial } from '../blocks/helpers.ts';
import { ammoniaCycle } from './ammonia-refrigeration.ts';
import type { Row } from './deviations-row.ts';
import { percent } from './deviations-statistics.ts';

/** The refrigeration cycle built of blocks, and staged compression of the textbooks' gas. */
export function refrigerationRows(): Row[] {
  return [
    {
      what: 'COP of the ideal single-stage NH3 refrigeration cycle, −33…5 to 30…40 degC, built of blocks',
      source: 'reference equation of state (Gao et al. 2020), from memory',
      unit: '%',
      deviations: ammoniaCycle.map(([cold, warm, from, to, , , cop]) =>
        percent(`${cold} to ${warm} degC`, cycle(from, to), cop),
      ),
      remark: 'cubic equations give polar vapour too small a heat capacity: work 3 % high, cold 1.5 % low',
    },
    {
      what: 'compression of a gas of constant exponent in 1 to 4 cooled stages, work',
      source:
        'Cengel & Boles, Example 7-13; Coulson & Richardson vol. 1, Example 8.4; Nag, Example 19.11 (re-computed)',
      unit: '%',
      deviations: [
        percent('n 1.3, 1 stage', staged(1.3, 0.287, 300, 1, 9, 1), 246.4),
        percent('n 1.3, 2 stages', staged(1.3, 0.287, 300, 1, 9, 2), 215.3),
        percent('n 1.25, 2 stages', staged(1.25, 8.314462618 / 28.8, 290, 1.013, 20.65, 2) / 0.85, 346.5),
        percent('36 bar, 1 stage', staged(1.3, 0.287, 298, 1, 36, 1), 476.75),
        percent('36 bar, 2 stages', staged(1.3, 0.287, 298, 1, 36, 2), 379.56),
        percent('36 bar, 3 stages', staged(1.3, 0.287, 298, 1, 36, 3), 352.89),
        percent('36 bar, 4 stages', staged(1.3, 0.287, 298, 1, 36, 4), 340.47),
      ],
      remark: 'four and five digits printed',
    },
  ];
}

/** Cold over work between two pressures [bar]: dry saturated suction, saturated liquid to the throttle. */
function cycle(fromBar: number, toBar: number): number {
  const ammonia = mixtureOf(['NH3']);
  const feed = (bar: number) => [streamOf(ammonia, { celsius: 20, bar, flows: { NH3: 1 } })];
  const suction = trial('heater', { vapour_fraction: '100 %' }, ammonia, feed(fromBar)).outlets;
  const condensate = trial('heater', { vapour_fraction: '0 %' }, ammonia, feed(toBar)).outlets[0]!;
  const machine = trial('compressor', { pressure: `${toBar} bar`, efficiency: '100 %' }, ammonia, suction);
  return (suction[0]!.enthalpyW - condensate.enthalpyW) / machine.report.powerW;
}

/** Work of a gas whose isentrope has the exponent n [kJ/kg]. */
function staged(
  n: number,
  rKJPerKgK: number,
  kelvin: number,
  from: number,
  to: number,
  stages: number,
): number {
  const gas = constantHeatGas(n, 8.314462618e-3 / rKJPerKgK);
  const inlet = streamOf(gas, { kelvin, bar: from, flows: { X: 1 } });
  const cooling = stages > 1 ? { stages, intercooling: `${kelvin} K` } : {};
  const { report } = trial('compressor', { pressure: `${to} bar`, efficiency: '100 %', ...cooling }, gas, [
    inlet,
  ]);
  return report.powerW / gas.mass(inlet) / 1e3;
}
