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

/** One saved state of a build: the whole document, and the edits that led to it. Never changed once written. */
export class BuildRevision extends Model<InferAttributes<BuildRevision>, InferCreationAttributes<BuildRevision>> {
  declare buildId: string
  declare revision: number
  declare document: BuildDocument
  declare hash: string
  declare edits: Edit[]
  declare label: string
  /** Revision that the edits started from. */
  declare base: number
  /** Made once by the browser: a repeated request finds its first answer by it. */
  declare requestId: string | null
  declare authorId: string | null
  declare savedAt: CreationOptional<Date>

  /** Writes a revision. Not by `create`, which would copy the whole document and read it back. */
  static async append(
    values: Omit<InferCreationAttributes<BuildRevision>, 'savedAt'> & { savedAt: Date },
    transaction: Transaction,
  ): Promise<void> {
    await BuildRevision.sequelize?.query(
      `INSERT INTO build_revisions
         (build_id, revision, document, hash, edits, label, base, request_id, author_id, saved_at)
       VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10)`,
      {
        bind: [
          values.buildId,
          values.revision,
          JSON.stringify(values.document),
          values.hash,
          JSON.stringify(values.edits),
          values.label,
          values.base,
          values.requestId,
          values.authorId,
          values.savedAt,
        ],
        transaction,
      },
    )
  }

  static define(database: Sequelize): void {
    BuildRevision.init(
      {
        buildId: { type: DataTypes.UUID, primaryKey: true },
        revision: { type: DataTypes.INTEGER, primaryKey: true },
        document: DataTypes.JSON,
        hash: DataTypes.TEXT,
        edits: DataTypes.JSON,
        label: DataTypes.TEXT,
        base: DataTypes.INTEGER,
        requestId: DataTypes.UUID,
        authorId: DataTypes.UUID,
        savedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
      },
      { sequelize: database, tableName: 'build_revisions' },
    )
  }
}
