/** Bundle the command line into a folder: cli.js, live.js and chunks beside them. */
export function buildCli(folder: string): Promise<void>;
/** Bundle the script of live pages into a folder: live.js. */
export function buildLive(folder: string): Promise<void>;
/** Bundle the scripts of the pages of studies into a folder. */
export function buildPageScripts(folder: string): Promise<void>;

/** All that is shipped of dist/, into a folder made anew: command line, library, types and licences. */
export function buildAll(folder: string): Promise<void>;
