import type { Migration } from '../migration.ts'

/** Requests for review, who was asked, and their verdicts; what an approval of a build needs. */
export const rounds: Migration = {
  name: '012-rounds',
  up: `
    CREATE TABLE review_rules (
      build_id uuid PRIMARY KEY REFERENCES builds ON DELETE CASCADE,
      approvals integer NOT NULL CHECK (approvals BETWEEN 1 AND 9),
      held_back_by text NOT NULL CHECK (held_back_by IN ('none', 'danger', 'fault')),
      guests_count boolean NOT NULL
    );

    CREATE TABLE rounds (
      id uuid PRIMARY KEY,
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      number integer NOT NULL,
      revision integer NOT NULL,
      -- Hash of that revision without the places of things on the sheet: an approval lapses when it differs.
      content_hash text NOT NULL,
      question text NOT NULL,
      state text NOT NULL DEFAULT 'open' CHECK (state IN ('open', 'closed', 'withdrawn')),
      asked_by uuid REFERENCES users ON DELETE SET NULL,
      asked_at timestamptz NOT NULL DEFAULT now(),
      ended_at timestamptz,
      link_id uuid REFERENCES build_links ON DELETE SET NULL,
      by_link boolean NOT NULL,
      approvals integer NOT NULL,
      held_back_by text NOT NULL,
      guests_count boolean NOT NULL,
      dangers integer,
      faults integer,
      approved_at timestamptz,
      lapsed_revision integer,
      UNIQUE (build_id, number)
    );
    CREATE UNIQUE INDEX rounds_open ON rounds (build_id) WHERE state = 'open';
    CREATE INDEX rounds_approved ON rounds (build_id, number DESC) WHERE approved_at IS NOT NULL AND state <> 'withdrawn';

    -- By account, or by the address of an invitation until its owner has joined.
    CREATE TABLE round_asked (
      round_id uuid NOT NULL REFERENCES rounds ON DELETE CASCADE,
      user_id uuid REFERENCES users ON DELETE CASCADE,
      email text,
      CHECK ((user_id IS NULL) <> (email IS NULL)),
      UNIQUE (round_id, user_id),
      UNIQUE (round_id, email)
    );

    CREATE TABLE verdicts (
      id uuid PRIMARY KEY,
      round_id uuid NOT NULL REFERENCES rounds ON DELETE CASCADE,
      user_id uuid REFERENCES users ON DELETE SET NULL,
      guest_id uuid REFERENCES guests ON DELETE SET NULL,
      verdict text NOT NULL CHECK (verdict IN ('approve', 'ask-for-changes')),
      summary text NOT NULL,
      given_at timestamptz NOT NULL DEFAULT now(),
      UNIQUE (round_id, user_id),
      UNIQUE (round_id, guest_id)
    );

    ALTER TABLE guests ADD COLUMN closed_because text CHECK (closed_because IN ('left', 'closed out'));
  `,
  down: `
    ALTER TABLE guests DROP COLUMN closed_because;
    DROP TABLE verdicts, round_asked, rounds, review_rules;
  `,
}
