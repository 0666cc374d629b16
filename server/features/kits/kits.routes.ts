import type { Page } from '@shared/api/common';
import type { KitRow, KitView } from '@shared/api/kits';
import type { CustodyEventView } from '@shared/api/loans';
import { refuseBlind } from '@/server/features/bench/blindness';
import { custodyOf } from '@/server/features/custody/custody.service';
import { route, schema } from '@/server/http/route';
import { KitChangeDto, KitListQuery, NewKitDto } from './kits.dto';
import { changeKit, createKit, findKit, getKit, listKits } from './kits.service';

export const kitsRoutes = [
  route({
    method: 'get', path: '/kits', permission: 'kit:read', summary: 'The catalogue of kits, by number',
    query: KitListQuery, response: schema<Page<KitRow>>('Page<KitRow>'), idempotent: false,
    handle: ({ tx, actor, query }) => listKits(tx, actor.accountId, query),
  }),
  route({
    method: 'post', path: '/kits', permission: 'kit:write', summary: 'Add a kit to the catalogue',
    request: NewKitDto, response: schema<KitView>('KitView'), status: 201, idempotent: false,
    handle: ({ tx, actor, body, now }) => createKit(tx, actor, body, now),
  }),
  route({
    method: 'get', path: '/kits/:kitId', permission: 'kit:read', summary: 'One kit with its stones and what their records lack',
    response: schema<KitView>('KitView'), idempotent: false,
    handle: ({ tx, actor, params }) => getKit(tx, actor.accountId, params.kitId),
  }),
  route({
    method: 'patch', path: '/kits/:kitId', permission: 'kit:write', summary: 'Change a kit, set it aside, lend it again or retire it',
    request: KitChangeDto, response: schema<KitView>('KitView'), idempotent: false,
    handle: ({ tx, actor, params, body, now }) => changeKit(tx, actor, params.kitId, body, now),
  }),
  route({
    method: 'get', path: '/kits/:kitId/custody', permission: 'custody:read', summary: 'What happened to a kit and its stones, newest first',
    response: schema<CustodyEventView[]>('CustodyEventView[]'), idempotent: false,
    handle: async ({ tx, actor, params }) => {
      await findKit(tx, params.kitId);
      await refuseBlind(tx, actor.accountId, params.kitId);
      return custodyOf(tx, { kitId: params.kitId });
    },
  }),
];
