import type { EntityManager } from 'typeorm';
import type { ScannedLabel } from '@shared/api/labels';
import { parseLabelCode } from '@shared/codes';
import { isRole, may, type Role } from '@shared/permissions';
import type { Database } from '@/server/database/data-source';
import { withAccount, withSchool, withSystem, type SchoolActor } from '@/server/database/school';
import { Kit } from '@/server/features/kits/kit.entity';
import { openLoansOf } from '@/server/features/kits/kits.queries';
import { lendability } from '@/server/features/kits/lendability';
import { findStone } from '@/server/features/stones/stones.queries';
import { invalid, notFound } from '@/server/http/problem';
import { faultWords, findLabel, type FoundLabel } from './resolve';

/**
 * What a scanned code is, told blind: nothing that a student may not know. The label may be of any school the account
 * belongs to; of every other school's label the answer is that of a code nobody printed.
 */
export async function scanLabel(db: Database, accountId: string, text: string): Promise<ScannedLabel> {
  const reading = parseLabelCode(text);
  if ('reason' in reading) throw invalid('code', faultWords[reading.reason], `label_${reading.reason}`);
  const { code } = reading;
  const [found] = await withSystem(db, (tx) => tx.query<{ school_id: string }[]>('SELECT school_id FROM find_label($1)', [code]));
  if (found === undefined) throw noSuchLabel();
  const roles = await rolesIn(db, accountId, found.school_id);
  if (!may(roles, 'label:resolve')) throw noSuchLabel();
  const actor = { accountId, schoolId: found.school_id };
  return withSchool(db, actor, async (tx) => {
    const label = await findLabel(tx, code);
    if (label === null) throw noSuchLabel();
    return describe(tx, actor, label, may(roles, 'loan:read'));
  });
}

function rolesIn(db: Database, accountId: string, schoolId: string): Promise<Role[]> {
  return withAccount(db, accountId, async (tx) => {
    const [row] = await tx.query<{ roles: string[] }[]>(
      'SELECT roles FROM membership WHERE account_id = $1 AND school_id = $2 AND ended_at IS NULL', [accountId, schoolId]);
    return (row?.roles ?? []).filter(isRole);
  });
}

async function describe(tx: EntityManager, actor: SchoolActor, label: FoundLabel, staff: boolean): Promise<ScannedLabel> {
  const { kitId, kitNumber, stoneId, slot, voidedAt } = label;
  if (voidedAt !== null) return { kind: 'void', valid: false, kitNumber, slot, voidedAt: voidedAt.toISOString() };
  const loan = (await openLoansOf(tx, [kitId])).get(kitId);
  const mine = loan?.borrowerId === actor.accountId;
  // Another student's loan is not this one's business, not even by its id.
  const openLoanId = mine || staff ? (loan?.id ?? null) : null;
  if (stoneId !== null) {
    const { neutralDescription } = await findStone(tx, stoneId);
    return { kind: 'jar', valid: true, kitId, kitNumber, stoneId, slot: slot ?? '', neutralDescription, openLoanId, mine };
  }
  const { neutralTitle } = await tx.findOneByOrFail(Kit, { id: kitId });
  const lendable = loan === undefined && (await lendability(tx, kitId)).lendable;
  return { kind: 'kit', valid: true, kitId, kitNumber, neutralTitle, openLoanId, mine, lendable };
}

const noSuchLabel = (): Error => notFound('No label of your schools has that code. Check the characters, or scan again.', 'label_unknown');
