import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'
import type { Severity } from '#shared/check/severity.ts'

/** A build: its newest revision's number and what the list shows of it. The documents are in `BuildRevision`. */
export class Build extends Model<InferAttributes<Build>, InferCreationAttributes<Build>> {
  declare id: string
  declare name: string
  declare machine: string | null
  declare revision: number
  declare parts: number
  declare drives: number
  declare worst: CreationOptional<Severity | null>
  declare dangers: CreationOptional<number>
  declare faults: CreationOptional<number>
  declare cautions: CreationOptional<number>
  declare notes: CreationOptional<number>
  /** Revision that the worst finding and the counts belong to. */
  declare checkedRevision: CreationOptional<number>
  /** Revision that the checker broke off at, so that it is not tried without end. */
  declare checkFailedRevision: CreationOptional<number>
  declare createdAt: CreationOptional<Date>
  declare changedAt: CreationOptional<Date>
  declare changedBy: string | null
  declare archivedAt: CreationOptional<Date | null>
  declare demoExample: CreationOptional<string | null>
  /** Hash of the document that the demo wrote last: another hash means that somebody edited it. */
  declare demoHash: CreationOptional<string | null>
  /** Hash of the example as it lies in its file. */
  declare demoFileHash: CreationOptional<string | null>

  static define(database: Sequelize): void {
    Build.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true },
        name: DataTypes.TEXT,
        machine: DataTypes.TEXT,
        revision: DataTypes.INTEGER,
        parts: DataTypes.INTEGER,
        drives: DataTypes.INTEGER,
        worst: DataTypes.TEXT,
        dangers: { type: DataTypes.INTEGER, defaultValue: 0 },
        faults: { type: DataTypes.INTEGER, defaultValue: 0 },
        cautions: { type: DataTypes.INTEGER, defaultValue: 0 },
        notes: { type: DataTypes.INTEGER, defaultValue: 0 },
        checkedRevision: { type: DataTypes.INTEGER, defaultValue: 0 },
        checkFailedRevision: { type: DataTypes.INTEGER, defaultValue: 0 },
        createdAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        changedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        changedBy: DataTypes.UUID,
        archivedAt: DataTypes.DATE,
        demoExample: DataTypes.TEXT,
        demoHash: DataTypes.TEXT,
        demoFileHash: DataTypes.TEXT,
      },
      { sequelize: database, tableName: 'builds' },
    )
  }
}
