import { ammonia } from './starters/ammonia.ts';
import { conversion } from './starters/conversion.ts';
import { methanation } from './starters/methanation.ts';
import { methanol } from './starters/methanol.ts';

/** Starter flowsheets by name. Each closes as it stands, and so do its cases. */
export const starters: ReadonlyMap<string, { readonly summary: string; readonly text: string }> = new Map([
  ['ammonia', { summary: 'converter at equilibrium, condenser, purge, circulator', text: ammonia }],
  ['methanol', { summary: 'CO and CO2 to methanol, two equilibria, water-cooled condenser', text: methanol }],
  ['methanation', { summary: 'adiabatic methanation, water knock-out, gas recycle', text: methanation }],
  [
    'conversion',
    { summary: 'reactor with a fixed conversion and a separation by recoveries', text: conversion },
  ],
]);
