/** Starter flowsheet: methanol loop from synthesis gas with CO, CO2 and inert gases. */
export const methanol = `looptally: 1                        # version of this format
title: Methanol loop
notes: Invented figures of a usual size. Change them to your case.

# What occurs in the plant. \`looptally data\` lists what is built in.
components: [H2, CO, CO2, CH3OH, H2O, CH4, N2]
gas: srk                            # real-gas model of the vapour: ideal, srk or pr
dissolved_gases: true               # gases dissolve in the condensate by Henry's law

# Both reach equilibrium together; CO2 + 3 H2 <=> CH3OH + H2O follows from the two.
reactions:
  synthesis: CO + 2 H2 <=> CH3OH
  shift: CO + H2O <=> CO2 + H2

# What enters across the battery limit. Every quantity carries its unit.
feeds:
  makeup:
    flow: 7000 kmol/h
    temperature: 40 degC
    pressure: 80 bar
    composition: {H2: 69.5, CO: 19.5, CO2: 8.0, CH4: 2.5, N2: 0.5}   # parts by mole; they are normalised

blocks:
  mixer:      {kind: mixer}
  converter:                        # leaves at 255 degC, 15 K short of equilibrium; its duty is net of heating the feed
    kind: reactor
    reactions: {synthesis: {approach: 15 K}, shift: {approach: 0 K}}
    temperature: 255 degC
    pressure_drop: 3 bar
  condenser:  {kind: condenser, temperature: 40 degC, pressure_drop: 2 bar}   # cooling water reaches this
  purge:      {kind: splitter, fractions: {bleed: 4 %}}      # the rest goes round
  circulator: {kind: compressor, pressure: 80 bar, efficiency: 76 %}

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
  product: CH3OH in S5
  reactant: H2
  purge: [S6]
  recycle: S8

# Cases are named changes: looptally balance loop.yaml --case 'small purge'
cases:
  small purge: {purge.fractions.bleed: 1.5 %}

# Figures of your own; streams offer n (kmol/h), y, m, w, T, P, flow, mass.
figures:
  stoichiometric_number: {formula: (streams.S1.n.H2 - streams.S1.n.CO2) / (streams.S1.n.CO + streams.S1.n.CO2)}
  carbon_to_methanol: {formula: streams.S5.n.CH3OH / (streams.S1.n.CO + streams.S1.n.CO2), unit: '%'}

# Settings that can be moved in the live page: looptally sheet loop.yaml --out loop.html
handles:
  condenser.temperature: 20 degC..70 degC
  purge.fractions.bleed: 0.5 %..12 %
`;
