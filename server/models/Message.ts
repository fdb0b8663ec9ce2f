import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'

/** A mail: queued in the transaction of its cause, sent by the mail job. The table is the local mailbox. */
export class Message extends Model<InferAttributes<Message>, InferCreationAttributes<Message>> {
  declare id: string
  declare recipient: string
  declare subject: string
  declare textBody: string
  declare htmlBody: string
  declare state: CreationOptional<'queued' | 'sent' | 'failed'>
  declare attempts: CreationOptional<number>
  declare lastError: CreationOptional<string | null>
  declare queuedAt: CreationOptional<Date>
  declare nextTryAt: CreationOptional<Date>
  declare sentAt: CreationOptional<Date | null>

  static define(database: Sequelize): void {
    Message.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true },
        recipient: DataTypes.TEXT,
        subject: DataTypes.TEXT,
        textBody: DataTypes.TEXT,
        htmlBody: DataTypes.TEXT,
        state: { type: DataTypes.TEXT, defaultValue: 'queued' },
        attempts: { type: DataTypes.INTEGER, defaultValue: 0 },
        lastError: DataTypes.TEXT,
        queuedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        nextTryAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        sentAt: DataTypes.DATE,
      },
      { sequelize: database, tableName: 'messages' },
    )
  }
}
