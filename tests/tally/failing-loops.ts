/** Flowsheets built to fail, each for a reason of its own. */

/** An ammonia loop with a purge of inert gas. */
export const synthesisLoop = (
  change: {
    purge?: string;
    parts?: string;
    pressure?: string;
    reactor?: string;
    condenser?: string;
    dissolved?: boolean;
  } = {},
) => `looptally: 1
title: synthesis loop
components: [H2, N2, NH3, Ar]
dissolved_gases: ${change.dissolved ?? false}
reactions: {synthesis: N2 + 3 H2 <=> 2 NH3}
feeds:
  makeup: {flow: 1000 kmol/h, temperature: 35 degC, pressure: ${change.pressure ?? '200 bar'}, composition: {${change.parts ?? 'H2: 75, N2: 25, Ar: 0.3'}}}
blocks:
  mixer: {kind: mixer}
  converter: {kind: reactor, reactions: {synthesis: {}}, ${change.reactor ?? 'temperature: 450 degC'}}
  condenser: {kind: condenser, temperature: ${change.condenser ?? '0 degC'}}
  purge: {kind: splitter, fractions: {bleed: ${change.purge ?? '2 %'}}}
streams:
  S1: makeup -> mixer
  S2: mixer -> converter
  S3: converter -> condenser
  S4: condenser.liquid -> out
  S5: condenser.gas -> purge
  S6: purge.bleed -> out
  S7: purge.rest -> mixer
`;

/** Methanation with recycle: methane is formed, and a separator is to take it out. */
export const methaneLoop = (recovery: string) => `looptally: 1
title: methane loop
components: [CO, H2, CH4, H2O]
dissolved_gases: false
reactions: {methanation: CO + 3 H2 <=> CH4 + H2O}
feeds:
  gas: {flow: 100 kmol/h, temperature: 300 degC, pressure: 20 bar, composition: {H2: 75, CO: 25}}
blocks:
  mixer: {kind: mixer}
  converter: {kind: reactor, reactions: {methanation: {conversion: 50 %, of: CO}}, temperature: 350 degC}
  cooler: {kind: condenser, temperature: 40 degC}
  membrane: {kind: separator, recover: {product: {CH4: ${recovery}}}}
streams:
  S1: gas -> mixer
  S2: mixer -> converter
  S3: converter -> cooler
  S4: cooler.liquid -> out
  S5: cooler.gas -> membrane
  S6: membrane.product -> out
  S7: membrane.rest -> mixer
`;

/** An adiabatic reactor with recycle and a heater of set duty: most of the heat of every pass comes back. */
export const hotLoop = (duty: string) => `looptally: 1
title: hot loop
components: [CO, H2, CH4, H2O]
reactions: {methanation: CO + 3 H2 <=> CH4 + H2O}
feeds:
  gas: {flow: 100 kmol/h, temperature: 300 degC, pressure: 20 bar, composition: {H2: 75, CO: 25}}
blocks:
  mixer: {kind: mixer}
  heater: {kind: heater, duty: ${duty}}
  converter: {kind: reactor, reactions: {methanation: {conversion: 50 %, of: CO}}, adiabatic: true}
  split: {kind: splitter, fractions: {product: 10 %}}
streams:
  S1: gas -> mixer
  S2: mixer -> heater
  S3: heater -> converter
  S4: converter -> split
  S5: split.product -> out
  S6: split.rest -> mixer
`;

/** Condensate of a cooler of set duty comes back as hot gas: the more of it there is, the less condenses next time. */
export const flippingVessel = (boiler: string) => `looptally: 1
title: vessel between one phase and two
components: [N2, NH3]
feeds:
  gas: {flow: 100 kmol/h, temperature: 30 degC, pressure: 20 bar, composition: {N2: 85, NH3: 15}}
blocks:
  mixer: {kind: mixer}
  cooler: {kind: condenser, duty: -100 kW}
  boiler: {kind: heater, temperature: ${boiler}}
  split: {kind: splitter, fractions: {product: 5 %}}
streams:
  S1: gas -> mixer
  S2: mixer -> cooler
  S3: cooler.gas -> out
  S4: cooler.liquid -> split
  S5: split.product -> out
  S6: split.rest -> boiler
  S7: boiler -> mixer
`;

/** A reactor that converts next to nothing, and a small way out for all. */
export const idleReactor = (conversion: string) => `looptally: 1
title: idle reactor
components: [CO, H2, CH4, H2O]
reactions: {methanation: CO + 3 H2 <=> CH4 + H2O}
feeds:
  gas: {flow: 100 kmol/h, temperature: 300 degC, pressure: 20 bar, composition: {H2: 75, CO: 25}}
blocks:
  mixer: {kind: mixer}
  converter: {kind: reactor, reactions: {methanation: {conversion: ${conversion}, of: CO}}, temperature: 300 degC}
  split: {kind: splitter, fractions: {product: 3 %}}
streams:
  S1: gas -> mixer
  S2: mixer -> converter
  S3: converter -> split
  S4: split.product -> out
  S6: split.rest -> mixer
`;
