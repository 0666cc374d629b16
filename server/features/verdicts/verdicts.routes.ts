import type { VerdictResponse } from '@shared/api/evidence';
import { route, schema } from '@/server/http/route';
import { withSchool } from '@/server/database/school';
import { parseTrial, tryVerdict } from './trial.service';

export const verdictsRoutes = [
  route({
    // The body is read here and not by the route table: what is wrong with a reading is known to the evidence engine,
    // down to numbers that JSON has no word for.
    method: 'post', path: '/verdicts/trial', permission: 'verdict:trial', summary: 'Compute a verdict from a record and readings (VerdictRequest), storing nothing',
    transaction: 'none', body: 'raw', response: schema<VerdictResponse>('VerdictResponse'), idempotent: false,
    handle: ({ db, actor, rawBody }) => {
      const request = parseTrial(rawBody);
      return withSchool(db, actor, (tx) => tryVerdict(tx, request));
    },
  }),
];
