import { accountRoutes } from './accounts.ts'
import { buildLinkRoutes } from './buildLinks.ts'
import { buildRoutes } from './builds.ts'
import { catalogRoutes } from './catalog.ts'
import { checkRoutes } from './checks.ts'
import { commentRoutes } from './comments.ts'
import { driveRoutes } from './drives.ts'
import { healthRoutes } from './health.ts'
import { invitationRoutes } from './invitations.ts'
import { labelRoutes } from './labels.ts'
import { lidSheetRoutes } from './lidSheets.ts'
import { liveRoutes } from './live.ts'
import { mailboxRoutes } from './mailbox.ts'
import { mailChoiceRoutes } from './mailChoices.ts'
import { memberRoutes } from './members.ts'
import { openApiRoute } from './openApi.ts'
import { ownModelRoutes } from './ownModels.ts'
import { revisionRoutes } from './revisions.ts'
import type { AnyRoute } from './route.ts'
import { roundRoutes } from './rounds.ts'
import { sessionRoutes } from './sessions.ts'
import { userRoutes } from './users.ts'

const resources: readonly AnyRoute[] = [
  ...healthRoutes,
  ...sessionRoutes,
  ...accountRoutes,
  ...userRoutes,
  ...mailboxRoutes,
  ...mailChoiceRoutes,
  ...buildRoutes,
  ...revisionRoutes,
  ...commentRoutes,
  ...memberRoutes,
  ...invitationRoutes,
  ...buildLinkRoutes,
  ...roundRoutes,
  ...labelRoutes,
  ...lidSheetRoutes,
  ...liveRoutes,
  ...driveRoutes,
  ...catalogRoutes,
  ...ownModelRoutes,
  ...checkRoutes,
]

/** The whole route table. What is not in it does not exist. */
export const routes: readonly AnyRoute[] = [...resources, openApiRoute(resources)]
