/** Starter flowsheet: a loop whose reactor converts what its catalyst is known to convert, no equilibrium. */
export const conversion = `looptally: 1                        # version of this format
title: Dimethyl ether from methanol, fixed conversion
notes: Invented figures. The catalyst sets the conversion; no equilibrium is asked for.

# What occurs in the plant. \`looptally data\` lists what is built in.
components: [CH3OH, DME, H2O]
gas: srk                            # real-gas model of the vapour: ideal, srk or pr

reactions:
  dehydration: 2 CH3OH <=> DME + H2O

# What enters across the battery limit. Every quantity carries its unit.
feeds:
  methanol:                         # liquid from storage
    flow: 200 kmol/h
    temperature: 40 degC
    pressure: 12 bar
    composition: {CH3OH: 99.9, H2O: 0.1}   # parts by mole; they are normalised

blocks:
  mixer:      {kind: mixer}
  evaporator: {kind: heater, temperature: 280 degC, pressure_drop: 0.5 bar}
  reactor:                          # 78 % of the methanol that enters reacts in one pass
    kind: reactor
    reactions: {dehydration: {conversion: 78 %, of: CH3OH}}
    temperature: 350 degC
    pressure_drop: 0.5 bar
  columns:                          # the train of columns, by what each product recovers
    kind: separator
    recover:
      product: {DME: 99.8 %, CH3OH: 0.1 %}
      water: {H2O: 99.9 %, CH3OH: 0.2 %}   # the rest is methanol that goes round
  cooler:     {kind: heater, temperature: 50 degC}
  pump:       {kind: pump, pressure: 12 bar, efficiency: 65 %}

# tag: from -> to ; a port follows a dot; \`out\` is the battery limit
streams:
  S1: methanol -> mixer
  S2: mixer -> evaporator
  S3: evaporator -> reactor
  S4: reactor -> columns
  S5: columns.product -> out
  S6: columns.water -> out
  S7: columns.rest -> cooler
  S8: cooler -> pump
  S9: pump -> mixer

# What the key figures refer to.
ledger:
  product: DME in S5
  reactant: CH3OH
  purge: []
  recycle: S9

# Cases are named changes: looptally balance loop.yaml --case 'tired catalyst'
cases:
  tired catalyst: {reactor.reactions.dehydration.conversion: 65 %}

# Settings that can be moved in the live page: looptally sheet loop.yaml --out loop.html
handles:
  reactor.reactions.dehydration.conversion: 50 %..90 %
`;
