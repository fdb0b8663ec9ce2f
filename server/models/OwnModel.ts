import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'
import type { Model as CatalogModel } from '#shared/catalog/model.ts'

/** A model in a person's own library. */
export class OwnModel extends Model<InferAttributes<OwnModel>, InferCreationAttributes<OwnModel>> {
  declare userId: string
  declare modelId: string
  declare model: CatalogModel
  declare changedAt: CreationOptional<Date>

  static define(database: Sequelize): void {
    OwnModel.init(
      {
        userId: { type: DataTypes.UUID, primaryKey: true },
        modelId: { type: DataTypes.TEXT, primaryKey: true },
        model: DataTypes.JSON,
        changedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
      },
      { sequelize: database, tableName: 'own_models' },
    )
  }
}
