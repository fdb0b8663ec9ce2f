import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
  type Transaction,
} from 'sequelize'
import type { Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'

/** Revisions from one whole document to the next: so many edits are replayed at most. */
const stride = 50

/** A revision about to be written. */
export interface NewRevision {
  buildId: string
  revision: number
  document: BuildDocument
  hash: string
  edits: readonly Edit[]
  label: string
  /** Revision that the edits started from. */
  base: number
  requestId: string | null
  authorId: string | null
  savedAt: Date
  /** The revision that it brings back. */
  restored?: number
}

/** One saved state of a build and the edits that led to it. But for its name and note, never changed once written. */
export class BuildRevision extends Model<InferAttributes<BuildRevision>, InferCreationAttributes<BuildRevision>> {
  declare buildId: string
  declare revision: number
  /** Null where it is made anew from `replayFrom` and the edits since: read it through `revisionStore.ts`. */
  declare document: BuildDocument | null
  declare replayFrom: number | null
  declare hash: string
  declare edits: Edit[]
  declare label: string
  declare base: number
  declare requestId: string | null
  declare authorId: string | null
  declare savedAt: CreationOptional<Date>
  declare name: string | null
  declare note: string | null
  declare restored: number | null

  /**
   * Writes the newest revision, and leaves the one before it to be replayed unless others are replayed from it. Not by
   * `create`, which would copy the whole document and read it back. The build is held meanwhile.
   */
  static async append(values: NewRevision, transaction: Transaction): Promise<void> {
    const [document, edits] = [JSON.stringify(values.document), JSON.stringify(values.edits)]
    // Without edits there is nothing to replay; edits longer than the document save nothing.
    const whole = values.edits.length === 0 || edits.length > document.length
    await BuildRevision.sequelize?.query(
      `INSERT INTO build_revisions
         (build_id, revision, document, hash, edits, label, base, request_id, author_id, saved_at, restored, replay_from)
       SELECT $1::uuid, $2::int, $3::json, $4, $5::json, $6, $7::int, $8::uuid, $9::uuid, $10::timestamptz, $11::int,
         CASE WHEN NOT $12::boolean AND $2::int - coalesce(p.replay_from, p.revision) < ${stride}
           THEN coalesce(p.replay_from, p.revision) END
       FROM (SELECT) one LEFT JOIN build_revisions p ON p.build_id = $1::uuid AND p.revision = $2::int - 1`,
      {
        bind: [
          values.buildId,
          values.revision,
          document,
          values.hash,
          edits,
          values.label,
          values.base,
          values.requestId,
          values.authorId,
          values.savedAt,
          values.restored ?? null,
          whole,
        ],
        transaction,
      },
    )
    await BuildRevision.sequelize?.query(
      `UPDATE build_revisions SET document = NULL WHERE build_id = $1 AND revision = $2 AND replay_from IS NOT NULL`,
      { bind: [values.buildId, values.revision - 1], transaction },
    )
  }

  static define(database: Sequelize): void {
    BuildRevision.init(
      {
        buildId: { type: DataTypes.UUID, primaryKey: true },
        revision: { type: DataTypes.INTEGER, primaryKey: true },
        document: DataTypes.JSON,
        replayFrom: DataTypes.INTEGER,
        hash: DataTypes.TEXT,
        edits: DataTypes.JSON,
        label: DataTypes.TEXT,
        base: DataTypes.INTEGER,
        requestId: DataTypes.UUID,
        authorId: DataTypes.UUID,
        savedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        name: DataTypes.TEXT,
        note: DataTypes.TEXT,
        restored: DataTypes.INTEGER,
      },
      { sequelize: database, tableName: 'build_revisions' },
    )
  }
}
