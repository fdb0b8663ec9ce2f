import type { Migration } from '../migration.ts'

/** People, their sessions, and the ways back in. */
export const accounts: Migration = {
  name: '001-accounts',
  up: `
    CREATE TABLE secrets (
      name text PRIMARY KEY,
      value text NOT NULL
    );
    CREATE TABLE users (
      id uuid PRIMARY KEY,
      email text NOT NULL UNIQUE,
      name text NOT NULL,
      password_hash text NOT NULL,
      role text NOT NULL CHECK (role IN ('administrator', 'catalog-editor', 'member')),
      demo boolean NOT NULL DEFAULT false,
      created_at timestamptz NOT NULL DEFAULT now(),
      last_seen_at timestamptz,
      disabled_at timestamptz
    );
    CREATE TABLE sessions (
      id uuid PRIMARY KEY,
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      created_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL,
      revoked_at timestamptz,
      revoked_because text
    );
    CREATE INDEX sessions_user ON sessions (user_id);
    CREATE INDEX sessions_expiry ON sessions (expires_at);
    CREATE TABLE refresh_tokens (
      token_hash text PRIMARY KEY,
      session_id uuid NOT NULL REFERENCES sessions ON DELETE CASCADE,
      expires_at timestamptz NOT NULL,
      replaced_at timestamptz
    );
    CREATE INDEX refresh_tokens_session ON refresh_tokens (session_id);
    CREATE TABLE password_reset_requests (
      id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
      email text NOT NULL,
      requested_at timestamptz NOT NULL DEFAULT now()
    );
    CREATE TABLE password_resets (
      token_hash text PRIMARY KEY,
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      expires_at timestamptz NOT NULL,
      used_at timestamptz
    );
    CREATE INDEX password_resets_user ON password_resets (user_id);
    CREATE TABLE messages (
      id uuid PRIMARY KEY,
      recipient text NOT NULL,
      subject text NOT NULL,
      text_body text NOT NULL,
      html_body text NOT NULL,
      state text NOT NULL DEFAULT 'queued' CHECK (state IN ('queued', 'sent', 'failed')),
      attempts integer NOT NULL DEFAULT 0,
      last_error text,
      queued_at timestamptz NOT NULL DEFAULT now(),
      next_try_at timestamptz NOT NULL DEFAULT now(),
      sent_at timestamptz
    );
    CREATE INDEX messages_waiting ON messages (next_try_at) WHERE state = 'queued';
    CREATE INDEX messages_newest ON messages (queued_at DESC);
  `,
  down: `
    DROP TABLE messages, password_resets, password_reset_requests, refresh_tokens, sessions, users, secrets;
  `,
}
