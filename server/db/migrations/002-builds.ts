import type { Migration } from '../migration.ts'

/**
 * Builds, every revision of them, and their people.
 *
 * A member row carries the build's sort keys, kept true by triggers: so the list of one person's builds is read in
 * order from one index, however many builds the installation holds.
 */
export const builds: Migration = {
  name: '002-builds',
  up: `
    CREATE TABLE builds (
      id uuid PRIMARY KEY,
      name text NOT NULL,
      machine text,
      revision integer NOT NULL,
      parts integer NOT NULL DEFAULT 0,
      drives integer NOT NULL DEFAULT 0,
      worst text CHECK (worst IN ('danger', 'fault', 'caution', 'note')),
      dangers integer NOT NULL DEFAULT 0,
      faults integer NOT NULL DEFAULT 0,
      cautions integer NOT NULL DEFAULT 0,
      notes integer NOT NULL DEFAULT 0,
      checked_revision integer NOT NULL DEFAULT 0,
      check_failed_revision integer NOT NULL DEFAULT 0,
      created_at timestamptz NOT NULL DEFAULT now(),
      changed_at timestamptz NOT NULL DEFAULT now(),
      changed_by uuid REFERENCES users ON DELETE SET NULL,
      archived_at timestamptz,
      demo_example text UNIQUE,
      demo_hash text
    );
    CREATE INDEX builds_unchecked ON builds (changed_at)
      WHERE checked_revision < revision AND check_failed_revision < revision;

    CREATE TABLE build_revisions (
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      revision integer NOT NULL,
      document json NOT NULL,
      hash text NOT NULL,
      edits json NOT NULL,
      label text NOT NULL,
      base integer NOT NULL,
      request_id uuid,
      author_id uuid REFERENCES users ON DELETE SET NULL,
      saved_at timestamptz NOT NULL DEFAULT now(),
      PRIMARY KEY (build_id, revision),
      UNIQUE (build_id, request_id)
    );

    CREATE TABLE build_members (
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      role text NOT NULL CHECK (role IN ('owner', 'editor', 'reviewer', 'reader')),
      archived boolean NOT NULL,
      changed_at timestamptz NOT NULL,
      name_key text NOT NULL,
      search_text text NOT NULL,
      worst_rank smallint NOT NULL,
      drives integer NOT NULL,
      PRIMARY KEY (build_id, user_id)
    );
    CREATE INDEX build_members_changed ON build_members (user_id, archived, changed_at DESC, build_id);
    CREATE INDEX build_members_name ON build_members (user_id, archived, name_key, build_id);
    CREATE INDEX build_members_worst ON build_members (user_id, archived, worst_rank, changed_at DESC, build_id);
    CREATE INDEX build_members_drives ON build_members (user_id, archived, drives DESC, changed_at DESC, build_id);

    CREATE FUNCTION build_worst_rank(worst text) RETURNS smallint LANGUAGE sql IMMUTABLE AS
      $$ SELECT (CASE worst WHEN 'danger' THEN 0 WHEN 'fault' THEN 1 WHEN 'caution' THEN 2 WHEN 'note' THEN 3 ELSE 4 END)::smallint $$;

    CREATE FUNCTION fill_member_sort_keys() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      SELECT b.archived_at IS NOT NULL, b.changed_at, lower(b.name), lower(b.name || ' ' || coalesce(b.machine, '')),
             build_worst_rank(b.worst), b.drives
        INTO NEW.archived, NEW.changed_at, NEW.name_key, NEW.search_text, NEW.worst_rank, NEW.drives
        FROM builds b WHERE b.id = NEW.build_id;
      RETURN NEW;
    END $$;
    CREATE TRIGGER build_members_fill BEFORE INSERT ON build_members
      FOR EACH ROW EXECUTE FUNCTION fill_member_sort_keys();

    CREATE FUNCTION carry_member_sort_keys() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      UPDATE build_members SET
        archived = NEW.archived_at IS NOT NULL,
        changed_at = NEW.changed_at,
        name_key = lower(NEW.name),
        search_text = lower(NEW.name || ' ' || coalesce(NEW.machine, '')),
        worst_rank = build_worst_rank(NEW.worst),
        drives = NEW.drives
      WHERE build_id = NEW.id;
      RETURN NULL;
    END $$;
    CREATE TRIGGER builds_carry AFTER UPDATE OF name, machine, worst, drives, changed_at, archived_at ON builds
      FOR EACH ROW EXECUTE FUNCTION carry_member_sort_keys();

    CREATE TABLE invitations (
      id uuid PRIMARY KEY,
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      email text NOT NULL,
      role text NOT NULL CHECK (role IN ('editor', 'reviewer', 'reader')),
      token_hash text NOT NULL UNIQUE,
      invited_by uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      invited_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL,
      accepted_at timestamptz
    );
    CREATE UNIQUE INDEX invitations_open ON invitations (build_id, email) WHERE accepted_at IS NULL;
  `,
  down: `
    DROP TABLE invitations, build_members, build_revisions, builds;
    DROP FUNCTION fill_member_sort_keys, carry_member_sort_keys, build_worst_rank;
  `,
}
