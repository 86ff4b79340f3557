/** Bundle the command line into a folder: cli.js and chunks beside it. */
export function buildCli(folder: string): Promise<void>;
