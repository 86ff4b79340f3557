declare const LOOPTALLY_VERSION: string | undefined;

/** Version of this build, put in by scripts/build.mjs. */
export const version: string = typeof LOOPTALLY_VERSION === 'string' ? LOOPTALLY_VERSION : 'unbuilt';
