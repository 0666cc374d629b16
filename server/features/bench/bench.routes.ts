import type { BenchList, BenchView, RecomputedVerdict } from '@shared/api/bench';
import { route, schema, type AnyRoute } from '@/server/http/route';
import { acceptStone, askSecondReading, endByAdmin, openCheck, seeJar } from './bench.service';
import { AcceptStoneDto, BenchJarDto, BenchReadingsDto, EndStoneDto, OpenBenchDto } from './bench.dto';
import { benchList } from './benchList';
import { benchView } from './benchView';
import { StrikeDto } from '@/server/features/stones/readingEntry.dto';
import { strikeReading, submitReadings } from './readings.service';
import { recomputeVerdict } from './recompute';

const view = schema<BenchView>('BenchView');

export const benchRoutes: AnyRoute[] = [
  route({
    method: 'get', path: '/bench', permission: 'bench:read', summary: 'What waits at the bench, never a loan of one’s own',
    response: schema<BenchList>('BenchList'), idempotent: false,
    handle: async ({ tx, actor }) => ({ items: await benchList(tx, actor.accountId) }),
  }),
  route({
    method: 'get', path: '/bench/:loanId', permission: 'bench:read', summary: 'One check, as far as it is open to this reader',
    response: view, idempotent: false,
    handle: ({ tx, params, actor }) => benchView(tx, params.loanId, actor.accountId),
  }),
  route({
    method: 'post', path: '/bench/:loanId/opening', permission: 'bench:write', summary: 'Begin a check by scanning the kit',
    request: OpenBenchDto, response: view, idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await openCheck(tx, params.loanId, body.code, { accountId: actor.accountId, now });
      return benchView(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/bench/:loanId/jars', permission: 'bench:write', summary: 'Note a jar as seen, missing or damaged',
    request: BenchJarDto, response: view, idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await seeJar(tx, params.loanId, body, { accountId: actor.accountId, now });
      return benchView(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/bench/:loanId/stones/:stoneId/readings', permission: 'bench:write', summary: 'Hand in readings of a stone; the record and the verdict open',
    request: BenchReadingsDto, response: view, idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await submitReadings(tx, params.loanId, params.stoneId, body.readings, { accountId: actor.accountId, now });
      return benchView(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/bench/:loanId/readings/:readingId/strike', permission: 'bench:write', summary: 'Strike a reading of one’s own, with a reason',
    request: StrikeDto, response: view, idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await strikeReading(tx, params.loanId, params.readingId, body.reason, { accountId: actor.accountId, now });
      return benchView(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/bench/:loanId/stones/:stoneId/second-reading', permission: 'bench:write', summary: 'Set the kit aside and ask a colleague for a reading of their own',
    response: view, idempotent: true,
    handle: async ({ tx, params, actor, now }) => {
      await askSecondReading(tx, params.loanId, params.stoneId, { accountId: actor.accountId, now });
      return benchView(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/bench/:loanId/stones/:stoneId/acceptance', permission: 'settle:agree', summary: 'Be one of the two people who accept a stone no reading settles',
    request: AcceptStoneDto, response: view, idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await acceptStone(tx, params.loanId, params.stoneId, body.reason, { accountId: actor.accountId, now });
      return benchView(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/bench/:loanId/stones/:stoneId/ending', permission: 'settle:write', summary: 'Settle a missing or damaged stone, or jars put right by hand',
    request: EndStoneDto, response: view, idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await endByAdmin(tx, params.loanId, params.stoneId, body, { accountId: actor.accountId, now });
      return benchView(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/verdicts/:verdictId/recomputation', permission: 'bench:read', summary: 'Compute a stored verdict again from what was stored with it',
    response: schema<RecomputedVerdict>('RecomputedVerdict'), idempotent: false,
    handle: ({ tx, params, actor }) => recomputeVerdict(tx, params.verdictId, actor.accountId),
  }),
];
