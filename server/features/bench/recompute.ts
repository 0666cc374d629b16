import { isDeepStrictEqual } from 'node:util';
import type { EntityManager } from 'typeorm';
import type { RecomputedVerdict } from '@shared/api/bench';
import { computeVerdict } from '@shared/evidence';
import { notFound } from '@/server/http/problem';
import { benchLoanFor } from './access';
import { Verdict } from './verdict.entity';

/** Computes a stored verdict again from the request and settings stored with it; `equal` compares every digit. */
export async function recomputeVerdict(tx: EntityManager, verdictId: string, accountId: string): Promise<RecomputedVerdict> {
  const verdict = await tx.findOneBy(Verdict, { id: verdictId });
  if (verdict === null) throw notFound('There is no such verdict in this school. Open the stone at the bench and pick one of its verdicts.');
  await benchLoanFor(tx, verdict.loanId, accountId);
  const again = computeVerdict(verdict.request, verdict.settings);
  // Through JSON, as the stored one went: an absent field and an undefined one are the same there.
  const plain = JSON.parse(JSON.stringify(again)) as typeof again;
  return { stored: verdict.result, again, equal: isDeepStrictEqual(plain, verdict.result) };
}
