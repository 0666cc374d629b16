import type { DeskView } from '@shared/api/desk';
import { route, schema, type AnyRoute } from '@/server/http/route';
import { desk } from './desk.service';

export const deskRoutes: AnyRoute[] = [
  route({
    method: 'get', path: '/desk', permission: 'desk:read', summary: 'What now: each open loan with its one next action',
    response: schema<DeskView>('DeskView'), idempotent: false,
    handle: ({ tx, actor, now }) => desk(tx, actor.accountId, now),
  }),
];
