import type { Command } from 'commander';

/** A command as the overview knows it; its file is loaded only when the command is used. */
export interface CommandEntry {
  readonly summary: string;
  load(): Promise<Command>;
}

/** All commands in the order of a study. A new command is one file and one line here. */
export const commands: ReadonlyMap<string, CommandEntry> = new Map([
  [
    'balance',
    {
      summary: 'close the loop: stream table, ledger, key figures, closure',
      load: async () => (await import('./balance.ts')).balanceCommand(),
    },
  ],
  [
    'check',
    {
      summary: 'read and check a file; show order, tears and assumptions without solving',
      load: async () => (await import('./check.ts')).checkCommand(),
    },
  ],
  [
    'sweep',
    {
      summary: 'a table of closed cases over a grid of settings',
      load: async () => (await import('./sweep.ts')).sweepCommand(),
    },
  ],
  [
    'gather',
    {
      summary: 'join the slices of a sweep that several machines made',
      load: async () => (await import('./gather.ts')).gatherCommand(),
    },
  ],
  [
    'levers',
    {
      summary: 'what one unit more of each setting does to every key figure',
      load: async () => (await import('./levers.ts')).leversCommand(),
    },
  ],
  [
    'compare',
    {
      summary: 'cases or files side by side: settings that differ, then the figures',
      load: async () => (await import('./compare.ts')).compareCommand(),
    },
  ],
  [
    'uncertainty',
    {
      summary: 'percentiles of the figures from the spreads of the file, and what causes them',
      load: async () => (await import('./uncertainty.ts')).uncertaintyCommand(),
    },
  ],
  [
    'optimise',
    {
      summary: 'the best settings for the objective in the file, or a trade-off',
      load: async () => (await import('./optimise.ts')).optimiseCommand(),
    },
  ],
  [
    'sheet',
    {
      summary: 'close the loop and write its sheet to files (.html, .xlsx, .svg, .md, .csv)',
      load: async () => (await import('./sheet.ts')).sheetCommand(),
    },
  ],
  [
    'equilibrium',
    {
      summary: 'reaction equilibrium at one temperature and pressure, without a file',
      load: async () => (await import('./equilibrium.ts')).equilibriumCommand(),
    },
  ],
  [
    'data',
    {
      summary: 'built-in property data and published constants, with their sources',
      load: async () => (await import('./data.ts')).dataCommand(),
    },
  ],
  [
    'new',
    {
      summary: 'write a commented starter file',
      load: async () => (await import('./new.ts')).newCommand(),
    },
  ],
  [
    'schema',
    {
      summary: 'JSON Schema of the flowsheet file, for editors',
      load: async () => (await import('./schema.ts')).schemaCommand(),
    },
  ],
] satisfies [string, CommandEntry][]);
