import type { Migration } from '../migration.ts'

/**
 * Mail by kind: to whom and about what, so that nobody gets it who has left meanwhile, and each once. What people want
 * to get is kept by address, because some of it reaches people without an account; it goes and moves with the account.
 * Requests for new passwords wait in a queue now (`jobs/queues.ts`); whoever asked in the second of this change asks again.
 */
export const mail: Migration = {
  name: '011-mail',
  up: `
    ALTER TABLE messages
      ADD COLUMN kind text NOT NULL DEFAULT 'other',
      ADD COLUMN user_id uuid REFERENCES users ON DELETE CASCADE,
      ADD COLUMN build_id uuid REFERENCES builds ON DELETE CASCADE,
      ADD COLUMN activity_id bigint,
      ADD COLUMN unsubscribe_token text,
      DROP CONSTRAINT messages_state_check,
      ADD CONSTRAINT messages_state_check CHECK (state IN ('queued', 'sent', 'failed', 'dropped'));
    CREATE UNIQUE INDEX messages_once ON messages (user_id, activity_id) WHERE activity_id IS NOT NULL;
    CREATE INDEX messages_build ON messages (build_id);

    CREATE TABLE mail_choices (
      email text NOT NULL,
      kind text NOT NULL,
      timing text NOT NULL,
      before text,
      PRIMARY KEY (email, kind)
    );
    CREATE FUNCTION carry_mail_choices() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      IF TG_OP = 'DELETE' THEN
        DELETE FROM mail_choices WHERE email = OLD.email;
      ELSE
        DELETE FROM mail_choices WHERE email = NEW.email;
        UPDATE mail_choices SET email = NEW.email WHERE email = OLD.email;
      END IF;
      RETURN NULL;
    END $$;
    CREATE TRIGGER users_carry_mail_choices AFTER DELETE ON users
      FOR EACH ROW EXECUTE FUNCTION carry_mail_choices();
    CREATE TRIGGER users_move_mail_choices AFTER UPDATE OF email ON users
      FOR EACH ROW WHEN (OLD.email <> NEW.email) EXECUTE FUNCTION carry_mail_choices();

    CREATE TABLE digests (
      user_id uuid PRIMARY KEY REFERENCES users ON DELETE CASCADE,
      covered_to bigint NOT NULL,
      next_at timestamptz NOT NULL
    );
    CREATE INDEX digests_next ON digests (next_at);

    DROP TABLE password_reset_requests;
  `,
  down: `
    CREATE TABLE password_reset_requests (
      id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
      email text NOT NULL,
      requested_at timestamptz NOT NULL DEFAULT now()
    );
    DROP TABLE digests;
    DROP TRIGGER users_carry_mail_choices ON users;
    DROP TRIGGER users_move_mail_choices ON users;
    DROP FUNCTION carry_mail_choices;
    DROP TABLE mail_choices;
    DELETE FROM messages WHERE state = 'dropped';
    DROP INDEX messages_once, messages_build;
    ALTER TABLE messages
      DROP COLUMN kind, DROP COLUMN user_id, DROP COLUMN build_id, DROP COLUMN activity_id,
      DROP COLUMN unsubscribe_token,
      DROP CONSTRAINT messages_state_check,
      ADD CONSTRAINT messages_state_check CHECK (state IN ('queued', 'sent', 'failed'));
  `,
}
