import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';
import { setKitAside } from '@/server/features/kits/standing';
import { resolveLabel } from '@/server/features/labels/resolve';
import { forbidden, invalid } from '@/server/http/problem';
import type { SeeJarRequest } from '@shared/api/loans';
import { checkTransition } from '@shared/lending';
import { may } from '@shared/permissions';
import { mailAdmins } from './admins';
import { cancelLoan } from './cancelLoan';
import { neutralKit } from './lendingRules';
import { Loan, LoanStone } from './loan.entity';
import { loanFor, type LoanActor } from './loanAccess';
import { cannotMove } from './loans.errors';
import { lockLoan } from './loanState';

/**
 * Notes one jar at take-out: seen, with its condition, or absent. Seen twice is seen once. An absent jar stops the loan:
 * it is cancelled, the kit is set aside and the admins are told.
 */
export async function seeJar(tx: EntityManager, loanId: string, request: SeeJarRequest, actor: LoanActor, now: Date): Promise<void> {
  await loanFor(tx, loanId, actor);
  const loan = await lockLoan(tx, loanId);
  const transition = checkTransition(loan.state, 'out');
  if (!transition.ok) throw cannotMove(transition);
  const jar = await jarOf(tx, loan, request, actor);
  if (request.absent === true) return absent(tx, loan, jar, actor, now);
  const condition = request.condition?.trim() ?? jar.outCondition;
  await tx.update(LoanStone, { loanId, stoneId: jar.stoneId }, { outSeenAt: jar.outSeenAt ?? now, outCondition: condition });
  if (jar.outSeenAt !== null && condition === jar.outCondition) return;
  await recordCustody(tx, {
    schoolId: loan.schoolId, kitId: loan.kitId, stoneId: jar.stoneId, loanId, kind: 'jar_seen_out', actorId: actor.accountId, at: now, detail: { condition },
  });
}

async function jarOf(tx: EntityManager, loan: Loan, request: SeeJarRequest, actor: LoanActor): Promise<LoanStone> {
  if ((request.code === undefined) === (request.stoneId === undefined)) throw invalid('code', 'Scan or type the code of one jar.');
  if (request.stoneId !== undefined) {
    const jar = await tx.findOneBy(LoanStone, { loanId: loan.id, stoneId: request.stoneId });
    if (jar === null) throw invalid('stoneId', 'This jar is not part of the loan. Pick one of its jars.');
    // A jar that is not there has no label to scan, so anybody may say so; that one is there takes its label, or staff.
    if (request.absent !== true && !may(actor.roles, 'loan:staff')) throw forbidden('Scan the label of the jar or type its code. Staff can tick a jar without its label.', 'scan_the_jar');
    return jar;
  }
  return scannedJar(tx, loan, request.code ?? '');
}

async function scannedJar(tx: EntityManager, loan: Loan, code: string): Promise<LoanStone> {
  const label = await resolveLabel(tx, code, 'code');
  const { kitNumber } = await neutralKit(tx, loan.kitId);
  if (label.kitId !== loan.kitId) {
    const what = label.stoneId === null ? 'This label belongs to' : 'This jar belongs to';
    throw invalid('code', `${what} kit ${label.kitNumber}. Put it back there and scan a jar of kit ${kitNumber}.`, 'other_kit');
  }
  if (label.stoneId === null) throw invalid('code', `This is the label of kit ${kitNumber} itself. Scan one of its jars.`, 'kit_label');
  const jar = await tx.findOneBy(LoanStone, { loanId: loan.id, stoneId: label.stoneId });
  if (jar === null) throw invalid('code', `Jar ${label.slot ?? ''} is not lent with kit ${kitNumber} at present. Hand it in at the desk.`, 'jar_not_lent');
  return jar;
}

async function absent(tx: EntityManager, loan: Loan, jar: LoanStone, actor: LoanActor, now: Date): Promise<void> {
  const at = { schoolId: loan.schoolId, kitId: loan.kitId, loanId: loan.id };
  await recordCustody(tx, { ...at, stoneId: jar.stoneId, kind: 'jar_absent', actorId: actor.accountId, at: now });
  await cancelLoan(tx, loan, { reason: 'jar_absent', actorId: actor.accountId, now, absentSlots: [jar.slot] });
  await mailAdmins(tx, loan, { template: 'jar-absent', slots: [jar.slot] });
  await setKitAside(tx, { ...at, reason: `Jar ${jar.slot} was not there at take-out`, actorId: actor.accountId, now });
}
