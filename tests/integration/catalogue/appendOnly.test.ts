import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
import { catalogueOf, completeTopaz } from '../../support/catalogue';
import { createTestApp, type TestApp } from '../../support/testApp';

let test: TestApp;
let school: string;
let application: Client;

beforeAll(async () => {
  test = await createTestApp();
  school = await test.school();
  const catalogue = catalogueOf(test, await test.person(['admin'], school));
  const kit = await catalogue.kit('400');
  const stone = await catalogue.stone(kit.id, 'A');
  const { readings } = await catalogue.readings(stone.id, completeTopaz(await catalogue.instruments()));
  await catalogue.call.post(`/readings/${readings[0]?.id}/strike`, { reason: 'slip' }).expect(200);
  const accounts = await test.rows<{ id: string }>(
    `INSERT INTO ledger_account (school_id, kind, currency) VALUES ($1, 'card_holds', 'EUR'), ($1, 'holds_for_students', 'EUR') RETURNING id`, [school]);
  const transfer = randomUUID();
  await test.rows(
    `WITH t AS (INSERT INTO ledger_transfer (id, school_id, kind, key, at) VALUES ($1, $2, 'hold', 'k', now()) RETURNING id)
     INSERT INTO ledger_posting (school_id, transfer_id, account_id, amount_minor, currency)
     SELECT $2, t.id, a, n, 'EUR' FROM t, (VALUES ($3::uuid, 100), ($4::uuid, -100)) v(a, n)`, [transfer, school, accounts[0]?.id, accounts[1]?.id]);
  application = new Client({ connectionString: test.database.appUrl });
  await application.connect();
});

afterAll(async () => {
  await application.end();
  await test.close();
});

/** Runs one statement as the application inside the school, and rolls back whatever it did. */
async function attempt(sql: string): Promise<{ rowCount: number | null; code: string | undefined }> {
  await application.query('BEGIN');
  try {
    await application.query(`SELECT set_config('app.school_id', $1, true)`, [school]);
    return { rowCount: (await application.query(sql)).rowCount, code: undefined };
  } catch (error) {
    return { rowCount: null, code: (error as { code?: string }).code };
  } finally {
    await application.query('ROLLBACK');
  }
}

const tables = [
  ['reading', 'note'], ['reading_strike', 'reason'], ['custody_event', 'kind'], ['ledger_posting', 'currency'], ['ledger_transfer', 'memo'],
] as const;

describe.each(tables)('%s', (table, column) => {
  it('holds a row the application sees', async () => {
    expect((await attempt(`SELECT 1 FROM ${table}`)).rowCount).toBeGreaterThan(0);
  });

  it.each([
    ['changed', `UPDATE ${table} SET ${column} = ${column}`],
    ['deleted', `DELETE FROM ${table}`],
    ['emptied', `TRUNCATE ${table} CASCADE`],
  ])('cannot be %s by the application role', async (_how, sql) => {
    expect(await attempt(sql)).toEqual({ rowCount: null, code: '42501' });
  });

  it('is not even changed by its owner', async () => {
    await expect(test.rows(`UPDATE ${table} SET ${column} = ${column}`)).rejects.toMatchObject({ code: '42501' });
    await expect(test.rows(`DELETE FROM ${table}`)).rejects.toMatchObject({ code: '42501' });
  });
});
