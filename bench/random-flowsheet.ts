import { createDraft, type Draft, type End, short } from './flowsheet-draft.ts';
import { type Chance, createChance, gasTrain, liquidTrain } from './flowsheet-trains.ts';
import { randomNumbers } from './random-numbers.ts';

/** How large a flowsheet is wanted. Every recycle takes at least ten blocks. */
export interface Wanted {
  readonly blocks: number;
  readonly recycles: number;
  readonly seed: number;
  /** drawn where it is left out */
  readonly trade?: 'ammonia' | 'methanol';
  readonly dissolvedGases?: boolean;
}

/** Blocks of a loop by itself, and those of each further recycle. */
const LOOP = 8;
const EXTRA = { inner: 2, flash: 1, permeate: 2, across: 2 } as const;
type Extra = keyof typeof EXTRA;

/** At most so many loops hand their purge on to the next, so that inerts cannot pile up along the chain. */
const CHAIN = 3;

interface Section {
  readonly extras: readonly Extra[];
  /** the purge of the section before comes in as well */
  readonly linked: boolean;
  /** hydrogen comes back from a purge, so the makeup is short of it */
  hydrogenBack: boolean;
  fill: number;
}

interface Trade {
  readonly name: string;
  readonly head: readonly string[];
  readonly bar: readonly [number, number];
  readonly condenserDegC: readonly [number, number];
  readonly letDownBar: number;
  readonly coldDegC: number;
  readonly interDegC: number;
  readonly permeate: string;
  readonly product: string;
  makeup(chance: Chance, hydrogenBack: boolean): string;
  /** inlet temperature [degC] and the settings of the converter */
  converter(chance: Chance, hydrogenBack: boolean): { inDegC: number; settings: string };
}

const ammonia: Trade = {
  name: 'ammonia',
  head: ['components: [H2, N2, NH3, Ar, CH4]', 'reactions: {synthesis: N2 + 3 H2 <=> 2 NH3}'],
  bar: [120, 220],
  condenserDegC: [-15, 15],
  letDownBar: 22,
  coldDegC: -18,
  interDegC: 40,
  permeate: 'H2: 60 %, N2: 8 %, Ar: 15 %, CH4: 6 %',
  product: 'NH3',
  makeup(chance, hydrogenBack) {
    const ratio = hydrogenBack ? chance.between(2.75, 2.9) : chance.between(3, 3.06);
    const [argon, methane] = [chance.between(0.1, 0.5), chance.between(0.2, 1.2)];
    const rest = 100 - argon - methane;
    const h2 = (rest * ratio) / (1 + ratio);
    return `H2: ${short(h2)}, N2: ${short(rest - h2)}, Ar: ${short(argon)}, CH4: ${short(methane)}`;
  },
  converter(chance, hydrogenBack) {
    const mode = chance.below(3);
    const approach = `approach: ${short(chance.between(10, 40))} K`;
    if (mode === 0)
      return {
        inDegC: chance.between(270, 320),
        settings: `reactions: {synthesis: {${approach}}}, adiabatic: true`,
      };
    const degC = chance.between(420, 480);
    const run =
      mode === 1 && !hydrogenBack ? `conversion: ${short(chance.between(15, 30))} %, of: N2` : approach;
    return {
      inDegC: degC - chance.between(90, 150),
      settings: `reactions: {synthesis: {${run}}}, temperature: ${short(degC)} degC`,
    };
  },
};

const methanol: Trade = {
  name: 'methanol',
  head: [
    'components: [H2, CO, CO2, CH4, N2, CH3OH, H2O]',
    'reactions:',
    '  methanol: {equation: CO + 2 H2 <=> CH3OH, constant: graaf-winkelman-2016}',
    '  reverse_shift: {equation: CO2 + H2 <=> CO + H2O, constant: graaf-winkelman-2016}',
  ],
  bar: [65, 95],
  condenserDegC: [30, 45],
  letDownBar: 20,
  coldDegC: 25,
  interDegC: 90,
  permeate: 'H2: 60 %, CO: 5 %, CO2: 20 %, CH4: 4 %, N2: 5 %',
  product: 'CH3OH',
  makeup(chance, hydrogenBack) {
    const h2 = hydrogenBack ? chance.between(63, 66) : chance.between(68.5, 69.5);
    const [methane, nitrogen] = [chance.between(0.3, 1), chance.between(0.1, 0.5)];
    const carbon = 100 - h2 - methane - nitrogen;
    const co2 = carbon * chance.between(0.2, 0.3);
    return `H2: ${short(h2)}, CO: ${short(carbon - co2)}, CO2: ${short(co2)}, CH4: ${short(methane)}, N2: ${short(nitrogen)}`;
  },
  converter(chance) {
    const degC = chance.between(245, 265);
    return {
      inDegC: degC - chance.between(20, 35),
      settings:
        `reactions: {methanol: {approach: ${short(chance.between(10, 20))} K}, ` +
        `reverse_shift: {approach: ${short(chance.between(3, 8))} K}}, temperature: ${short(degC)} degC`,
    };
  },
};

