import type { EntityManager } from 'typeorm';
import { invalid, notFound, refused } from '@/server/http/problem';
import type { SchoolActor } from '@/server/http/route';
import type { DepositRule, SchoolView, TermsVersionView, TermsView } from '@shared/api/school';
import type { DepositRuleBody, SchoolChangeBody } from './school.dto';
import { School } from './school.entity';
import { TermsVersion } from './termsVersion.entity';

/** Every version stays readable; a school rewrites its terms a few times in its life, not hundreds. */
const versionsShown = 200;

export async function readSchool(tx: EntityManager, schoolId: string): Promise<SchoolView> {
  const school = await tx.findOneBy(School, { id: schoolId });
  if (!school) throw notFound();
  const { createdAt: _, ...view } = school;
  return view;
}

/** Changes what is sent and leaves the rest. */
export async function changeSchool(tx: EntityManager, { schoolId }: SchoolActor, body: SchoolChangeBody): Promise<SchoolView> {
  const { depositRule, ...rest } = body;
  const sent = Object.fromEntries(Object.entries<unknown>(rest).filter(([, value]) => value !== undefined));
  const change = { ...sent, ...(depositRule ? { depositRule: toDepositRule(depositRule) } : {}) };
  if (body.currency !== undefined) await refuseNewCurrency(tx, schoolId, body.currency);
  if (Object.keys(change).length > 0) await tx.update(School, { id: schoolId }, change);
  return readSchool(tx, schoolId);
}

/** Only the fields of the rule's own kind are kept. */
export function toDepositRule(body: DepositRuleBody): DepositRule {
  if (body.kind === 'fixed') return { kind: 'fixed', amountMinor: body.amountMinor };
  const { percent, minimumMinor } = body;
  const maximumMinor = body.maximumMinor ?? null;
  if (maximumMinor !== null && maximumMinor < minimumMinor) {
    throw invalid('depositRule.maximumMinor', `Must not be below the minimum, ${minimumMinor}.`);
  }
  return { kind: 'share', percent, minimumMinor, maximumMinor };
}

/** Replacement values are amounts of the school's currency without saying so: in another they would mean something else. */
async function refuseNewCurrency(tx: EntityManager, schoolId: string, currency: string): Promise<void> {
  const { currency: present } = await readSchool(tx, schoolId);
  if (present === currency) return;
  const stones: unknown[] = await tx.query('SELECT 1 FROM stone WHERE school_id = $1 LIMIT 1', [schoolId]);
  if (stones.length > 0) {
    throw refused('currency_in_use', `Stones are valued in ${present} already. Keep ${present}, or set the currency before adding the first stone.`);
  }
}

/** All versions, newest first. Throws 404 while a school has none, which the command that makes schools prevents. */
export async function readTerms(tx: EntityManager, schoolId: string): Promise<TermsView> {
  const rows = await tx.find(TermsVersion, { where: { schoolId }, order: { version: 'DESC' }, take: versionsShown });
  const versions = rows.map(toTermsVersionView);
  const [current] = versions;
  if (!current) throw notFound('This school has no terms yet. An admin can write them in the settings.', 'no_terms');
  return { current, versions };
}

/** Adds a version, which counts for loans from now on; earlier loans keep theirs. The same text again is refused. */
export async function addTerms(tx: EntityManager, { schoolId, accountId }: SchoolActor, text: string, now: Date): Promise<TermsVersionView> {
  // Two admins who save at once wait for each other here, so that versions stay a plain count.
  await tx.findOne(School, { select: { id: true }, where: { id: schoolId }, lock: { mode: 'pessimistic_write' } });
  const last = await tx.findOne(TermsVersion, { where: { schoolId }, order: { version: 'DESC' } });
  if (last?.text === text) throw refused('same_terms', 'These are the present terms, word for word. Change the text, or leave it as it is.');
  const added = tx.create(TermsVersion, { schoolId, version: (last?.version ?? 0) + 1, text, createdBy: accountId, createdAt: now });
  return toTermsVersionView(await tx.save(added));
}

function toTermsVersionView({ id, version, text, createdAt }: TermsVersion): TermsVersionView {
  return { id, version, text, createdAt: createdAt.toISOString() };
}
