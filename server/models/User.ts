import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'
import type { InstallationRole } from '#shared/contract/session.ts'

/** A person with an account. `demo` marks accounts whose passwords are published. */
export class User extends Model<InferAttributes<User>, InferCreationAttributes<User>> {
  declare id: string
  declare email: string
  declare name: string
  declare passwordHash: string
  declare role: InstallationRole
  declare demo: CreationOptional<boolean>
  declare createdAt: CreationOptional<Date>
  declare lastSeenAt: CreationOptional<Date | null>
  declare disabledAt: CreationOptional<Date | null>

  static define(database: Sequelize): void {
    User.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true },
        email: DataTypes.TEXT,
        name: DataTypes.TEXT,
        passwordHash: DataTypes.TEXT,
        role: DataTypes.TEXT,
        demo: { type: DataTypes.BOOLEAN, defaultValue: false },
        createdAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        lastSeenAt: DataTypes.DATE,
        disabledAt: DataTypes.DATE,
      },
      { sequelize: database, tableName: 'users' },
    )
  }
}
