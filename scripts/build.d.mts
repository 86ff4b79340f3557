/** Bundle the command line into a folder: cli.js and chunks beside it. */
export function buildCli(folder: string): Promise<void>;

/** All that is shipped of dist/, into a folder made anew: command line, library, types and licences. */
export function buildAll(folder: string): Promise<void>;
