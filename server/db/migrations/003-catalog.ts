import type { Migration } from '../migration.ts'

/** Corrections and additions to the shipped catalog, each kept as a revision; and people's own models. */
export const catalog: Migration = {
  name: '003-catalog',
  up: `
    CREATE TABLE catalog_revisions (
      id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
      model_id text NOT NULL,
      model json NOT NULL,
      note text,
      author_id uuid REFERENCES users ON DELETE SET NULL,
      saved_at timestamptz NOT NULL DEFAULT now()
    );
    CREATE INDEX catalog_revisions_newest ON catalog_revisions (model_id, id DESC);
    CREATE TABLE own_models (
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      model_id text NOT NULL,
      model json NOT NULL,
      changed_at timestamptz NOT NULL DEFAULT now(),
      PRIMARY KEY (user_id, model_id)
    );
  `,
  down: `
    DROP TABLE own_models, catalog_revisions;
  `,
}
