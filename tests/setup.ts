import fc from 'fast-check';

/**
 * Random tests draw the same numbers each time, so that a failure can be repeated; SEED=number draws others.
 * A counterexample is found and kept as a named test, not waited for in somebody's CI.
 */
fc.configureGlobal({ seed: Number(process.env['SEED'] ?? 20261201), endOnFailure: true });
