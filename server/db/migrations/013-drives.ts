import type { Migration } from '../migration.ts'

/** Drives of the newest revision of every build that are known by serial or world wide name: found from any of one's builds. */
export const drives: Migration = {
  name: '013-drives',
  up: `
    CREATE TABLE build_drives (
      build_id uuid NOT NULL REFERENCES builds ON DELETE CASCADE,
      part_id text NOT NULL,
      ref text NOT NULL,
      bay integer,
      serial text NOT NULL,
      wwn text NOT NULL,
      maker_model text NOT NULL,
      PRIMARY KEY (build_id, part_id)
    );
    INSERT INTO build_drives (build_id, part_id, ref, bay, serial, wwn, maker_model)
    SELECT b.id, p->>'id', p->>'ref', (p->'bay'->>'slot')::integer,
           coalesce(p->>'serial', ''), coalesce(p->>'wwn', ''), coalesce(p->>'makerModel', '')
    FROM builds b
    JOIN build_revisions r ON r.build_id = b.id AND r.revision = b.revision
    CROSS JOIN LATERAL json_array_elements(r.document->'parts') p
    WHERE r.document IS NOT NULL AND (p->>'serial' IS NOT NULL OR p->>'wwn' IS NOT NULL)
    ON CONFLICT DO NOTHING;
  `,
  down: `
    DROP TABLE build_drives;
  `,
}
