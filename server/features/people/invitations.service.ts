import type { EntityManager } from 'typeorm';
import { notFound, refused } from '@/server/http/problem';
import { cursorValues, pageOf, rowsToAsk, type PageQuery } from '@/server/http/paging';
import type { SchoolActor } from '@/server/http/route';
import { queueMail } from '@/server/mail/queueMail';
import { newSecretToken } from '@/server/features/sessions/secretTokens';
import type { Page } from '@shared/api/common';
import type { InvitationView } from '@shared/api/people';
import { isRole } from '@shared/permissions';
import type { InviteBody } from './people.dto';
import { readPerson } from './people.service';

export const invitationLifetimeMs = 14 * 24 * 60 * 60_000;

interface InvitationRow {
  id: string;
  email: string;
  name: string;
  roles: string[];
  created_at: Date;
  expires_at: Date;
}

const columns = 'id, email, name, roles, created_at, expires_at';
const stillOpen = 'accepted_at IS NULL AND withdrawn_at IS NULL';

/** Mails a link with which somebody joins the school. A newer invitation to the same address replaces the one before. */
export async function invite(tx: EntityManager, { schoolId, accountId }: SchoolActor, body: InviteBody, now: Date): Promise<InvitationView> {
  await refuseMember(tx, schoolId, body.email);
  await tx.query(`UPDATE invitation SET withdrawn_at = $3 WHERE school_id = $1 AND email = $2 AND ${stillOpen}`, [schoolId, body.email, now]);
  const { token, hash } = newSecretToken();
  const expiresAt = new Date(now.getTime() + invitationLifetimeMs);
  const rows: InvitationRow[] = await tx.query(
    `INSERT INTO invitation (school_id, email, name, roles, token_hash, invited_by, created_at, expires_at)
     VALUES ($1, $2, $3, $4, $5, $6, $7, $8) RETURNING ${columns}`,
    [schoolId, body.email, body.name ?? '', body.roles, hash, accountId, now, expiresAt],
  );
  const [row] = rows;
  if (!row) throw new Error('The database made no invitation.');
  const inviter = await readPerson(tx, schoolId, accountId);
  await queueMail(tx, {
    schoolId, toEmail: body.email, template: 'invitation', dedupeKey: `invitation:${row.id}`,
    data: { token, expiresAt: expiresAt.toISOString(), roles: body.roles, inviterName: inviter.name, ...(body.name ? { inviteeName: body.name } : {}) },
  });
  return toInvitationView(row);
}

/** Those that can still be accepted, newest first. */
export async function listInvitations(tx: EntityManager, { schoolId }: SchoolActor, query: PageQuery, now: Date): Promise<Page<InvitationView>> {
  const [before, beforeId] = cursorValues(query, 2) ?? [null, null];
  const rows: InvitationRow[] = await tx.query(
    `SELECT ${columns} FROM invitation
      WHERE school_id = $1 AND ${stillOpen} AND expires_at > $2
        AND ($3::timestamptz IS NULL OR (created_at, id::text) < ($3::timestamptz, $4::text))
      ORDER BY created_at DESC, id::text DESC LIMIT $5`,
    [schoolId, now, before, beforeId, rowsToAsk(query)],
  );
  return pageOf(query, rows, (row) => [row.created_at.toISOString(), row.id], toInvitationView);
}

/** The link in the mail stops working. */
export async function withdraw(tx: EntityManager, { schoolId }: SchoolActor, invitationId: string, now: Date): Promise<void> {
  const [, count]: [unknown, number] = await tx.query(
    `UPDATE invitation SET withdrawn_at = $3 WHERE school_id = $1 AND id = $2 AND ${stillOpen}`,
    [schoolId, invitationId, now],
  );
  if (count === 0) throw notFound('There is no open invitation like that. Reload the list.');
}

async function refuseMember(tx: EntityManager, schoolId: string, email: string): Promise<void> {
  const members: unknown[] = await tx.query(
    `SELECT 1 FROM membership m JOIN account a ON a.id = m.account_id WHERE m.school_id = $1 AND a.email = $2 AND m.ended_at IS NULL`,
    [schoolId, email],
  );
  if (members.length > 0) throw refused('already_member', 'That person belongs to the school already. Change their roles in the list.');
}

function toInvitationView({ id, email, name, roles, created_at, expires_at }: InvitationRow): InvitationView {
  return { id, email, name, roles: roles.filter(isRole), createdAt: created_at.toISOString(), expiresAt: expires_at.toISOString() };
}
