import type { Migration } from '../migration.ts'
import { accounts } from './001-accounts.ts'
import { builds } from './002-builds.ts'
import { catalog } from './003-catalog.ts'
import { demoFiles } from './004-demo-files.ts'
import { links } from './005-links.ts'
import { activity } from './006-activity.ts'
import { revisions } from './007-revisions.ts'
import { sessions } from './008-sessions.ts'
import { comments } from './009-comments.ts'
import { live } from './010-live.ts'
import { mail } from './011-mail.ts'
import { rounds } from './012-rounds.ts'
import { drives } from './013-drives.ts'
import { modelPhotos } from './014-model-photos.ts'

/** Every migration in order. A migration that has shipped is never changed; add the next number. */
export const migrations: readonly Migration[] = [
  accounts,
  builds,
  catalog,
  demoFiles,
  links,
  activity,
  revisions,
  sessions,
  comments,
  live,
  mail,
  rounds,
  drives,
  modelPhotos,
]
