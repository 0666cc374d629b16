import type { StoneView } from '@shared/api/kits';
import type { CustodyEventView } from '@shared/api/loans';
import { refuseBlind } from '@/server/features/bench/blindness';
import { custodyOf } from '@/server/features/custody/custody.service';
import { route, schema } from '@/server/http/route';
import { addIntakeReadings, strikeReading } from './intake.service';
import { IntakeReadingsDto, StrikeDto } from './readingEntry.dto';
import { NewStoneDto, StoneChangeDto } from './stones.dto';
import { findStone } from './stones.queries';
import { changeStone, createStone, getStone } from './stones.service';

const response = schema<StoneView>('StoneView');

export const stonesRoutes = [
  route({
    method: 'post', path: '/kits/:kitId/stones', permission: 'stone:write', summary: 'Add a stone to a kit',
    request: NewStoneDto, response, status: 201, idempotent: false,
    handle: ({ tx, actor, params, body, now }) => createStone(tx, actor, params.kitId, body, now),
  }),
  route({
    method: 'get', path: '/stones/:stoneId', permission: 'stone:read', summary: 'One stone with its record, readings and photos',
    response, idempotent: false,
    handle: ({ tx, actor, params }) => getStone(tx, actor.accountId, params.stoneId),
  }),
  route({
    method: 'patch', path: '/stones/:stoneId', permission: 'stone:write', summary: 'Change or retire a stone',
    request: StoneChangeDto, response, idempotent: false,
    handle: ({ tx, actor, params, body, now }) => changeStone(tx, actor, params.stoneId, body, now),
  }),
  route({
    method: 'post', path: '/stones/:stoneId/readings', permission: 'reading:write', summary: 'Add intake readings to a stone’s record',
    request: IntakeReadingsDto, response, status: 201, idempotent: true,
    handle: ({ tx, actor, params, body, now }) => addIntakeReadings(tx, actor, params.stoneId, body.readings, now),
  }),
  route({
    method: 'post', path: '/readings/:readingId/strike', permission: 'reading:write', summary: 'Strike an intake reading, with a reason',
    request: StrikeDto, response, idempotent: false,
    handle: ({ tx, actor, params, body, now }) => strikeReading(tx, actor, params.readingId, body.reason, now),
  }),
  route({
    method: 'get', path: '/stones/:stoneId/custody', permission: 'custody:read', summary: 'What happened to a stone, newest first',
    response: schema<CustodyEventView[]>('CustodyEventView[]'), idempotent: false,
    handle: async ({ tx, actor, params }) => {
      const stone = await findStone(tx, params.stoneId);
      await refuseBlind(tx, actor.accountId, stone.kitId);
      return custodyOf(tx, { stoneId: stone.id });
    },
  }),
];
