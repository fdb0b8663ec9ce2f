import type { Migration } from '../migration.ts'

/** The photo of a label beside an own model. It outlives the model for a while, so that removing one can be undone. */
export const modelPhotos: Migration = {
  name: '014-model-photos',
  up: `
    CREATE TABLE model_photos (
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      model_id text NOT NULL,
      photo bytea NOT NULL,
      version text NOT NULL,
      saved_at timestamptz NOT NULL DEFAULT now(),
      PRIMARY KEY (user_id, model_id)
    );
  `,
  down: `
    DROP TABLE model_photos;
  `,
}
