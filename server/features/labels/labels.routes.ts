import type { IssuedLabels, ScannedLabel } from '@shared/api/labels';
import { route, schema } from '@/server/http/route';
import { issueLabels } from './issue.service';
import { IssueLabelsDto } from './labels.dto';
import { scanLabel } from './scan.service';

export const labelsRoutes = [
  route({
    method: 'post', path: '/labels', permission: 'label:write', summary: 'Issue new labels for a kit and its jars; earlier ones become void',
    request: IssueLabelsDto, response: schema<IssuedLabels>('IssuedLabels'), status: 201, idempotent: true,
    handle: ({ tx, actor, body, now }) => issueLabels(tx, actor, body, now),
  }),
  route({
    method: 'get', path: '/labels/:code', permission: 'signed-in', summary: 'What a scanned code is, told blind; labels of one’s own schools only',
    transaction: 'none', response: schema<ScannedLabel>('ScannedLabel'), idempotent: false,
    handle: ({ db, actor, params }) => scanLabel(db, actor.accountId, params.code),
  }),
];
