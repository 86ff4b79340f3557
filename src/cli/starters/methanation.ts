/** Starter flowsheet: methanation with product gas recycled to hold down the temperature rise. */
export const methanation = `looptally: 1                        # version of this format
title: Methanation with gas recycle
notes: Invented figures of a usual size. Change them to your case.

# What occurs in the plant. \`looptally data\` lists what is built in.
components: [H2, CO, CO2, CH4, H2O, N2]
gas: srk                            # real-gas model of the vapour: ideal, srk or pr
dissolved_gases: true               # gases dissolve in the condensate by Henry's law

reactions:
  methanation: CO + 3 H2 <=> CH4 + H2O
  shift: CO + H2O <=> CO2 + H2

# What enters across the battery limit. Every quantity carries its unit.
feeds:
  syngas:
    flow: 1000 kmol/h
    temperature: 40 degC
    pressure: 30 bar
    composition: {H2: 74.0, CO: 21.0, CO2: 3.0, CH4: 1.5, N2: 0.5}   # parts by mole; they are normalised

# Recycled cold product gas takes up the heat of reaction: the more goes round, the cooler the reactor.
blocks:
  mixer:     {kind: mixer}
  preheater: {kind: heater, temperature: 300 degC, pressure_drop: 0.5 bar}
  reactor:                          # adiabatic bed, leaves at equilibrium
    kind: reactor
    reactions: {methanation: {approach: 0 K}, shift: {approach: 0 K}}
    adiabatic: true
    pressure_drop: 1 bar
  condenser: {kind: condenser, temperature: 40 degC, pressure_drop: 0.5 bar}   # water is knocked out here
  divider:   {kind: splitter, fractions: {product: 12 %}}    # the rest goes round
  blower:    {kind: compressor, pressure: 30 bar, efficiency: 72 %}

# tag: from -> to ; a port follows a dot; \`out\` is the battery limit
streams:
  S1: syngas -> mixer
  S2: mixer -> preheater
  S3: preheater -> reactor
  S4: reactor -> condenser
  S5: condenser.liquid -> out
  S6: condenser.gas -> divider
  S7: divider.product -> out
  S8: divider.rest -> blower
  S9: blower -> mixer

# What the key figures refer to. Nothing is purged: the product gas carries the inerts out.
ledger:
  product: CH4 in S7
  reactant: H2
  purge: []
  recycle: S9

# Cases are named changes: looptally balance loop.yaml --case 'less recycle'
cases:
  less recycle: {divider.fractions.product: 20 %}

# Figures of your own; streams offer n (kmol/h), y, m, w, T, P, flow, mass.
figures:
  reactor_outlet: {formula: streams.S4.T - 273.15, unit: degC}
  hydrogen_left: {formula: streams.S7.y.H2, unit: '%'}

# Settings that can be moved in the live page: looptally sheet loop.yaml --out loop.html
handles:
  condenser.temperature: 20 degC..70 degC
  divider.fractions.product: 10 %..60 %
`;
