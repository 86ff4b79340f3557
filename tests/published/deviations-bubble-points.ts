import { bubblePoint } from '../properties/bubble-point.ts';
import { mixtureOf } from '../properties/mixture-of.ts';
import { ammoniaWater, ammoniaWaterGrid, ethanolWater, methanolWater } from './bubble-points.ts';
import type { Row } from './deviations-row.ts';
import { difference } from './deviations-statistics.ts';

const KELVIN = 273.15;
const ATM_BAR = 1.01325;

/** Boiling temperatures and vapours of liquid mixtures, through the phase split. */
export function bubblePointRows(): Row[] {
  return [
    ...alcoholRows(
      'CH3OH',
      'methanol-water',
      methanolWater,
      "Perry's handbook (three temperatures and one row from memory)",
      'NRTL; an ideal solution is off by 3.8 K on average',
    ),
    ...alcoholRows(
      'C2H5OH',
      'ethanol-water',
      ethanolWater,
      'Carey & Lewis 1932, as reprinted in handbooks',
      'NRTL; an ideal solution is off by 7.5 K on average',
    ),
    ...ammoniaWaterRows(),
  ];
}

function alcoholRows(
  id: string,
  name: string,
  points: typeof methanolWater,
  source: string,
  remark: string,
): Row[] {
  const mixture = mixtureOf([id, 'H2O']);
  const found = points.map(([x, y, celsius]) => ({
    at: `x ${x}`,
    y,
    celsius,
    ours: bubblePoint(mixture, [x, 1 - x], ATM_BAR),
  }));
  return [
    {
      what: `bubble point of ${name} at 1 atm`,
      source,
      unit: 'K',
      deviations: found.map(({ at, celsius, ours }) => difference(at, ours.T - KELVIN, celsius)),
      remark,
    },
    {
      what: `vapour of boiling ${name}, mol fraction`,
      source,
      unit: 'mol/mol',
      deviations: found.map(({ at, y, ours }) => difference(at, ours.y, y)),
    },
  ];
}

function ammoniaWaterRows(): Row[] {
  const mixture = mixtureOf(['NH3', 'H2O']);
  const found = ammoniaWaterGrid.megapascal.flatMap((megapascal) =>
    ammoniaWaterGrid.x.map((x) => ({
      at: `x ${x}, ${10 * megapascal} bar`,
      theirs: ammoniaWater(x, megapascal),
      ours: bubblePoint(mixture, [x, 1 - x], 10 * megapascal),
    })),
  );
  const source = 'correlation of Patek & Klomfar 1995';
  return [
    {
      what: 'bubble point of ammonia-water, 0.2 to 20 bar',
      source,
      unit: 'K',
      deviations: found.map(({ at, theirs, ours }) => difference(at, ours.T, theirs.T)),
      remark:
        'Redlich-Kister terms fitted to this correlation with `gas: srk`; an ideal gas goes far astray above 5 bar',
    },
    {
      what: 'ammonia in the vapour of boiling ammonia-water, mol fraction',
      source,
      unit: 'mol/mol',
      deviations: found.map(({ at, theirs, ours }) => difference(at, ours.y, theirs.y)),
    },
  ];
}
