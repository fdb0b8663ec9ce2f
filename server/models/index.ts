import type { Sequelize } from 'sequelize'
import { Build } from './Build.ts'
import { BuildLink } from './BuildLink.ts'
import { BuildMember } from './BuildMember.ts'
import { BuildRevision } from './BuildRevision.ts'
import { CatalogRevision } from './CatalogRevision.ts'
import { Guest } from './Guest.ts'
import { Invitation } from './Invitation.ts'
import { Message } from './Message.ts'
import { ModelPhoto } from './ModelPhoto.ts'
import { OwnModel } from './OwnModel.ts'
import { PasswordReset } from './PasswordReset.ts'
import { RefreshToken } from './RefreshToken.ts'
import { Session } from './Session.ts'
import { User } from './User.ts'

const models = [
  User,
  Session,
  RefreshToken,
  PasswordReset,
  Message,
  Build,
  BuildRevision,
  BuildMember,
  BuildLink,
  Guest,
  Invitation,
  CatalogRevision,
  OwnModel,
  ModelPhoto,
]

/** Binds every model to a database. */
export function initModels(database: Sequelize): void {
  for (const model of models) model.define(database)
}

export {
  Build,
  BuildLink,
  BuildMember,
  BuildRevision,
  CatalogRevision,
  Guest,
  Invitation,
  Message,
  ModelPhoto,
  OwnModel,
  PasswordReset,
  RefreshToken,
  Session,
  User,
}
