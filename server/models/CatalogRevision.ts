import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'
import type { Model as CatalogModel } from '#shared/catalog/model.ts'

/** One edit of a model in the shared catalog. The newest one of a model stands over the shipped file. */
export class CatalogRevision extends Model<InferAttributes<CatalogRevision>, InferCreationAttributes<CatalogRevision>> {
  declare id: CreationOptional<string>
  declare modelId: string
  declare model: CatalogModel
  declare note: string | null
  declare authorId: string | null
  declare savedAt: CreationOptional<Date>

  static define(database: Sequelize): void {
    CatalogRevision.init(
      {
        id: { type: DataTypes.BIGINT, primaryKey: true, autoIncrement: true },
        modelId: DataTypes.TEXT,
        model: DataTypes.JSON,
        note: DataTypes.TEXT,
        authorId: DataTypes.UUID,
        savedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
      },
      { sequelize: database, tableName: 'catalog_revisions' },
    )
  }
}
