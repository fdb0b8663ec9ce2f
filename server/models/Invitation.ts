import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'
import type { BuildRole } from '#shared/contract/build.ts'

/** An invitation into a build, sent to an e-mail address; found again by the hash of its token. */
export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: string
  declare buildId: string
  declare email: string
  declare role: Exclude<BuildRole, 'owner'>
  declare tokenHash: string
  declare invitedBy: string
  declare invitedAt: CreationOptional<Date>
  declare expiresAt: Date
  declare acceptedAt: CreationOptional<Date | null>

  static define(database: Sequelize): void {
    Invitation.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true },
        buildId: DataTypes.UUID,
        email: DataTypes.TEXT,
        role: DataTypes.TEXT,
        tokenHash: DataTypes.TEXT,
        invitedBy: DataTypes.UUID,
        invitedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        expiresAt: DataTypes.DATE,
        acceptedAt: DataTypes.DATE,
      },
      { sequelize: database, tableName: 'invitations' },
    )
  }
}
