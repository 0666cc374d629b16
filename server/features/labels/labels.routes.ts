import type { IssuedLabels, ScannedLabel } from '@shared/api/labels';
import { file } from '@/server/http/reply';
import { fileOf, route, schema } from '@/server/http/route';
import { issueLabels } from './issue.service';
import { IssueLabelsDto, LabelSheetDto } from './labels.dto';
import { scanLabel } from './scan.service';
import { labelSheet } from './sheet.service';

export const labelsRoutes = [
  route({
    method: 'post', path: '/labels', permission: 'label:write', summary: 'Issue new labels for a kit and its jars; earlier ones become void',
    request: IssueLabelsDto, response: schema<IssuedLabels>('IssuedLabels'), status: 201, idempotent: true,
    handle: ({ tx, actor, body, now }) => issueLabels(tx, actor, body, now),
  }),
  route({
    method: 'post', path: '/labels/sheet', permission: 'label:read', summary: 'The valid labels of kits as a printable sheet',
    transaction: 'none', request: LabelSheetDto, response: fileOf('application/pdf'), idempotent: false,
    handle: async ({ db, services, actor, body }) =>
      file(await labelSheet(db, actor, body, services.config.publicUrl), { type: 'application/pdf', downloadName: 'labels.pdf' }),
  }),
  route({
    method: 'get', path: '/labels/:code', permission: 'signed-in', summary: 'What a scanned code is, told blind; labels of one’s own schools only',
    transaction: 'none', response: schema<ScannedLabel>('ScannedLabel'), idempotent: false,
    handle: ({ db, actor, params }) => scanLabel(db, actor.accountId, params.code),
  }),
];
