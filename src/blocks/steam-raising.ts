import { z } from 'zod';
import {
  HIGHEST_STEAM_PA,
  HOTTEST_STEAM_K,
  LOWEST_STEAM_PA,
  liquidWaterEnthalpy,
  saturationTemperatureK,
  steamEnthalpy,
} from '../properties/steam.ts';
import { quantity } from '../units/schema.ts';
import type { BlockReport, SettingsFault } from './block.ts';
import { evenShares, inOrder } from './heat-path.ts';

/** What an editor says of `steam`. */
export const STEAM =
  'the steam that the heat given off could raise; changes no stream. None reckoned if left out';

/** The steam that the heat given off by a block could raise. */
export const steamSettings = z.strictObject({
  pressure: quantity('pressure', {
    min: LOWEST_STEAM_PA,
    max: HIGHEST_STEAM_PA,
    description: 'pressure at which the steam is raised',
    examples: ['40 bar'],
  }),
  feedwater: quantity('temperature', {
    min: 273.15,
    description: 'temperature of the boiler feedwater',
    examples: ['105 degC'],
  }),
  superheat: quantity('temperatureDifference', {
    min: 0,
    description: 'above saturation; saturated steam if left out',
    examples: ['60 K'],
  }).optional(),
  approach: quantity('temperatureDifference', {
    min: 0,
    description: 'closest approach wanted between process and water, 10 K if left out',
  }).optional(),
});
export type SteamSettings = z.infer<typeof steamSettings>;

/** Closest approach of a boiler where none is given [K]. @source common practice, 10–20 K */
const APPROACH_K = 10;
/** Even intervals at which process and water are held against one another. */
const COMPARED = 24;

/** What the settings of a block's steam get wrong; `path` leads to them. */
export function steamFaults(steam: SteamSettings | undefined): SettingsFault[] {
  if (!steam) return [];
  const boilingK = saturationTemperatureK(steam.pressure);
  if (steam.feedwater >= boilingK) {
    return [
      {
        path: ['steam', 'feedwater'],
        code: 'feedwater-boils',
        what: `Feedwater of ${celsius(steam.feedwater)} is set for steam of ${bar(steam.pressure)}.`,
        why: `water boils at ${celsius(boilingK)} there, so this feed would be steam already`,
        mend: `set feedwater below ${celsius(boilingK)}, e.g. 105 degC as it leaves a deaerator`,
      },
    ];
  }
  const leavesK = boilingK + (steam.superheat ?? 0);
  if (leavesK <= HOTTEST_STEAM_K) return [];
  return [
    {
      path: ['steam', 'superheat'],
      code: 'out-of-range',
      what: `The steam would leave at ${celsius(leavesK)}.`,
      why: `the steam tables used end at ${celsius(HOTTEST_STEAM_K)}`,
      mend: `set superheat to ${Math.floor(HOTTEST_STEAM_K - boilingK)} K or less`,
    },
  ];
}

/**
 * Steam from the heat that a block gives off, all of it, in counter-current: feedwater is heated to boiling,
 * boils at one temperature, is superheated where that is set.
 *   m = Q / (h_steam − h_feedwater)
 * Blow-down, pumping and pressure losses are left out.
 *
 * @param dutyW  of the block, negative where heat is given off
 * @param processAt  temperature of the process [K] at a share of the heat, counted from its cold end; null where
 *   it has no curve
 * @source IAPWS R7-97(2012), see properties/steam.ts
 */
