import type { Migration } from '../migration.ts'

/** What a person needs to tell their own sessions apart: the browser, as it names itself, and when it was last here. */
export const sessions: Migration = {
  name: '008-sessions',
  up: `
    ALTER TABLE sessions ADD COLUMN browser text, ADD COLUMN last_seen_at timestamptz NOT NULL DEFAULT now();
    UPDATE sessions SET last_seen_at = created_at;
  `,
  down: `
    ALTER TABLE sessions DROP COLUMN last_seen_at, DROP COLUMN browser;
  `,
}
