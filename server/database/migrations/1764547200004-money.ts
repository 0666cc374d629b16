import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Payments with the steps taken at the payment service, the webhook inbox, the double-entry ledger and the mail outbox. */
export class Money1764547200004 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE payment (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        loan_id uuid NOT NULL,
        mode text NOT NULL CHECK (mode IN ('hold', 'charge')),
        state text NOT NULL CHECK (state IN ('opening', 'open', 'held', 'charged', 'released', 'kept', 'part_kept', 'refunded', 'cancelled')),
        amount_minor bigint NOT NULL CHECK (amount_minor > 0),
        currency char(3) NOT NULL,
        session_id text UNIQUE,
        session_url text,
        session_expires_at timestamptz,
        payment_intent_id text UNIQUE,
        charge_id text,
        capture_before timestamptz,
        secured_at timestamptz,
        created_at timestamptz NOT NULL,
        version integer NOT NULL DEFAULT 1,
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id),
        UNIQUE (school_id, id)
      );
      CREATE UNIQUE INDEX payment_live_loan_key ON payment (loan_id) WHERE state <> 'cancelled';
      CREATE INDEX payment_state_idx ON payment (school_id, state, capture_before);

      -- Each step at the payment service: written before the call with its key, completed after it; a job finishes what was cut off.
      CREATE TABLE payment_step (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        payment_id uuid NOT NULL,
        kind text NOT NULL CHECK (kind IN ('open', 'expire', 'secure', 'keep', 'release', 'refund')),
        key text NOT NULL UNIQUE CHECK (length(key) BETWEEN 1 AND 255),
        amount_minor bigint NOT NULL CHECK (amount_minor >= 0),
        state text NOT NULL DEFAULT 'intended' CHECK (state IN ('intended', 'done', 'refused')),
        attempts integer NOT NULL DEFAULT 0,
        last_error text CHECK (length(last_error) <= 500),
        created_at timestamptz NOT NULL,
        done_at timestamptz,
        FOREIGN KEY (school_id, payment_id) REFERENCES payment (school_id, id)
      );
      CREATE INDEX payment_step_open_idx ON payment_step (school_id, created_at) WHERE state = 'intended';
      CREATE INDEX payment_step_payment_idx ON payment_step (school_id, payment_id, created_at);

      CREATE FUNCTION find_payment(wanted_object text) RETURNS TABLE (id uuid, school_id uuid) LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
        AS $$ SELECT p.id, p.school_id FROM payment p WHERE p.session_id = wanted_object OR p.payment_intent_id = wanted_object OR p.charge_id = wanted_object LIMIT 1 $$;

      -- Directory table: an event is known before its school is.
      CREATE TABLE webhook_event (
        id text PRIMARY KEY CHECK (length(id) BETWEEN 1 AND 255),
        type text NOT NULL CHECK (length(type) <= 120),
        object_kind text NOT NULL CHECK (length(object_kind) <= 80),
        object_id text NOT NULL CHECK (length(object_id) <= 255),
        event_at timestamptz NOT NULL,
        received_at timestamptz NOT NULL,
        done_at timestamptz,
        outcome text CHECK (length(outcome) <= 200)
      );

      CREATE TABLE ledger_account (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL REFERENCES school (id),
        kind text NOT NULL CHECK (kind IN ('card_holds', 'holds_for_students', 'payment_service', 'deposits_of_students', 'kept_deposits')),
        currency char(3) NOT NULL,
        UNIQUE (school_id, kind, currency),
        UNIQUE (school_id, id)
      );

      -- Append-only from here: a mistake is corrected by another transfer.
      CREATE TABLE ledger_transfer (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        seq bigint GENERATED ALWAYS AS IDENTITY,
        school_id uuid NOT NULL,
        loan_id uuid,
        payment_id uuid,
        kind text NOT NULL CHECK (length(kind) BETWEEN 3 AND 60),
        key text NOT NULL CHECK (length(key) BETWEEN 1 AND 255),
        reverses_transfer_id uuid UNIQUE,
        memo text NOT NULL DEFAULT '' CHECK (length(memo) <= 300),
        at timestamptz NOT NULL,
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id),
        FOREIGN KEY (school_id, payment_id) REFERENCES payment (school_id, id),
        UNIQUE (school_id, id),
        UNIQUE (school_id, key),
        FOREIGN KEY (school_id, reverses_transfer_id) REFERENCES ledger_transfer (school_id, id)
      );
      CREATE INDEX ledger_transfer_loan_idx ON ledger_transfer (school_id, loan_id, seq);

      CREATE TABLE ledger_posting (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        transfer_id uuid NOT NULL,
        account_id uuid NOT NULL,
        amount_minor bigint NOT NULL CHECK (amount_minor <> 0),
        currency char(3) NOT NULL,
        FOREIGN KEY (school_id, transfer_id) REFERENCES ledger_transfer (school_id, id),
        FOREIGN KEY (school_id, account_id) REFERENCES ledger_account (school_id, id)
      );
      CREATE INDEX ledger_posting_transfer_idx ON ledger_posting (transfer_id);
      CREATE INDEX ledger_posting_account_idx ON ledger_posting (school_id, account_id);

      CREATE FUNCTION check_transfer_balance() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public AS $$
      DECLARE
        transfer uuid;
      BEGIN
        -- Two statements, because one expression would need both columns of whichever row this is.
        IF TG_TABLE_NAME = 'ledger_transfer' THEN transfer := NEW.id; ELSE transfer := NEW.transfer_id; END IF;
        IF (SELECT count(*) < 2 FROM ledger_posting WHERE transfer_id = transfer) THEN
          RAISE EXCEPTION 'ledger transfer % has fewer than two postings', transfer USING ERRCODE = 'check_violation';
        END IF;
        IF EXISTS (SELECT 1 FROM ledger_posting WHERE transfer_id = transfer GROUP BY currency HAVING sum(amount_minor) <> 0) THEN
          RAISE EXCEPTION 'ledger transfer % does not sum to zero', transfer USING ERRCODE = 'check_violation';
        END IF;
        IF EXISTS (SELECT 1 FROM ledger_posting p JOIN ledger_account a ON a.id = p.account_id WHERE p.transfer_id = transfer AND a.currency <> p.currency) THEN
          RAISE EXCEPTION 'ledger transfer % posts to an account of another currency', transfer USING ERRCODE = 'check_violation';
        END IF;
        RETURN NULL;
      END $$;
      CREATE FUNCTION forbid_change() RETURNS trigger LANGUAGE plpgsql AS $$
        BEGIN RAISE EXCEPTION '% is append-only', TG_TABLE_NAME USING ERRCODE = 'insufficient_privilege'; END $$;
      CREATE CONSTRAINT TRIGGER ledger_transfer_balance AFTER INSERT ON ledger_transfer
        DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION check_transfer_balance();
      CREATE CONSTRAINT TRIGGER ledger_posting_balance AFTER INSERT ON ledger_posting
        DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION check_transfer_balance();

      CREATE TABLE mail (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid REFERENCES school (id),
        to_account_id uuid REFERENCES account (id),
        to_email text CHECK (length(to_email) BETWEEN 3 AND 254),
        template text NOT NULL,
        data jsonb NOT NULL,
        dedupe_key text NOT NULL UNIQUE CHECK (length(dedupe_key) BETWEEN 1 AND 255),
        state text NOT NULL DEFAULT 'queued' CHECK (state IN ('queued', 'sent', 'failed')),
        created_at timestamptz NOT NULL DEFAULT now(),
        sent_at timestamptz,
        failure text CHECK (length(failure) <= 300),
        CHECK (num_nonnulls(to_account_id, to_email) = 1)
      );
      CREATE INDEX mail_queued_idx ON mail (created_at) WHERE state = 'queued';
    `);
    await appendOnly(runner);
  }

  async down(): Promise<void> {
    throw new Error('The money migration has no way back: restore a backup instead.');
  }
}

/** Triggers as a second fence behind the missing grants: not even the owner changes these rows by mistake. */
async function appendOnly(runner: QueryRunner): Promise<void> {
  const tables = ['reading', 'reading_strike', 'bench_submission', 'verdict', 'stone_acceptance', 'custody_event', 'ledger_transfer', 'ledger_posting'];
  for (const table of tables) {
    await runner.query(`CREATE TRIGGER ${table}_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON ${table}
      FOR EACH STATEMENT EXECUTE FUNCTION forbid_change()`);
  }
}
