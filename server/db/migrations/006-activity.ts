import type { Migration } from '../migration.ts'

/** Who did what in a build. Rows of one build are numbered in the order of their commits (see `events/publish.ts`). */
export const activity: Migration = {
  name: '006-activity',
  up: `
    CREATE TABLE activity (
      id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      at timestamptz NOT NULL DEFAULT now(),
      user_id uuid REFERENCES users ON DELETE SET NULL,
      guest_id uuid REFERENCES guests ON DELETE SET NULL,
      kind text NOT NULL,
      details jsonb NOT NULL
    );
    CREATE INDEX activity_build ON activity (build_id, id DESC);
  `,
  down: `
    DROP TABLE activity;
  `,
}