/**
 * A random flowsheet as YAML text, the same for the same size and seed; invented, and meant to close: a row of
 * synthesis loops of ammonia or methanol with their makeup compressors, some of them with inner recycles, returned
 * flash gas, hydrogen got back from the purge, and purges that go on to the next loop and partly come back from it.
 *
 * @throws Error where so few blocks cannot have so many recycles
 */
export function randomFlowsheet({ blocks, recycles, seed, trade: wanted, dissolvedGases }: Wanted): string {
  if (recycles < 1 || blocks < 10 * recycles)
    throw new Error(`${blocks} blocks are too few for ${recycles} recycles`);
  const draw = randomNumbers(seed);
  const chance = createChance(draw);
  const drawn = chance.below(3) === 0 ? methanol : ammonia;
  const trade = wanted === undefined ? drawn : { ammonia, methanol }[wanted];
  const sections = planSections(chance, blocks, recycles);
  const draft = createDraft();
  const products: string[] = [];
  let before: Made | null = null;
  sections.forEach((section, k) => {
    before = writeSection(
      draft,
      chance,
      trade,
      section,
      `L${k + 1}`,
      before,
      sections[k + 1]?.linked ?? false,
    );
    products.push(before.product);
  });
  const head = [
    'looptally: 1',
    `title: Random ${trade.name} loops, ${blocks} blocks, ${recycles} recycles, seed ${seed}`,
    'notes: Invented for measuring; no plant stands behind it.',
    'gas: srk',
    'liquid: antoine',
    `dissolved_gases: ${dissolvedGases ?? chance.below(2) === 0}`,
    ...trade.head,
  ];
  return draft.text(head, ({ tags }) => [
    `ledger: {product: ${trade.product} in ${products[0]}, reactant: H2, recycle: ${tags.get('L1_circulator')}}`,
  ]);
}

function planSections(chance: Chance, blocks: number, recycles: number): Section[] {
  const sections: Section[] = [];
  let spent = 0;
  for (let left = recycles; left > 0; ) {
    const linked = sections.length % CHAIN !== 0 && chance.below(2) === 0;
    const extras: Extra[] = [];
    left--;
    const most = chance.below(3);
    for (const extra of [
      'inner',
      'flash',
      chance.below(2) === 0 && linked ? 'across' : 'permeate',
    ] as const) {
      if (left === 0 || extras.length >= most || chance.below(2) === 0) continue;
      extras.push(extra);
      left--;
    }
    const back = extras.includes('permeate') || extras.includes('across');
    if (extras.includes('across')) sections[sections.length - 1].hydrogenBack = true;
    sections.push({ extras, linked, hydrogenBack: back, fill: 0 });
    spent += LOOP + (linked ? 1 : 0) + extras.reduce((sum, extra) => sum + EXTRA[extra], 0);
  }
  for (let left = blocks - spent; left > 0; left--) sections[chance.below(sections.length)].fill++;
  return sections;
}

interface Made {
  /** the loop's mixer and its pressure */
  readonly mixer: End;
  /** the purge, where the next section takes it */
  readonly purge: End | null;
  /** tag of the product stream */
  readonly product: string;
}

