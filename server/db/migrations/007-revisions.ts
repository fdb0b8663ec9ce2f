import type { Migration } from '../migration.ts'

/**
 * Revisions kept as edits: a row holds its whole document where it is the newest, or where others are replayed from it
 * (`replay_from` is null), and every other row is made anew from the row named in `replay_from` and the edits since.
 * Rows from before keep their documents. Names and notes that people give; which revision a restored one brings back.
 */
export const revisions: Migration = {
  name: '007-revisions',
  up: `
    ALTER TABLE build_revisions
      ALTER COLUMN document DROP NOT NULL,
      ADD COLUMN replay_from integer,
      ADD COLUMN name text,
      ADD COLUMN note text,
      ADD COLUMN restored integer,
      ADD CONSTRAINT build_revisions_rebuildable CHECK (document IS NOT NULL OR replay_from < revision);
    CREATE INDEX build_revisions_named ON build_revisions (build_id, revision DESC) WHERE name IS NOT NULL;
  `,
  down: `
    DO $$ BEGIN
      IF EXISTS (SELECT FROM build_revisions WHERE document IS NULL) THEN
        RAISE EXCEPTION 'revisions are kept as edits: there is no way back without losing them';
      END IF;
    END $$;
    DROP INDEX build_revisions_named;
    ALTER TABLE build_revisions
      DROP CONSTRAINT build_revisions_rebuildable,
      DROP COLUMN restored,
      DROP COLUMN note,
      DROP COLUMN name,
      DROP COLUMN replay_from,
      ALTER COLUMN document SET NOT NULL;
  `,
}
