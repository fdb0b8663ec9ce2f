import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'

/** A link to set a new password, by the hash of its token. Works once, until it expires. */
export class PasswordReset extends Model<InferAttributes<PasswordReset>, InferCreationAttributes<PasswordReset>> {
  declare tokenHash: string
  declare userId: string
  declare expiresAt: Date
  declare usedAt: CreationOptional<Date | null>

  static define(database: Sequelize): void {
    PasswordReset.init(
      {
        tokenHash: { type: DataTypes.TEXT, primaryKey: true },
        userId: DataTypes.UUID,
        expiresAt: DataTypes.DATE,
        usedAt: DataTypes.DATE,
      },
      { sequelize: database, tableName: 'password_resets' },
    )
  }
}
