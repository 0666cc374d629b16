import { randomUUID } from 'node:crypto';
import { Client } from 'pg';

export interface MailSchool {
  readonly schoolId: string;
  readonly studentId: string;
  readonly studentEmail: string;
}

/** A school with one student, put in behind row-level security: what mail and jobs need and no more. */
export async function makeMailSchool(superuserUrl: string, name = 'Portellery School'): Promise<MailSchool> {
  const [schoolId, studentId] = [randomUUID(), randomUUID()];
  const studentEmail = `student-${studentId.slice(0, 8)}@portellery.example`;
  await inDatabase(superuserUrl, async (client) => {
    await client.query(
      `INSERT INTO school (id, name, time_zone, currency, deposit_rule) VALUES ($1, $2, 'Europe/Dublin', 'EUR', '{"kind":"fixed","amountMinor":6000}')`,
      [schoolId, name]);
    await client.query(`INSERT INTO account (id, email, name, password_hash) VALUES ($1, $2, 'Ida Marl', 'x')`, [studentId, studentEmail]);
    await client.query(`INSERT INTO membership (school_id, account_id, roles) VALUES ($1, $2, '{student}')`, [schoolId, studentId]);
  });
  return { schoolId, studentId, studentEmail };
}

export async function inDatabase<T>(url: string, work: (client: Client) => Promise<T>): Promise<T> {
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/** Waits until `check` is true, asking every 25 ms; fails after `timeoutMs` saying what it waited for. */
export async function until(what: string, check: () => boolean | Promise<boolean>, timeoutMs = 15_000): Promise<void> {
  const end = Date.now() + timeoutMs;
  while (!(await check())) {
    if (Date.now() > end) throw new Error(`waited ${timeoutMs} ms in vain: ${what}`);
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
}
