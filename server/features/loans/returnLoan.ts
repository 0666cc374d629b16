import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';
import { invalid } from '@/server/http/problem';
import { queueMail } from '@/server/mail/queueMail';
import type { BackState, ReturnLoanRequest } from '@shared/api/loans';
import { neutralKit } from './lendingRules';
import { LoanStone } from './loan.entity';
import { loanFor, type LoanActor } from './loanAccess';
import { lockLoan, moveLoan } from './loanState';

type Said = { jar: LoanStone; state: BackState; condition: string };

const events = { seen: 'jar_back', missing: 'jar_said_missing', damaged: 'jar_said_damaged' } as const;

/** The kit is put in the return box, with a word on every jar: nothing is guessed. Writes custody and the receipt. */
export async function returnLoan(tx: EntityManager, loanId: string, request: ReturnLoanRequest, actor: LoanActor, now: Date): Promise<void> {
  await loanFor(tx, loanId, actor);
  const loan = await lockLoan(tx, loanId);
  await moveLoan(tx, loan, 'returned', now);
  const jars = await tx.find(LoanStone, { where: { loanId }, order: { slot: 'ASC' } });
  const said = everyJar(jars, request.stones);
  const at = { schoolId: loan.schoolId, kitId: loan.kitId, loanId, actorId: actor.accountId, at: now };
  for (const { jar, state, condition } of said) {
    await tx.update(LoanStone, { loanId, stoneId: jar.stoneId }, { backState: state, backAt: now, backCondition: condition });
  }
  await recordCustody(tx, ...said.map(({ jar, state, condition }) => ({ ...at, stoneId: jar.stoneId, kind: events[state], detail: { condition } })),
    { ...at, kind: 'kit_returned', forAccountId: loan.borrowerId });
  const slots = (state: BackState): string[] => said.filter((one) => one.state === state).map(({ jar }) => jar.slot);
  await queueMail(tx, {
    schoolId: loan.schoolId, toAccountId: loan.borrowerId, template: 'kit-returned', dedupeKey: `kit-returned:${loanId}`,
    data: { loanId, kit: await neutralKit(tx, loan.kitId), returnedAt: now.toISOString(), missingSlots: slots('missing'), damagedSlots: slots('damaged') },
  });
}

function everyJar(jars: readonly LoanStone[], stones: ReturnLoanRequest['stones']): Said[] {
  const given = new Map<string, { state: BackState; condition?: string }>();
  stones.forEach((stone, index) => {
    if (!jars.some((jar) => jar.stoneId === stone.stoneId)) throw invalid(`stones[${index}].stoneId`, 'This jar is not part of the loan. Name only its jars.');
    if (given.has(stone.stoneId)) throw invalid(`stones[${index}].stoneId`, 'This jar is named twice. Say one thing of it.');
    if (stone.state === 'damaged' && (stone.condition ?? '').trim() === '') throw invalid(`stones[${index}].condition`, 'Say in a few words what is damaged.');
    given.set(stone.stoneId, stone);
  });
  const unsaid = jars.filter((jar) => !given.has(jar.stoneId)).map((jar) => jar.slot);
  if (unsaid.length > 0) throw invalid('stones', `Scan jar ${unsaid.join(', ')} too, or say that it is missing.`);
  return jars.map((jar) => {
    const said = given.get(jar.stoneId);
    return { jar, state: said?.state ?? 'missing', condition: said?.condition?.trim() ?? '' };
  });
}
