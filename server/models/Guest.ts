import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'

/** Somebody who came by a link and gave a name; known again by the hash of the token in their cookie. */
export class Guest extends Model<InferAttributes<Guest>, InferCreationAttributes<Guest>> {
  declare id: string
  declare linkId: string
  declare buildId: string
  declare name: string
  declare tokenHash: string
  declare joinedAt: CreationOptional<Date>
  declare lastSeenAt: CreationOptional<Date>
  declare closedAt: CreationOptional<Date | null>
  declare closedBecause: CreationOptional<'left' | 'closed out' | null>

  static define(database: Sequelize): void {
    Guest.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true },
        linkId: DataTypes.UUID,
        buildId: DataTypes.UUID,
        name: DataTypes.TEXT,
        tokenHash: DataTypes.TEXT,
        joinedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        lastSeenAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        closedAt: DataTypes.DATE,
        closedBecause: DataTypes.TEXT,
      },
      { sequelize: database, tableName: 'guests' },
    )
  }
}
