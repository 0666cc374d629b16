import { reply } from '@/server/http/reply';
import { route, schema } from '@/server/http/route';
import type { HealthView } from '@shared/api/health';
import { readHealth } from './health.service';

export const healthRoutes = [
  route({
    method: 'get', path: '/health', permission: 'public', summary: 'Whether process, database and queue work; 503 when one does not',
    response: schema<HealthView>('HealthView'), idempotent: false, transaction: 'none',
    handle: async ({ db }) => {
      const health = await readHealth(db);
      return reply(health.status === 'ok' ? 200 : 503, health);
    },
  }),
];
