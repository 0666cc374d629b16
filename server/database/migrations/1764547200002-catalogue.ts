import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Kits, stones, photos, instruments, readings (append-only) and labels. */
export class Catalogue1764547200002 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE TABLE kit (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL REFERENCES school (id),
        number text NOT NULL CHECK (number ~ '^[0-9A-Z-]{1,12}$'),
        title text NOT NULL CHECK (length(title) BETWEEN 1 AND 120),
        neutral_title text NOT NULL CHECK (length(neutral_title) BETWEEN 1 AND 120),
        standing text NOT NULL DEFAULT 'lendable' CHECK (standing IN ('lendable', 'set_aside', 'retired')),
        standing_reason text NOT NULL DEFAULT '' CHECK (length(standing_reason) <= 500),
        version integer NOT NULL DEFAULT 1,
        created_at timestamptz NOT NULL DEFAULT now(),
        UNIQUE (school_id, number),
        UNIQUE (school_id, id)
      );

      CREATE TABLE stone (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        kit_id uuid NOT NULL,
        slot text NOT NULL CHECK (slot ~ '^[A-Z]$'),
        species text NOT NULL,
        colour text,
        shape text NOT NULL CHECK (shape IN ('oval', 'round', 'cushion', 'other')),
        nominal_size text NOT NULL DEFAULT '' CHECK (length(nominal_size) <= 40),
        neutral_description text NOT NULL CHECK (length(neutral_description) BETWEEN 1 AND 200),
        marks text NOT NULL DEFAULT '' CHECK (length(marks) <= 1000),
        source text NOT NULL DEFAULT '' CHECK (length(source) <= 500),
        replacement_value_minor bigint NOT NULL CHECK (replacement_value_minor >= 0),
        flags text[] NOT NULL DEFAULT '{}',
        standing text NOT NULL DEFAULT 'in_kit' CHECK (standing IN ('in_kit', 'missing', 'damaged', 'different', 'retired')),
        version integer NOT NULL DEFAULT 1,
        created_at timestamptz NOT NULL DEFAULT now(),
        FOREIGN KEY (school_id, kit_id) REFERENCES kit (school_id, id),
        UNIQUE (school_id, id)
      );
      CREATE UNIQUE INDEX stone_slot_key ON stone (school_id, kit_id, slot) WHERE standing <> 'retired';

      CREATE TABLE photo (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        stone_id uuid NOT NULL,
        loan_id uuid,
        storage_key text NOT NULL,
        mime text NOT NULL,
        width integer NOT NULL,
        height integer NOT NULL,
        note text NOT NULL DEFAULT '' CHECK (length(note) <= 200),
        created_by uuid NOT NULL REFERENCES account (id),
        created_at timestamptz NOT NULL DEFAULT now(),
        removed_at timestamptz,
        FOREIGN KEY (school_id, stone_id) REFERENCES stone (school_id, id),
        UNIQUE (school_id, id)
      );
      CREATE INDEX photo_stone_idx ON photo (school_id, stone_id);

      CREATE TABLE instrument (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL REFERENCES school (id),
        kind text NOT NULL CHECK (kind IN ('balance', 'refractometer', 'caliper', 'polariscope', 'uv_lamp', 'thermometer')),
        name text NOT NULL CHECK (length(name) BETWEEN 1 AND 80),
        resolution double precision CHECK (resolution > 0),
        standard_uncertainty double precision CHECK (standard_uncertainty > 0),
        spot_uncertainty double precision CHECK (spot_uncertainty > 0),
        liquid_limit_ri double precision CHECK (liquid_limit_ri BETWEEN 1.3 AND 2.7),
        retired_at timestamptz,
        version integer NOT NULL DEFAULT 1,
        created_at timestamptz NOT NULL DEFAULT now(),
        UNIQUE (school_id, name),
        UNIQUE (school_id, id)
      );

      -- Append-only. What was read: one row for each reading, never changed; a slip is struck by a reading_strike row.
      CREATE TABLE reading (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        stone_id uuid NOT NULL,
        purpose text NOT NULL CHECK (purpose IN ('intake', 'check')),
        loan_id uuid,
        submission_id uuid,
        reader_id uuid NOT NULL REFERENCES account (id),
        observer text NOT NULL CHECK (observer IN ('instructor', 'student')),
        attribute text NOT NULL,
        value double precision,
        category text,
        over_limit double precision,
        air_ct double precision,
        water_ct double precision,
        water_c double precision,
        u double precision,
        u_instrument double precision,
        instrument_id uuid,
        note text NOT NULL DEFAULT '' CHECK (length(note) <= 300),
        taken_at timestamptz NOT NULL,
        position integer NOT NULL DEFAULT 0,
        FOREIGN KEY (school_id, stone_id) REFERENCES stone (school_id, id),
        FOREIGN KEY (school_id, instrument_id) REFERENCES instrument (school_id, id),
        UNIQUE (school_id, id),
        CHECK ((purpose = 'check') = (loan_id IS NOT NULL)),
        CHECK (num_nonnulls(value, category, over_limit) = 1)
      );
      CREATE INDEX reading_stone_idx ON reading (school_id, stone_id, purpose, taken_at);
      CREATE INDEX reading_loan_idx ON reading (school_id, loan_id) WHERE loan_id IS NOT NULL;

      CREATE TABLE reading_strike (
        reading_id uuid PRIMARY KEY,
        school_id uuid NOT NULL,
        struck_by uuid NOT NULL REFERENCES account (id),
        reason text NOT NULL CHECK (length(reason) BETWEEN 3 AND 300),
        struck_at timestamptz NOT NULL,
        FOREIGN KEY (school_id, reading_id) REFERENCES reading (school_id, id)
      );

      CREATE TABLE label (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL,
        code char(12) NOT NULL UNIQUE,
        kit_id uuid NOT NULL,
        stone_id uuid,
        issued_by uuid NOT NULL REFERENCES account (id),
        issued_at timestamptz NOT NULL,
        voided_at timestamptz,
        FOREIGN KEY (school_id, kit_id) REFERENCES kit (school_id, id),
        FOREIGN KEY (school_id, stone_id) REFERENCES stone (school_id, id),
        UNIQUE (school_id, id)
      );
      CREATE UNIQUE INDEX label_valid_kit_key ON label (kit_id) WHERE voided_at IS NULL AND stone_id IS NULL;
      CREATE UNIQUE INDEX label_valid_stone_key ON label (stone_id) WHERE voided_at IS NULL AND stone_id IS NOT NULL;

      CREATE FUNCTION find_label(wanted_code text) RETURNS TABLE (id uuid, school_id uuid) LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
        AS $$ SELECT l.id, l.school_id FROM label l WHERE l.code = wanted_code $$;
    `);
  }

  async down(): Promise<void> {
    throw new Error('The catalogue migration has no way back: restore a backup instead.');
  }
}
