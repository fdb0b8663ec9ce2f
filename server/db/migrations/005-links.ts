import type { Migration } from '../migration.ts'

/** Links into one build for people without an account, and the guests that came by them. */
export const links: Migration = {
  name: '005-links',
  up: `
    CREATE TABLE build_links (
      id uuid PRIMARY KEY,
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      kind text NOT NULL CHECK (kind IN ('read', 'review')),
      label text NOT NULL,
      token_hash text NOT NULL UNIQUE,
      pass_phrase_hash text,
      made_by uuid REFERENCES users ON DELETE SET NULL,
      made_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL,
      revoked_at timestamptz
    );
    CREATE INDEX build_links_build ON build_links (build_id);

    CREATE TABLE guests (
      id uuid PRIMARY KEY,
      link_id uuid NOT NULL REFERENCES build_links ON DELETE CASCADE,
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      name text NOT NULL,
      token_hash text NOT NULL UNIQUE,
      joined_at timestamptz NOT NULL DEFAULT now(),
      last_seen_at timestamptz NOT NULL DEFAULT now(),
      closed_at timestamptz
    );
    CREATE INDEX guests_build ON guests (build_id);
    CREATE INDEX guests_link ON guests (link_id);
  `,
  down: `
    DROP TABLE guests, build_links;
  `,
}
