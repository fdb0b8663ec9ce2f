import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize'
import type { Message as MessageView, MessageKind } from '#shared/contract/mailbox.ts'

/** A mail: queued in the transaction of its cause, sent by the mail job. The table is the local mailbox. */
export class Message extends Model<InferAttributes<Message>, InferCreationAttributes<Message>> {
  declare id: string
  declare recipient: string
  declare kind: CreationOptional<MessageKind>
  declare subject: string
  declare textBody: string
  declare htmlBody: string
  declare state: CreationOptional<MessageView['state']>
  declare attempts: CreationOptional<number>
  declare lastError: CreationOptional<string | null>
  declare queuedAt: CreationOptional<Date>
  declare nextTryAt: CreationOptional<Date>
  declare sentAt: CreationOptional<Date | null>
  /** The person it is for, and the build and line of activity it is about, where there are such. */
  declare userId: CreationOptional<string | null>
  declare buildId: CreationOptional<string | null>
  declare activityId: CreationOptional<number | null>
  declare unsubscribeToken: CreationOptional<string | null>

  static define(database: Sequelize): void {
    Message.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true },
        recipient: DataTypes.TEXT,
        kind: { type: DataTypes.TEXT, defaultValue: 'other' },
        subject: DataTypes.TEXT,
        textBody: DataTypes.TEXT,
        htmlBody: DataTypes.TEXT,
        state: { type: DataTypes.TEXT, defaultValue: 'queued' },
        attempts: { type: DataTypes.INTEGER, defaultValue: 0 },
        lastError: DataTypes.TEXT,
        queuedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        nextTryAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
        sentAt: DataTypes.DATE,
        userId: DataTypes.UUID,
        buildId: DataTypes.UUID,
        activityId: DataTypes.BIGINT,
        unsubscribeToken: DataTypes.TEXT,
      },
      { sequelize: database, tableName: 'messages' },
    )
  }
}
