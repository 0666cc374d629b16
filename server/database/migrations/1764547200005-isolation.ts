import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Tables that hold a school's rows: one policy each, on the school of the unit of work. */
const schoolTables = [
  'terms_version', 'invitation', 'kit', 'stone', 'photo', 'instrument', 'reading', 'reading_strike', 'label',
  'loan', 'loan_stone', 'bench_submission', 'verdict', 'stone_acceptance', 'settlement', 'settlement_item', 'objection',
  'custody_event', 'payment', 'payment_step', 'ledger_account', 'ledger_transfer', 'ledger_posting',
];

const appendOnlyTables = [
  'terms_version', 'reading', 'reading_strike', 'bench_submission', 'verdict', 'stone_acceptance', 'custody_event',
  'ledger_account', 'ledger_transfer', 'ledger_posting', 'sign_in_attempt',
];

const changeableTables = [
  'account', 'membership', 'invitation', 'refresh_token', 'password_reset', 'idempotency', 'kit', 'stone', 'photo', 'instrument', 'label',
  'loan', 'loan_stone', 'settlement', 'settlement_item', 'objection', 'payment', 'payment_step', 'webhook_event', 'mail',
];

/** Row-level security by school and the grants of the four roles (owner, application, queue, read-only). */
export class Isolation1764547200005 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    for (const table of schoolTables) {
      await runner.query(`ALTER TABLE ${table} ENABLE ROW LEVEL SECURITY`);
      await runner.query(`CREATE POLICY ${table}_of_school ON ${table} TO trayward_app, trayward_readonly
        USING (school_id = current_school()) WITH CHECK (school_id = current_school())`);
    }
    await runner.query(`
      ALTER TABLE account ENABLE ROW LEVEL SECURITY;
      CREATE POLICY account_seen ON account FOR SELECT TO trayward_app USING (
        id = current_account() OR EXISTS (SELECT 1 FROM membership m WHERE m.account_id = account.id AND m.school_id = current_school()));
      CREATE POLICY account_made ON account FOR INSERT TO trayward_app WITH CHECK (id = current_account());
      CREATE POLICY account_changed ON account FOR UPDATE TO trayward_app USING (id = current_account()) WITH CHECK (id = current_account());

      ALTER TABLE membership ENABLE ROW LEVEL SECURITY;
      CREATE POLICY membership_seen ON membership FOR SELECT TO trayward_app USING (school_id = current_school() OR account_id = current_account());
      CREATE POLICY membership_made ON membership FOR INSERT TO trayward_app WITH CHECK (school_id = current_school());
      CREATE POLICY membership_changed ON membership FOR UPDATE TO trayward_app USING (school_id = current_school()) WITH CHECK (school_id = current_school());
      CREATE POLICY membership_reported ON membership FOR SELECT TO trayward_readonly USING (school_id = current_school());

      ALTER TABLE school ENABLE ROW LEVEL SECURITY;
      CREATE POLICY school_seen ON school FOR SELECT TO trayward_app USING (
        id = current_school() OR EXISTS (SELECT 1 FROM membership m WHERE m.school_id = school.id AND m.account_id = current_account()));
      CREATE POLICY school_changed ON school FOR UPDATE TO trayward_app USING (id = current_school()) WITH CHECK (id = current_school());
      CREATE POLICY school_reported ON school FOR SELECT TO trayward_readonly USING (id = current_school());

      ALTER TABLE mail ENABLE ROW LEVEL SECURITY;
      CREATE POLICY mail_of_school_or_person ON mail TO trayward_app
        USING (school_id = current_school() OR (school_id IS NULL AND to_account_id = current_account()))
        WITH CHECK (school_id = current_school() OR (school_id IS NULL AND to_account_id = current_account()));
    `);
    for (const table of ['refresh_token', 'password_reset', 'idempotency']) {
      await runner.query(`ALTER TABLE ${table} ENABLE ROW LEVEL SECURITY`);
      await runner.query(`CREATE POLICY ${table}_of_account ON ${table} TO trayward_app
        USING (account_id = current_account()) WITH CHECK (account_id = current_account())`);
    }
    await this.grant(runner);
  }

  private async grant(runner: QueryRunner): Promise<void> {
    await runner.query(`
      REVOKE ALL ON SCHEMA public FROM PUBLIC;
      GRANT USAGE ON SCHEMA public TO trayward_app, trayward_readonly;
      REVOKE EXECUTE ON ALL FUNCTIONS IN SCHEMA public FROM PUBLIC;
      GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA public TO trayward_app;
      GRANT EXECUTE ON FUNCTION current_school(), current_account() TO trayward_readonly;
      GRANT SELECT, UPDATE ON school TO trayward_app;
      GRANT DELETE ON idempotency, sign_in_attempt TO trayward_app;
      GRANT DELETE ON settlement_item TO trayward_app;
    `);
    for (const table of appendOnlyTables) await runner.query(`GRANT SELECT, INSERT ON ${table} TO trayward_app`);
    for (const table of changeableTables) await runner.query(`GRANT SELECT, INSERT, UPDATE ON ${table} TO trayward_app`);
    for (const table of [...schoolTables, 'membership', 'school']) await runner.query(`GRANT SELECT ON ${table} TO trayward_readonly`);
  }

  async down(): Promise<void> {
    throw new Error('The isolation migration has no way back: restore a backup instead.');
  }
}
