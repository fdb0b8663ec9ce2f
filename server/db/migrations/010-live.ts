import type { Migration } from '../migration.ts'

/**
 * What people are told of, and the words by which every process hears at once that somebody may no longer listen:
 * written by triggers, so that they hold whoever ends a session, takes a person out of a build or revokes a link.
 */
export const live: Migration = {
  name: '010-live',
  up: `
    CREATE TABLE notifications (
      user_id uuid NOT NULL REFERENCES users ON DELETE CASCADE,
      activity_id bigint NOT NULL REFERENCES activity ON DELETE CASCADE,
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      reason text NOT NULL,
      read_at timestamptz,
      in_digest boolean NOT NULL DEFAULT false,
      PRIMARY KEY (user_id, activity_id)
    );
    CREATE INDEX notifications_unread ON notifications (user_id) WHERE read_at IS NULL;

    CREATE FUNCTION tell_access() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      PERFORM pg_notify('bayloom_access', CASE TG_TABLE_NAME
        WHEN 'sessions' THEN 'session:' || (to_jsonb(OLD) ->> 'id')
        ELSE 'build:' || (to_jsonb(OLD) ->> 'build_id') END);
      RETURN NULL;
    END $$;
    CREATE TRIGGER sessions_tell AFTER UPDATE OF revoked_at ON sessions
      FOR EACH ROW WHEN (OLD.revoked_at IS NULL AND NEW.revoked_at IS NOT NULL) EXECUTE FUNCTION tell_access();
    CREATE TRIGGER sessions_tell_end AFTER DELETE ON sessions FOR EACH ROW EXECUTE FUNCTION tell_access();
    CREATE TRIGGER build_members_tell AFTER DELETE ON build_members FOR EACH ROW EXECUTE FUNCTION tell_access();
    CREATE TRIGGER build_links_tell AFTER UPDATE OF revoked_at, expires_at ON build_links
      FOR EACH ROW EXECUTE FUNCTION tell_access();
    CREATE TRIGGER build_links_tell_end AFTER DELETE ON build_links FOR EACH ROW EXECUTE FUNCTION tell_access();
    CREATE TRIGGER guests_tell AFTER UPDATE OF closed_at ON guests
      FOR EACH ROW WHEN (OLD.closed_at IS DISTINCT FROM NEW.closed_at) EXECUTE FUNCTION tell_access();
    CREATE TRIGGER guests_tell_end AFTER DELETE ON guests FOR EACH ROW EXECUTE FUNCTION tell_access();
  `,
  down: `
    DROP TRIGGER sessions_tell ON sessions;
    DROP TRIGGER sessions_tell_end ON sessions;
    DROP TRIGGER build_members_tell ON build_members;
    DROP TRIGGER build_links_tell ON build_links;
    DROP TRIGGER build_links_tell_end ON build_links;
    DROP TRIGGER guests_tell ON guests;
    DROP TRIGGER guests_tell_end ON guests;
    DROP FUNCTION tell_access;
    DROP TABLE notifications;
  `,
}
