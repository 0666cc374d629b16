import type { EntityManager } from 'typeorm';
import { forbidden, notFound, refused } from '@/server/http/problem';
import { benchLoan, benchStones, type BenchLoan, type BenchStoneRow } from './bench.queries';

const atTheBench = ['returned', 'checking', 'set_aside'];

/** The loan of a bench check, for anybody but its borrower. */
export async function benchLoanFor(tx: EntityManager, loanId: string, accountId: string): Promise<BenchLoan> {
  const loan = await benchLoan(tx, loanId);
  if (loan === null) throw notFound('There is no such loan in this school. Go back to the bench and pick one from the list.');
  if (loan.borrowerId === accountId) {
    throw forbidden('You borrowed this kit, so a colleague checks it. Ask somebody else at the bench.', 'own_loan');
  }
  return loan;
}

/** The same, where the check is going on: begun with a scan and not yet settled. */
export async function openCheckFor(tx: EntityManager, loanId: string, accountId: string): Promise<BenchLoan> {
  const loan = await benchLoanFor(tx, loanId, accountId);
  if (loan.state === 'returned') throw refused('check_not_begun', `Begin the check of kit ${loan.kitNumber} by scanning its label.`);
  if (!atTheBench.includes(loan.state)) {
    throw refused('not_at_bench', `Kit ${loan.kitNumber} is not at the bench: its loan is ${loan.state.replace('_', ' ')}. Go back to the bench's list.`);
  }
  return loan;
}

/** One stone of an open check that has not reached its end. */
export async function openStone(tx: EntityManager, loan: BenchLoan, stoneId: string): Promise<BenchStoneRow> {
  const stone = (await benchStones(tx, loan.id)).find((row) => row.stoneId === stoneId);
  if (stone === undefined) throw notFound(`That stone is not part of this loan of kit ${loan.kitNumber}. Scan one of its jars.`);
  if (stone.ending !== null) {
    throw refused('stone_ended', `Jar ${stone.slot} is settled already as ${stone.ending.replace('_', ' ')}. Go on with the next jar.`);
  }
  return stone;
}
