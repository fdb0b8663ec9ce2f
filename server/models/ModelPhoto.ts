import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'

/** The photo of a label, kept beside a model in a person's own library. */
export class ModelPhoto extends Model<InferAttributes<ModelPhoto>, InferCreationAttributes<ModelPhoto>> {
  declare userId: string
  declare modelId: string
  /** WebP, made by us. */
  declare photo: Buffer
  /** Changes with the photo: for the cache of the browser. */
  declare version: string
  declare savedAt: CreationOptional<Date>

  static define(database: Sequelize): void {
    ModelPhoto.init(
      {
        userId: { type: DataTypes.UUID, primaryKey: true },
        modelId: { type: DataTypes.TEXT, primaryKey: true },
        photo: { type: DataTypes.BLOB, allowNull: false },
        version: { type: DataTypes.TEXT, allowNull: false },
        savedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
      },
      { sequelize: database, tableName: 'model_photos' },
    )
  }
}
