import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Accounts, schools, memberships, sessions, invitations, and the narrow functions that find a person before a school is known. */
export class People1764547200001 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`
      CREATE EXTENSION IF NOT EXISTS btree_gist;

      -- After a local set_config the pooled connection's setting is '' and not null, hence nullif.
      CREATE FUNCTION current_school() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
        AS $$ SELECT nullif(current_setting('app.school_id', true), '')::uuid $$;
      CREATE FUNCTION current_account() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
        AS $$ SELECT nullif(current_setting('app.account_id', true), '')::uuid $$;

      CREATE TABLE account (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        email text NOT NULL CHECK (email = lower(email) AND length(email) BETWEEN 3 AND 254),
        name text NOT NULL CHECK (length(name) BETWEEN 1 AND 120),
        password_hash text NOT NULL,
        created_at timestamptz NOT NULL DEFAULT now()
      );
      CREATE UNIQUE INDEX account_email_key ON account (email);

      CREATE TABLE school (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        name text NOT NULL CHECK (length(name) BETWEEN 1 AND 120),
        time_zone text NOT NULL,
        currency char(3) NOT NULL CHECK (currency = upper(currency)),
        closing_time text NOT NULL DEFAULT '17:00' CHECK (closing_time ~ '^([01][0-9]|2[0-3]):[0-5][0-9]$'),
        loan_days integer NOT NULL DEFAULT 3 CHECK (loan_days BETWEEN 1 AND 180),
        deposit_rule jsonb NOT NULL,
        late_grace_hours integer NOT NULL DEFAULT 24 CHECK (late_grace_hours BETWEEN 0 AND 720),
        checking_days integer NOT NULL DEFAULT 2 CHECK (checking_days BETWEEN 0 AND 60),
        reservation_minutes integer NOT NULL DEFAULT 45 CHECK (reservation_minutes BETWEEN 30 AND 1440),
        objection_days integer NOT NULL DEFAULT 14 CHECK (objection_days BETWEEN 1 AND 180),
        engine_settings jsonb NOT NULL DEFAULT '{}',
        created_at timestamptz NOT NULL DEFAULT now()
      );

      CREATE TABLE membership (
        school_id uuid NOT NULL REFERENCES school (id),
        account_id uuid NOT NULL REFERENCES account (id),
        roles text[] NOT NULL CHECK (roles <@ ARRAY['student','instructor','admin'] AND cardinality(roles) > 0),
        created_at timestamptz NOT NULL DEFAULT now(),
        ended_at timestamptz,
        PRIMARY KEY (school_id, account_id)
      );
      CREATE INDEX membership_account_idx ON membership (account_id);

      CREATE TABLE terms_version (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL REFERENCES school (id),
        version integer NOT NULL CHECK (version > 0),
        text text NOT NULL CHECK (length(text) BETWEEN 1 AND 20000),
        created_by uuid REFERENCES account (id),
        created_at timestamptz NOT NULL DEFAULT now(),
        UNIQUE (school_id, version),
        UNIQUE (school_id, id)
      );

      CREATE TABLE refresh_token (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        family_id uuid NOT NULL,
        account_id uuid NOT NULL REFERENCES account (id),
        token_hash bytea NOT NULL UNIQUE,
        predecessor_id uuid REFERENCES refresh_token (id),
        created_at timestamptz NOT NULL,
        expires_at timestamptz NOT NULL,
        replaced_at timestamptz,
        revoked_at timestamptz
      );
      CREATE INDEX refresh_token_family_idx ON refresh_token (family_id);
      CREATE INDEX refresh_token_account_idx ON refresh_token (account_id);

      CREATE TABLE password_reset (
        token_hash bytea PRIMARY KEY,
        account_id uuid NOT NULL REFERENCES account (id),
        created_at timestamptz NOT NULL,
        expires_at timestamptz NOT NULL,
        used_at timestamptz
      );

      CREATE TABLE invitation (
        id uuid PRIMARY KEY DEFAULT gen_random_uuid(),
        school_id uuid NOT NULL REFERENCES school (id),
        email text NOT NULL CHECK (email = lower(email) AND length(email) BETWEEN 3 AND 254),
        name text NOT NULL DEFAULT '' CHECK (length(name) <= 120),
        roles text[] NOT NULL CHECK (roles <@ ARRAY['student','instructor','admin'] AND cardinality(roles) > 0),
        token_hash bytea NOT NULL UNIQUE,
        invited_by uuid NOT NULL REFERENCES account (id),
        created_at timestamptz NOT NULL,
        expires_at timestamptz NOT NULL,
        accepted_at timestamptz,
        withdrawn_at timestamptz
      );
      CREATE INDEX invitation_school_idx ON invitation (school_id, created_at);

      -- Throttling only: hashes, never an address or an e-mail in clear.
      CREATE TABLE sign_in_attempt (
        id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
        account_hash bytea NOT NULL,
        address_hash bytea NOT NULL,
        succeeded boolean NOT NULL,
        at timestamptz NOT NULL
      );
      CREATE INDEX sign_in_attempt_account_idx ON sign_in_attempt (account_hash, at);
      CREATE INDEX sign_in_attempt_address_idx ON sign_in_attempt (address_hash, at);

      CREATE TABLE idempotency (
        account_id uuid NOT NULL REFERENCES account (id),
        operation text NOT NULL,
        key text NOT NULL CHECK (length(key) BETWEEN 1 AND 255),
        request_hash bytea NOT NULL,
        status integer,
        answer jsonb,
        created_at timestamptz NOT NULL DEFAULT now(),
        PRIMARY KEY (account_id, operation, key)
      );
      CREATE INDEX idempotency_created_idx ON idempotency (created_at);

      -- What must be found before a school or an account is known: ids only.
      CREATE FUNCTION find_account_id(wanted_email text) RETURNS uuid LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
        AS $$ SELECT id FROM account WHERE email = lower(wanted_email) $$;
      CREATE FUNCTION find_refresh_token(wanted_hash bytea) RETURNS TABLE (id uuid, account_id uuid) LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
        AS $$ SELECT t.id, t.account_id FROM refresh_token t WHERE t.token_hash = wanted_hash $$;
      CREATE FUNCTION find_password_reset(wanted_hash bytea) RETURNS uuid LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
        AS $$ SELECT account_id FROM password_reset WHERE token_hash = wanted_hash $$;
      CREATE FUNCTION find_invitation(wanted_hash bytea) RETURNS TABLE (id uuid, school_id uuid) LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
        AS $$ SELECT i.id, i.school_id FROM invitation i WHERE i.token_hash = wanted_hash $$;
      CREATE FUNCTION all_school_ids() RETURNS SETOF uuid LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public
        AS $$ SELECT id FROM school ORDER BY id $$;
    `);
  }

  async down(): Promise<void> {
    throw new Error('The first migration has no way back: drop the database instead.');
  }
}
