import fc from 'fast-check';

/**
 * Every run draws the same cases, so that a failure on one machine is a failure on all.
 * Look for new cases with `FC_SEED=random` (a failing seed is printed by fast-check) or `FC_SEED=<integer>`.
 */
const asked = process.env.FC_SEED;
const seed = asked === 'random' ? Date.now() : Number(asked ?? 20_260_101);

fc.configureGlobal({ seed, numRuns: Number(process.env.FC_RUNS ?? 200) });
