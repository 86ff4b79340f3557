/** Starter flowsheet: ammonia loop with one converter, one condenser and a purge. */
export const ammonia = `looptally: 1                        # version of this format
title: Ammonia loop
notes: Invented figures of a usual size. Change them to your case.

# What occurs in the plant. \`looptally data\` lists what is built in.
components: [H2, N2, NH3, Ar, CH4]
gas: srk                            # real-gas model of the vapour: ideal, srk or pr
dissolved_gases: true               # gases dissolve in the condensate by Henry's law

reactions:
  synthesis: N2 + 3 H2 <=> 2 NH3

# What enters across the battery limit. Every quantity carries its unit.
feeds:
  makeup:
    flow: 5600 kmol/h
    temperature: 35 degC
    pressure: 160 bar
    composition: {H2: 74.2, N2: 24.7, Ar: 0.3, CH4: 0.8}   # parts by mole; they are normalised

blocks:
  mixer:      {kind: mixer}
  converter:                        # leaves at 440 degC, 10 K short of equilibrium; its duty is net of heating the feed
    kind: reactor
    reactions: {synthesis: {approach: 10 K}}
    temperature: 440 degC
    pressure_drop: 5 bar
  condenser:  {kind: condenser, temperature: -5 degC, pressure_drop: 3 bar, cooling: {water: 25 degC, approach: 10 K}}
  purge:      {kind: splitter, fractions: {bleed: 3 %}}      # the rest goes round
  circulator: {kind: compressor, pressure: 160 bar, efficiency: 78 %}

# tag: from -> to ; a port follows a dot; \`out\` is the battery limit
streams:
  S1: makeup -> mixer
  S2: mixer -> converter
  S3: converter -> condenser
  S4: condenser.gas -> purge
  S5: condenser.liquid -> out
  S6: purge.bleed -> out
  S7: purge.rest -> circulator
  S8: circulator -> mixer

# What the key figures refer to.
ledger:
  product: NH3 in S5
  reactant: H2
  purge: [S6]
  recycle: S8

# An aim moves one setting until a figure has the wanted value. Take the # away to use it.
# aims:
#   inert cap: {move: purge.fractions.bleed, between: [0.5 %, 20 %], until: streams.S2.y.Ar + streams.S2.y.CH4 = 10 %}

# Cases are named changes: looptally balance loop.yaml --case 'cold condenser'
cases:
  cold condenser: {condenser.temperature: -25 degC}

# Figures of your own; streams offer n (kmol/h), y, m, w, T, P, flow, mass.
figures:
  hydrogen_slip: {formula: streams.S6.n.H2 / streams.S1.n.H2, unit: '%'}

# Settings that can be moved in the live page: looptally sheet loop.yaml --out loop.html
handles:
  condenser.temperature: -30 degC..15 degC
  purge.fractions.bleed: 0.5 %..10 %
`;
