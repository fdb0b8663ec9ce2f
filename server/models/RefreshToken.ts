import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'

/** One refresh token of a session, by its hash. `replacedAt` is set once it has been exchanged for the next. */
export class RefreshToken extends Model<InferAttributes<RefreshToken>, InferCreationAttributes<RefreshToken>> {
  declare tokenHash: string
  declare sessionId: string
  declare expiresAt: Date
  declare replacedAt: CreationOptional<Date | null>

  static define(database: Sequelize): void {
    RefreshToken.init(
      {
        tokenHash: { type: DataTypes.TEXT, primaryKey: true },
        sessionId: DataTypes.UUID,
        expiresAt: DataTypes.DATE,
        replacedAt: DataTypes.DATE,
      },
      { sequelize: database, tableName: 'refresh_tokens' },
    )
  }
}
