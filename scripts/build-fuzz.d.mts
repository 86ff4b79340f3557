/** Bundle fuzz/ into a folder: all.mjs and worker.mjs, with all they need. */
export function buildFuzz(folder: string): Promise<void>;
