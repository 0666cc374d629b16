import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Loans, their stones, custody events (append-only), bench submissions, verdicts, settlements. */
export class Lending1764547200003 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE loan (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        kit_id uuid NOT NULL,
        borrower_id uuid NOT NULL REFERENCES account (id),
        state text NOT NULL CHECK (state IN ('reserved', 'out', 'returned', 'checking', 'set_aside', 'settled', 'cancelled')),
        cancel_reason text CHECK (cancel_reason IN ('by_student', 'by_staff', 'abandoned', 'jar_absent')),
        reserved_at timestamptz NOT NULL,
        reserved_until timestamptz NOT NULL,
        out_at timestamptz,
        due_at timestamptz NOT NULL,
        returned_at timestamptz,
        settled_at timestamptz,
        cancelled_at timestamptz,
        terms_version_id uuid,
        terms_accepted_at timestamptz,
        deposit_minor bigint NOT NULL CHECK (deposit_minor >= 0),
        currency char(3) NOT NULL,
        bench_opened_at timestamptz,
        version integer NOT NULL DEFAULT 1,
        FOREIGN KEY (school_id, kit_id) REFERENCES kit (school_id, id),
        FOREIGN KEY (school_id, terms_version_id) REFERENCES terms_version (school_id, id),
        UNIQUE (school_id, id),
        CHECK ((state = 'cancelled') = (cancelled_at IS NOT NULL)),
        CHECK (state NOT IN ('out', 'returned', 'checking', 'set_aside', 'settled') OR out_at IS NOT NULL)
      );
      -- The rule that lets exactly one of many have the kit.
      CREATE UNIQUE INDEX loan_open_kit_key ON loan (kit_id) WHERE state NOT IN ('settled', 'cancelled');
      CREATE INDEX loan_borrower_idx ON loan (school_id, borrower_id, reserved_at);
      CREATE INDEX loan_state_idx ON loan (school_id, state, due_at);

      CREATE TABLE loan_stone (
        school_id uuid NOT NULL,
        loan_id uuid NOT NULL,
        stone_id uuid NOT NULL,
        slot text NOT NULL,
        out_seen_at timestamptz,
        out_condition text NOT NULL DEFAULT '' CHECK (length(out_condition) <= 300),
        back_state text CHECK (back_state IN ('seen', 'missing', 'damaged')),
        back_at timestamptz,
        back_condition text NOT NULL DEFAULT '' CHECK (length(back_condition) <= 300),
        bench_state text CHECK (bench_state IN ('seen', 'missing', 'damaged')),
        bench_at timestamptz,
        ending text CHECK (ending IN ('same', 'accepted', 'missing', 'damaged', 'different', 'mixed_up')),
        ended_at timestamptz,
        ended_by uuid REFERENCES account (id),
        end_reason text NOT NULL DEFAULT '' CHECK (length(end_reason) <= 500),
        second_reading_wanted_at timestamptz,
        PRIMARY KEY (loan_id, stone_id),
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id),
        FOREIGN KEY (school_id, stone_id) REFERENCES stone (school_id, id)
      );

      ALTER TABLE reading ADD FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id);
      ALTER TABLE photo ADD FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id);

      -- Append-only. One row for each entry a reader hands in for a stone; the first of each reader is blind.
      CREATE TABLE bench_submission (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        loan_id uuid NOT NULL,
        stone_id uuid NOT NULL,
        reader_id uuid NOT NULL REFERENCES account (id),
        pass smallint NOT NULL CHECK (pass IN (1, 2)),
        blind boolean NOT NULL,
        submitted_at timestamptz NOT NULL,
        FOREIGN KEY (loan_id, stone_id) REFERENCES loan_stone (loan_id, stone_id),
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id),
        UNIQUE (school_id, id)
      );
      CREATE INDEX bench_submission_loan_idx ON bench_submission (school_id, loan_id, stone_id);
      ALTER TABLE reading ADD FOREIGN KEY (school_id, submission_id) REFERENCES bench_submission (school_id, id);

      -- Append-only. What the engine said, with all it was told, so that it can be computed again to the same digits.
      CREATE TABLE verdict (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        loan_id uuid NOT NULL,
        stone_id uuid NOT NULL,
        basis text NOT NULL CHECK (basis IN ('first', 'second', 'pooled')),
        verdict text NOT NULL CHECK (verdict IN ('same', 'different', 'not_settled')),
        log10_lr double precision NOT NULL,
        engine text NOT NULL,
        settings jsonb NOT NULL,
        request jsonb NOT NULL,
        result jsonb NOT NULL,
        computed_at timestamptz NOT NULL,
        seq bigint GENERATED ALWAYS AS IDENTITY,
        FOREIGN KEY (loan_id, stone_id) REFERENCES loan_stone (loan_id, stone_id),
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id),
        UNIQUE (school_id, id)
      );
      CREATE INDEX verdict_stone_idx ON verdict (school_id, loan_id, stone_id, seq);

      -- Append-only. Two different people, each with a reason, accept a stone that no reading settles.
      CREATE TABLE stone_acceptance (
        loan_id uuid NOT NULL,
        stone_id uuid NOT NULL,
        account_id uuid NOT NULL REFERENCES account (id),
        school_id uuid NOT NULL,
        reason text NOT NULL CHECK (length(reason) BETWEEN 3 AND 500),
        at timestamptz NOT NULL,
        PRIMARY KEY (loan_id, stone_id, account_id),
        FOREIGN KEY (loan_id, stone_id) REFERENCES loan_stone (loan_id, stone_id),
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id)
      );

      CREATE TABLE settlement (
        loan_id uuid PRIMARY KEY,
        school_id uuid NOT NULL,
        state text NOT NULL CHECK (state IN ('proposed', 'decided', 'done')),
        kept_minor bigint NOT NULL CHECK (kept_minor >= 0),
        released_minor bigint NOT NULL CHECK (released_minor >= 0),
        currency char(3) NOT NULL,
        proposed_by uuid REFERENCES account (id),
        proposed_at timestamptz,
        decided_by uuid REFERENCES account (id),
        decided_at timestamptz,
        done_at timestamptz,
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id)
      );

      CREATE TABLE settlement_item (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        loan_id uuid NOT NULL REFERENCES settlement (loan_id),
        stone_id uuid,
        reason text NOT NULL CHECK (length(reason) BETWEEN 3 AND 500),
        amount_minor bigint NOT NULL CHECK (amount_minor > 0),
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id),
        FOREIGN KEY (school_id, stone_id) REFERENCES stone (school_id, id)
      );
      CREATE INDEX settlement_item_loan_idx ON settlement_item (school_id, loan_id);

      CREATE TABLE objection (
        loan_id uuid PRIMARY KEY,
        school_id uuid NOT NULL,
        text text NOT NULL CHECK (length(text) BETWEEN 3 AND 4000),
        made_by uuid NOT NULL REFERENCES account (id),
        made_at timestamptz NOT NULL,
        answer text CHECK (length(answer) BETWEEN 3 AND 4000),
        answered_by uuid REFERENCES account (id),
        answered_at timestamptz,
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id)
      );

      -- Append-only. The chain of events of every kit and stone.
      CREATE TABLE custody_event (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        seq bigint GENERATED ALWAYS AS IDENTITY,
        school_id uuid NOT NULL REFERENCES school (id),
        kit_id uuid NOT NULL,
        stone_id uuid,
        loan_id uuid,
        kind text NOT NULL CHECK (length(kind) BETWEEN 3 AND 60),
        actor_id uuid REFERENCES account (id),
        for_account_id uuid REFERENCES account (id),
        detail jsonb NOT NULL DEFAULT '{}',
        at timestamptz NOT NULL,
        FOREIGN KEY (school_id, kit_id) REFERENCES kit (school_id, id),
        FOREIGN KEY (school_id, stone_id) REFERENCES stone (school_id, id),
        FOREIGN KEY (school_id, loan_id) REFERENCES loan (school_id, id)
      );
      CREATE INDEX custody_event_kit_idx ON custody_event (school_id, kit_id, seq);
      CREATE INDEX custody_event_stone_idx ON custody_event (school_id, stone_id, seq) WHERE stone_id IS NOT NULL;
      CREATE INDEX custody_event_loan_idx ON custody_event (school_id, loan_id, seq) WHERE loan_id IS NOT NULL;
    `);
  }

  async down(): Promise<void> {
    throw new Error('The lending migration has no way back: restore a backup instead.');
  }
}
