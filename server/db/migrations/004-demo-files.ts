import type { Migration } from '../migration.ts'

/** Hash of the example file that a demo build was last made from: while it is the same, the file need not be read. */
export const demoFiles: Migration = {
  name: '004-demo-files',
  up: `ALTER TABLE builds ADD COLUMN demo_file_hash text;`,
  down: `ALTER TABLE builds DROP COLUMN demo_file_hash;`,
}
