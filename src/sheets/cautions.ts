import type { Flowsheet } from '../model/flowsheet.ts';
import type { Result } from '../model/result.ts';

/** What every sheet must say, whatever it is of. */
export const studyTool =
  'A study tool, not a design certificate. Hydrogen, ammonia, carbon monoxide and high pressure: design, ' +
  'materials and relief follow local codes and belong in the hands of licensed practice.';

/** What every sheet for reading ends with. */
export const caution = `${studyTool} Check the assumptions above before a figure leaves this sheet.`;

/** From here on a plant is built for its pressure [bar]. @source common practice */
const HIGH_PRESSURE = 20;

/** A danger, and the components of which one brings it. @source common practice */
const ofComponents: readonly (readonly [components: readonly string[], words: string])[] = [
  [
    ['H2'],
    'Hydrogen embrittles steel, and attacks it when hot (limits by the Nelson curves); it leaks through the smallest gap and burns with a flame that cannot be seen.',
  ],
  [['NH3'], 'Ammonia is toxic, burns the eyes and lungs, and attacks copper and its alloys.'],
  [
    ['CO'],
    'Carbon monoxide is toxic and has no smell; with nickel and iron it forms carbonyls, which are more toxic still; between about 400 and 800 degC it can lay down carbon and turn metal to dust, which the carbon activity of a reactor warns of and does not rule out.',
  ],
  [
    ['CH3OH', 'CH3OCH3', 'C2H5OH'],
    'Methanol, ethanol and dimethyl ether burn, methanol with a flame hardly to be seen; methanol is toxic.',
  ],
  [['SO2', 'SO3', 'H2SO4'], 'Sulphur oxides are toxic, and make acid with any water.'],
  [['NO', 'NO2', 'N2O4'], 'Oxides of nitrogen are toxic, with effects that come hours later.'],
  [['H2S'], 'Hydrogen sulphide is toxic, and soon numbs the nose that should warn of it.'],
  [
    ['O2'],
    'Oxygen beside ammonia, hydrogen or carbon monoxide explodes within limits that are not looked at here.',
  ],
];

/** The dangers of what is in a result, one sentence or two each: its components, its pressure, its catalyst. */
export function dangersOf({ ledger, streams, blocks }: Result): string[] {
  const bar = Math.max(0, ...Object.values(streams).map(({ pressure_bar }) => pressure_bar));
  const isCatalytic = Object.values(blocks).some(holdsCatalyst);
  return [
    ...dangersOfComponents(Object.keys(ledger)),
    ...(bar >= HIGH_PRESSURE
      ? [
          `Gas at ${bar.toFixed(0)} bar holds the energy of an explosion; a leak cuts, and relief is not looked at here.`,
        ]
      : []),
    ...(isCatalytic ? [ofCatalyst] : []),
  ];
}

/** The dangers of what flowsheets are about, where there is no one result to tell the pressure of. */
export function dangersOfAll(flowsheets: readonly Flowsheet[]): string[] {
  const isCatalytic = flowsheets.some(({ blocks }) => blocks.some(holdsCatalyst));
  return [
    ...dangersOfComponents(flowsheets.flatMap(({ components }) => components.map(({ id }) => id))),
    ...(isCatalytic ? [ofCatalyst] : []),
  ];
}

const ofCatalyst =
  'Reduced catalyst catches fire in air by itself; carbon, poisons and runaway are the business of its maker and of the plant.';

function holdsCatalyst({ kind }: { readonly kind: string }): boolean {
  return kind === 'reactor' || kind === 'kinetic_bed';
}

function dangersOfComponents(present: readonly string[]): string[] {
  return ofComponents.flatMap(([ids, words]) => (ids.some((id) => present.includes(id)) ? [words] : []));
}

/** Who made a sheet. @param version  left out: not said */
export function madeBy(version: string | undefined): string {
  return version === undefined ? 'Looptally' : `Looptally ${version}`;
}
