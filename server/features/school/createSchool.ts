import { randomUUID } from 'node:crypto';
import { isEmail } from 'class-validator';
import type { EntityManager } from 'typeorm';
import type { Database } from '@/server/database/data-source';
import { withSystem } from '@/server/database/school';
import { hashPassword, passwordFault } from '@/server/features/sessions/passwords';
import type { DepositRule } from '@shared/api/school';
import { isCurrency, isTimeZone } from './school.dto';

export interface NewSchool {
  readonly name: string;
  /** IANA name. */
  readonly timeZone: string;
  /** ISO 4217. */
  readonly currency: string;
  readonly adminEmail: string;
  readonly adminName: string;
  readonly adminPassword: string;
  readonly terms: string;
}

/**
 * Makes a school with its first terms and its first admin, all or nothing. Runs as the owner role, because the application
 * may not make schools. Throws an error in plain words for values that cannot be taken.
 */
export async function createSchool(ownerDb: Database, given: NewSchool, now: Date): Promise<{ schoolId: string; accountId: string }> {
  const email = given.adminEmail.trim().toLowerCase();
  if (!isTimeZone(given.timeZone)) throw new Error(`${given.timeZone} is not a time zone such as Europe/Dublin.`);
  if (!isCurrency(given.currency)) throw new Error(`${given.currency} is not a currency of ISO 4217 such as EUR.`);
  if (!isEmail(email)) throw new Error(`${given.adminEmail} is not an e-mail address.`);
  if (given.terms.trim() === '') throw new Error('The terms are empty: students accept them with every loan.');
  return withSystem(ownerDb, async (tx) => {
    const accountId = await adminAccount(tx, given, email);
    const schoolId = randomUUID();
    await tx.query(
      'INSERT INTO school (id, name, time_zone, currency, deposit_rule, created_at) VALUES ($1, $2, $3, $4, $5, $6)',
      [schoolId, given.name.trim(), given.timeZone, given.currency, JSON.stringify(firstDepositRule), now],
    );
    await tx.query("INSERT INTO membership (school_id, account_id, roles) VALUES ($1, $2, ARRAY['admin'])", [schoolId, accountId]);
    await tx.query('INSERT INTO terms_version (school_id, version, text, created_by, created_at) VALUES ($1, 1, $2, $3, $4)', [schoolId, given.terms.trim(), accountId, now]);
    return { schoolId, accountId };
  });
}

/** A careful beginning until the admin sets the school's own rule: 30 % of what the kit's stones would cost to replace. */
const firstDepositRule = { kind: 'share', percent: 30, minimumMinor: 0, maximumMinor: null } as const satisfies DepositRule;

/** The account with the admin's address, its password untouched, or a new one. */
async function adminAccount(tx: EntityManager, { adminName, adminPassword }: NewSchool, email: string): Promise<string> {
  const known: { id: string }[] = await tx.query('SELECT id FROM account WHERE email = $1', [email]);
  if (known[0]) return known[0].id;
  const fault = passwordFault(adminPassword, email);
  if (fault !== undefined) throw new Error(`The admin's password cannot be taken. ${fault}`);
  const id = randomUUID();
  await tx.query('INSERT INTO account (id, email, name, password_hash) VALUES ($1, $2, $3, $4)', [id, email, adminName.trim(), await hashPassword(adminPassword)]);
  return id;
}
