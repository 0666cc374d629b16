import type { EntityManager } from 'typeorm';
import type { CustodyEventView } from '@shared/api/loans';
import { CustodyEvent } from './custody.entity';
import { custodyText, type CustodyDetail, type CustodyKind } from './custodyKinds';

export interface NewCustodyEvent {
  schoolId: string;
  kitId: string;
  kind: CustodyKind;
  at: Date;
  /** Who did it; null for the system. */
  actorId: string | null;
  /** For whom, where that is another person or the point of the event. */
  forAccountId?: string | null;
  stoneId?: string | null;
  loanId?: string | null;
  detail?: CustodyDetail;
}

/** Writes custody events in the caller's transaction, in the order given: what happened and its trace are committed together. */
export async function recordCustody(tx: EntityManager, ...events: NewCustodyEvent[]): Promise<void> {
  if (events.length === 0) return;
  const rows = events.map((event) => ({
    schoolId: event.schoolId,
    kitId: event.kitId,
    stoneId: event.stoneId ?? null,
    loanId: event.loanId ?? null,
    kind: event.kind,
    actorId: event.actorId,
    forAccountId: event.forAccountId ?? null,
    detail: event.detail ?? {},
    at: event.at,
  }));
  await tx.createQueryBuilder().insert().into(CustodyEvent).values(rows).updateEntity(false).execute();
}

const listMax = 500;

interface CustodyRow {
  id: string;
  kind: CustodyKind;
  detail: CustodyDetail;
  at: Date;
  slot: string | null;
  loan_id: string | null;
  actor_id: string | null;
  actor_name: string | null;
  for_name: string | null;
}

/** The newest 500 events of a kit, a stone or a loan, newest first. Staff only: texts may name people. */
export async function custodyOf(tx: EntityManager, of: { kitId: string } | { stoneId: string } | { loanId: string }): Promise<CustodyEventView[]> {
  const [column, id] = 'kitId' in of ? ['kit_id', of.kitId] : 'stoneId' in of ? ['stone_id', of.stoneId] : ['loan_id', of.loanId];
  const rows = await tx.query<CustodyRow[]>(
    `SELECT e.id, e.kind, e.detail, e.at, s.slot, e.loan_id, e.actor_id, a.name AS actor_name, f.name AS for_name
       FROM custody_event e
       LEFT JOIN stone s ON s.id = e.stone_id
       LEFT JOIN account a ON a.id = e.actor_id
       LEFT JOIN account f ON f.id = e.for_account_id
      WHERE e.${column} = $1 ORDER BY e.seq DESC LIMIT ${listMax}`,
    [id],
  );
  return rows.map(toView);
}

function toView(row: CustodyRow): CustodyEventView {
  const who = row.actor_name ?? 'the system';
  return {
    id: row.id,
    kind: row.kind,
    text: custodyText({ kind: row.kind, detail: row.detail, who, for: row.for_name ?? who }),
    at: row.at.toISOString(),
    actor: row.actor_id === null ? null : { id: row.actor_id, name: row.actor_name ?? '' },
    slot: row.slot,
    loanId: row.loan_id,
  };
}
