import type { Migration } from '../migration.ts'

/** Threads of comments, each pinned to something of its build, and who is mentioned in them. */
export const comments: Migration = {
  name: '009-comments',
  up: `
    CREATE TABLE comment_threads (
      id uuid PRIMARY KEY,
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      number integer NOT NULL,
      pin jsonb NOT NULL,
      -- What the pin holds on to in the document, to know when it is gone.
      part_id text,
      joint_id text,
      about text NOT NULL,
      revision integer NOT NULL,
      gone_in integer,
      last_at timestamptz NOT NULL DEFAULT now(),
      resolved_at timestamptz,
      resolved_user_id uuid REFERENCES users ON DELETE SET NULL,
      resolved_guest_id uuid REFERENCES guests ON DELETE SET NULL,
      UNIQUE (build_id, number)
    );
    CREATE INDEX comment_threads_open ON comment_threads (build_id, last_at DESC, id) WHERE resolved_at IS NULL;
    CREATE INDEX comment_threads_all ON comment_threads (build_id, last_at DESC, id);
    CREATE INDEX comment_threads_held ON comment_threads (build_id) WHERE part_id IS NOT NULL OR joint_id IS NOT NULL;

    CREATE TABLE comments (
      id uuid PRIMARY KEY,
      thread_id uuid NOT NULL REFERENCES comment_threads ON DELETE CASCADE,
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      user_id uuid REFERENCES users ON DELETE SET NULL,
      guest_id uuid REFERENCES guests ON DELETE SET NULL,
      at timestamptz NOT NULL DEFAULT now(),
      edited_at timestamptz,
      deleted_at timestamptz,
      body text NOT NULL,
      request_id uuid NOT NULL,
      UNIQUE (build_id, request_id)
    );
    CREATE INDEX comments_thread ON comments (thread_id, at, id);
    CREATE INDEX comments_user ON comments (user_id);

    CREATE TABLE comment_mentions (
      comment_id uuid NOT NULL REFERENCES comments ON DELETE CASCADE,
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      PRIMARY KEY (comment_id, user_id)
    );
    CREATE INDEX comment_mentions_user ON comment_mentions (user_id);
  `,
  down: `
    DROP TABLE comment_mentions, comments, comment_threads;
  `,
}
