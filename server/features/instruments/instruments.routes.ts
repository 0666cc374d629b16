import type { InstrumentView } from '@shared/api/instruments';
import { route, schema } from '@/server/http/route';
import { InstrumentChangeDto, NewInstrumentDto } from './instruments.dto';
import { changeInstrument, createInstrument, listInstruments } from './instruments.service';

export const instrumentsRoutes = [
  route({
    method: 'get', path: '/instruments', permission: 'instrument:read', summary: 'The register of instruments',
    response: schema<InstrumentView[]>('InstrumentView[]'), idempotent: false,
    handle: ({ tx }) => listInstruments(tx),
  }),
  route({
    method: 'post', path: '/instruments', permission: 'instrument:write', summary: 'Add an instrument to the register',
    request: NewInstrumentDto, response: schema<InstrumentView>('InstrumentView'), status: 201, idempotent: false,
    handle: ({ tx, actor, body }) => createInstrument(tx, actor, body),
  }),
  route({
    method: 'patch', path: '/instruments/:instrumentId', permission: 'instrument:write', summary: 'Change or retire an instrument',
    request: InstrumentChangeDto, response: schema<InstrumentView>('InstrumentView'), idempotent: false,
    handle: ({ tx, params, body, now }) => changeInstrument(tx, params.instrumentId, body, now),
  }),
];