function writeSection(
  draft: Draft,
  chance: Chance,
  trade: Trade,
  section: Section,
  name: string,
  before: Made | null,
  handsOn: boolean,
): Made {
  const { extras, hydrogenBack } = section;
  const has = (extra: Extra): boolean => extras.includes(extra);
  const bar = Number(short(chance.between(...trade.bar)));
  const [ahead, front, back, liquid, purged] = shares(chance, section.fill, 5);
  const at = (what: string, pressure = bar): End => ({ at: `${name}_${what}`, bar: pressure });
  const put = (from: End, what: string, kind: string, settings = '', pressure = bar): End => {
    draft.lead(from, draft.block(`${name}_${what}`, kind, settings));
    return at(what, pressure);
  };
  const compress = (from: End, what: string, to: number, stages: number): End =>
    put(
      from,
      what,
      'compressor',
      `pressure: ${short(to)} bar${stages > 1 ? `, stages: ${stages}, intercooling: ${trade.interDegC} degC` : ''}`,
      to,
    );

  const mixer = at('mixer');
  draft.block(mixer.at, 'mixer');
  const composition = trade.makeup(chance, hydrogenBack);
  const flow = short(chance.between(1000, 6000));
  let end = draft.feed(
    `${name}_makeup`,
    `flow: ${flow} kmol/h, temperature: ${short(chance.between(20, 50))} degC, composition: {${composition}}`,
    Number(short(chance.between(22, 40))),
  );
  end = gasTrain(draft, chance, `${name}_m`, end, ahead, 3, true);
  draft.lead(compress(end, 'makeup_compressor', bar, 3), mixer.at);
  if (section.linked && before?.purge) {
    const { purge } = before;
    const link =
      purge.bar > bar
        ? put(purge, 'link', 'valve', `pressure: ${short(bar)} bar`)
        : compress(purge, 'link', bar, 1);
    draft.lead(link, mixer.at);
  }

  // Once round
  const converter = trade.converter(chance, hydrogenBack);
  end = gasTrain(draft, chance, `${name}_f`, mixer, front, 2, false);
  const middle = has('inner') ? put(end, 'middle', 'mixer', '', end.bar) : null;
  end = put(
    middle ?? end,
    'preheat',
    'heater',
    `temperature: ${short(converter.inDegC)} degC, pressure_drop: 0.5 bar`,
    end.bar - 0.5,
  );
  end = put(end, 'converter', 'reactor', `${converter.settings}, pressure_drop: 2 bar`, end.bar - 2);
  end = gasTrain(draft, chance, `${name}_b`, end, back, 2, false);
  const cold = short(chance.between(...trade.condenserDegC));
  put(end, 'condenser', 'condenser', `temperature: ${cold} degC, pressure_drop: 1.5 bar`);
  const low = end.bar - 1.5;
  put(at('condenser.gas'), 'purge', 'splitter', `fractions: {bleed: ${short(chance.between(3, 9))} %}`);
  end = compress(at('purge.rest'), 'circulator', bar, 1);
  if (middle !== null) {
    put(end, 'fork', 'splitter', `fractions: {inner: ${short(chance.between(10, 50))} %}`);
    draft.lead(at('fork.inner'), middle.at);
    end = at('fork.rest');
  }
  draft.lead(end, mixer.at);

  // Product
  const letDown = trade.letDownBar;
  put(at('condenser.liquid'), 'letdown', 'flash', `pressure: ${letDown} bar, adiabatic: true`);
  if (has('flash')) draft.lead(compress(at('letdown.gas'), 'flash_compressor', bar, 3), mixer.at);
  else draft.lead(at('letdown.gas'), 'out');
  end = liquidTrain(draft, chance, `${name}_p`, at('letdown.liquid', letDown), liquid, trade.coldDegC);
  const product = draft.lead(end, 'out');

  // Purge
  end = gasTrain(draft, chance, `${name}_g`, at('purge.bleed', low), purged, 5, true);
  if (has('permeate') || has('across')) {
    const drawn = Number(short(bar * chance.between(0.3, 0.5)));
    const recover = `recover: {permeate: {${trade.permeate}}}, pressures: {permeate: ${drawn} bar}`;
    put(end, 'membrane', 'separator', recover);
    const target = has('across') ? before!.mixer : mixer;
    draft.lead(compress(at('membrane.permeate', drawn), 'permeate_compressor', target.bar, 2), target.at);
    end = at('membrane.rest', end.bar);
  }
  if (!handsOn) draft.lead(end, 'out');
  return { mixer, purge: handsOn ? end : null, product };
}

/** A number parted at random into so many. */
function shares(chance: Chance, total: number, parts: number): number[] {
  const out = new Array<number>(parts).fill(0);
  for (let k = 0; k < total; k++) out[chance.below(parts)]++;
  return out;
}