export function raiseSteam(
  steam: SteamSettings,
  dutyW: number,
  processAt: ((share: number) => number) | null,
): Pick<BlockReport, 'warnings' | 'assumptions'> & {
  readonly details: Readonly<Record<string, number | null>>;
} {
  const water = waterPath(steam);
  const heatW = Math.max(-dutyW, 0);
  const kgPerS = heatW / water.heatJPerKg;
  const worst = heatW > 0 && processAt ? closest(water, processAt) : null;
  const details = {
    raised_t_h: kgPerS * 3.6,
    pressure_bar: steam.pressure / 1e5,
    boils_at_K: water.boilingK,
    leaves_at_K: water.leavesK,
    feedwater_K: steam.feedwater,
    closest_approach_K: worst === null ? null : worst.differenceK,
  };
  const wantedK = steam.approach ?? APPROACH_K;
  const warnings = [];
  if (dutyW > 0) {
    warnings.push({ code: 'no-heat-for-steam', message: 'the block takes up heat, so it raises no steam' });
  }
  if (worst !== null && worst.differenceK < wantedK) {
    warnings.push({ code: 'steam-too-hot', message: tooHot(steam, water, worst, wantedK) });
  }
  return {
    details,
    warnings,
    assumptions: [
      `Steam of ${bar(steam.pressure)} from feedwater of ${celsius(steam.feedwater)} by IAPWS R7-97(2012), without blow-down and losses${steam.approach === undefined ? `; closest approach ${APPROACH_K} K (common practice)` : ''}.`,
    ],
  };
}

/** Water on its way from feedwater to steam, by share of the heat. */
interface WaterPath {
  readonly heatJPerKg: number;
  readonly boilingK: number;
  readonly leavesK: number;
  /** shares at which boiling starts and ends */
  readonly boils: readonly [number, number];
  at(share: number): number;
}

function waterPath({ pressure, feedwater, superheat = 0 }: SteamSettings): WaterPath {
  const boilingK = saturationTemperatureK(pressure);
  const leavesK = boilingK + superheat;
  const cold = liquidWaterEnthalpy(feedwater, pressure);
  const boiling = liquidWaterEnthalpy(boilingK, pressure);
  const saturated = steamEnthalpy(boilingK, pressure);
  const heatJPerKg = (superheat > 0 ? steamEnthalpy(leavesK, pressure) : saturated) - cold;
  return {
    heatJPerKg,
    boilingK,
    leavesK,
    boils: [(boiling - cold) / heatJPerKg, (saturated - cold) / heatJPerKg],
    at(share) {
      const h = cold + share * heatJPerKg;
      if (h < boiling) return temperatureOf((T) => liquidWaterEnthalpy(T, pressure), h, feedwater, boilingK);
      if (h <= saturated) return boilingK;
      return temperatureOf((T) => steamEnthalpy(T, pressure), h, boilingK, leavesK);
    },
  };
}

/** Turn a rising enthalpy round by halving: 40 halvings of some hundred kelvin are below rounding of a drawing. */
function temperatureOf(enthalpy: (T: number) => number, h: number, low: number, high: number): number {
  let [a, b] = [low, high];
  for (let n = 0; n < 40; n++) {
    const middle = 0.5 * (a + b);
    if (enthalpy(middle) < h) a = middle;
    else b = middle;
  }
  return 0.5 * (a + b);
}

interface Closest {
  readonly share: number;
  readonly processK: number;
  readonly waterK: number;
  readonly differenceK: number;
}

function closest(water: WaterPath, processAt: (share: number) => number): Closest {
  const all = inOrder(
    evenShares(COMPARED),
    water.boils.map((share) => Math.min(share, 1)),
  ).map((share) => {
    const processK = processAt(share);
    const waterK = water.at(share);
    return { share, processK, waterK, differenceK: processK - waterK };
  });
  return all.reduce((worst, one) => (one.differenceK < worst.differenceK ? one : worst));
}

function tooHot(steam: SteamSettings, water: WaterPath, worst: Closest, wantedK: number): string {
  const [starts, ends] = water.boils;
  const where =
    worst.share === 0
      ? 'where the feedwater enters'
      : worst.share < starts
        ? 'while the feedwater is heated'
        : worst.share <= ends
          ? 'where the water boils'
          : 'where the steam is superheated';
  return `${where} the process is at ${celsius(worst.processK)} and the water at ${celsius(worst.waterK)}, closer than ${wantedK.toFixed(0)} K: this heat does not raise so much steam of ${bar(steam.pressure)}; lower its pressure or superheat, or give the block less to cool`;
}

function celsius(kelvin: number): string {
  return `${(kelvin - 273.15).toFixed(1)} degC`;
}

function bar(pascal: number): string {
  return `${Number((pascal / 1e5).toPrecision(5))} bar`;
}
