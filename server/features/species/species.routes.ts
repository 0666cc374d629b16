import type { SpeciesSummary } from '@shared/api/evidence';
import { listSpecies } from '@shared/gem';
import { route, schema } from '@/server/http/route';

export const speciesRoutes = [
  route({
    method: 'get', path: '/species', permission: 'species:read', summary: 'The reference table of species: printed ranges, not any stone of a school',
    response: schema<SpeciesSummary[]>('SpeciesSummary[]'), idempotent: false, transaction: 'none',
    handle: () => Promise.resolve(listSpecies()),
  }),
];
