import type { EntityManager, SelectQueryBuilder } from 'typeorm';
import type { KitPlace, LabelRef } from '@shared/api/kits';
import type { LoanState } from '@shared/api/loans';
import type { DepositRule } from '@shared/api/school';
import { parseLabelCode } from '@shared/codes';
import { Label } from '@/server/features/labels/label.entity';
import { Kit } from './kit.entity';

export interface OpenLoan {
  readonly id: string;
  readonly kitId: string;
  readonly borrowerId: string;
  readonly state: LoanState;
  readonly dueAt: Date;
}

/** The open loans of these kits by kit id; a kit has at most one. */
export async function openLoansOf(tx: EntityManager, kitIds: readonly string[]): Promise<Map<string, OpenLoan>> {
  const rows = await tx.query<OpenLoan[]>(
    `SELECT id, kit_id AS "kitId", borrower_id AS "borrowerId", state, due_at AS "dueAt"
       FROM loan WHERE kit_id = ANY ($1) AND state NOT IN ('settled', 'cancelled')`,
    [kitIds],
  );
  return new Map(rows.map((row) => [row.kitId, row]));
}

/** What the school's money rules say; deposits are worked out from them. */
export async function moneyRules(tx: EntityManager): Promise<{ currency: string; depositRule: DepositRule }> {
  const [row] = await tx.query<{ currency: string; depositRule: DepositRule }[]>(
    'SELECT currency, deposit_rule AS "depositRule" FROM school WHERE id = current_school()',
  );
  if (row === undefined) throw new Error('A unit of work without a school asked for its money rules.');
  return row;
}

/** The valid labels of a kit: its own under null, its jars' under their stone ids. */
export async function validLabelsOf(tx: EntityManager, kitId: string): Promise<Map<string | null, LabelRef>> {
  const labels = await tx.createQueryBuilder(Label, 'label').where('label.kitId = :kitId AND label.voidedAt IS NULL', { kitId }).getMany();
  return new Map(labels.map(({ stoneId, code, issuedAt }) => [stoneId, { code, issuedAt: issuedAt.toISOString() }]));
}

export interface KitSearch {
  readonly after: string | undefined;
  readonly q: string | undefined;
  readonly place: KitPlace | undefined;
  readonly accountId: string;
}

/** The next `limit` kits by number whose place may be the wanted one; the exact place needs their records. */
export function searchKits(tx: EntityManager, search: KitSearch, limit: number): Promise<Kit[]> {
  const query = tx.createQueryBuilder(Kit, 'kit').orderBy('kit.number').take(limit);
  if (search.after !== undefined) query.andWhere('kit.number > :after', { after: search.after });
  if (search.q !== undefined && search.q.trim() !== '') matchText(query, search.q.trim(), search.accountId);
  if (search.place !== undefined) matchPlace(query, search.place);
  return query.getMany();
}

/** A true title is not searched while the searcher borrows the kit or a check of it is open: they may be blind to it. */
function matchText(query: SelectQueryBuilder<Kit>, text: string, accountId: string): void {
  const like = `%${text.replace(/[\\%_]/g, '\\$&')}%`;
  const label = parseLabelCode(text);
  query.andWhere(
    `(kit.number ILIKE :like OR kit.neutralTitle ILIKE :like
      OR (kit.title ILIKE :like AND NOT EXISTS (SELECT 1 FROM loan l WHERE l.kit_id = kit.id AND l.state NOT IN ('settled', 'cancelled')
            AND (l.borrower_id = :accountId OR l.state IN ('checking', 'set_aside'))))
      OR EXISTS (SELECT 1 FROM label WHERE label.kit_id = kit.id AND label.code = :code))`,
    { like, accountId, code: 'code' in label ? label.code : '' },
  );
}

function matchPlace(query: SelectQueryBuilder<Kit>, place: KitPlace): void {
  const open = (states: string): string => `EXISTS (SELECT 1 FROM loan l WHERE l.kit_id = kit.id AND l.state ${states})`;
  const none = `NOT ${open("NOT IN ('settled', 'cancelled')")}`;
  if (place === 'retired') query.andWhere("kit.standing = 'retired'");
  else if (place === 'set_aside') query.andWhere(`kit.standing <> 'retired' AND (${open("= 'set_aside'")} OR (kit.standing = 'set_aside' AND ${none}))`);
  else if (place === 'shelf' || place === 'incomplete') query.andWhere(`kit.standing = 'lendable' AND ${none}`);
  else query.andWhere(`kit.standing <> 'retired' AND ${open('= :place')}`, { place });
}
