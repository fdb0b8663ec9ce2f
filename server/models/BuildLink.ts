import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'

/** A link into one build for people without an account; found again by the hash of its token. */
export class BuildLink extends Model<InferAttributes<BuildLink>, InferCreationAttributes<BuildLink>> {
  declare id: string
  declare buildId: string
  declare kind: 'read' | 'review'
  declare label: string
  declare tokenHash: string
  declare passPhraseHash: CreationOptional<string | null>
  declare madeBy: string | null
  declare madeAt: CreationOptional<Date>
  declare expiresAt: Date
  declare revokedAt: CreationOptional<Date | null>

  static define(database: Sequelize): void {
    BuildLink.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true },
        buildId: DataTypes.UUID,
        kind: DataTypes.TEXT,
        label: DataTypes.TEXT,
        tokenHash: DataTypes.TEXT,
        passPhraseHash: DataTypes.TEXT,
        madeBy: DataTypes.UUID,
        madeAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        expiresAt: DataTypes.DATE,
        revokedAt: DataTypes.DATE,
      },
      { sequelize: database, tableName: 'build_links' },
    )
  }
}
