import type { VerdictResponse } from '@shared/api/evidence';

/**
 * A verdict in one or two sentences: support for one proposition against the other, in the verbal scale the engine names,
 * never a probability and never a word about a person.
 */
export function headline(result: VerdictResponse, speciesName: (id: string) => string): string {
  const [best] = result.alternatives;
  const fits = best === undefined ? '' : ` ${capital(speciesName(best.species))} fits best.`;
  const support = capital(result.support);
  if (result.verdict === 'same') return `Same stone. ${support} support for the recorded stone.`;
  if (result.verdict === 'different') return `Different stone. ${support} support for another stone.${fits}`;
  if (result.supports === 'recorded_stone') return `Not settled. ${support} support for the recorded stone so far.`;
  if (result.supports === 'another_stone') return `Not settled. ${support} support for another stone so far.${fits}`;
  return 'Not settled. The readings do not tell the two apart yet.';
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
