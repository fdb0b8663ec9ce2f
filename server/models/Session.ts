import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'

/** One sign-in on one browser: the family of its refresh tokens. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: string
  declare userId: string
  declare createdAt: CreationOptional<Date>
  declare expiresAt: Date
  declare revokedAt: CreationOptional<Date | null>
  declare revokedBecause: CreationOptional<string | null>
  /** How the browser names itself; anybody may make that up. */
  declare browser: CreationOptional<string | null>
  declare lastSeenAt: CreationOptional<Date>

  static define(database: Sequelize): void {
    Session.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true },
        userId: DataTypes.UUID,
        createdAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        expiresAt: DataTypes.DATE,
        revokedAt: DataTypes.DATE,
        revokedBecause: DataTypes.TEXT,
        browser: DataTypes.TEXT,
        lastSeenAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
      },
      { sequelize: database, tableName: 'sessions' },
    )
  }
}
