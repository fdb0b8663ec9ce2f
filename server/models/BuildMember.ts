import { DataTypes, Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { BuildRole } from '#shared/contract/build.ts'

/** A person's role in a build. The row's further columns are sort keys of the list, filled by the database. */
export class BuildMember extends Model<InferAttributes<BuildMember>, InferCreationAttributes<BuildMember>> {
  declare buildId: string
  declare userId: string
  declare role: BuildRole

  static define(database: Sequelize): void {
    BuildMember.init(
      {
        buildId: { type: DataTypes.UUID, primaryKey: true },
        userId: { type: DataTypes.UUID, primaryKey: true },
        role: DataTypes.TEXT,
      },
      { sequelize: database, tableName: 'build_members' },
    )
  }
}
