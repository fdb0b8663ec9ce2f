import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
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
