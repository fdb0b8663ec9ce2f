import type { Transaction } from 'sequelize'
import type { MailTransport } from '../mail/transport.ts'
import type { Context } from '../services/context.ts'
import { sendDigests } from '../services/digestService.ts'
import { tellNews } from '../services/newsService.ts'
import { answerPasswordReset } from '../services/passwordResetService.ts'
import { checkBuilds } from './checkBuilds.ts'
import { cleanUp } from './cleanUp.ts'
import type { Job } from './jobLoop.ts'
import { workOff, type Worker } from './queue.ts'
import { sendMail } from './sendMail.ts'

/** A job that is done once its work does not throw. */
const doing = <Data>(work: (data: Data, transaction: Transaction) => Promise<void>): Worker<Data> => ({
  async work(data, transaction) {
    await work(data, transaction)
    return null
  },
})

/** What jobs need of the context; it is made before the loop that runs them. */
export type JobContext = Omit<Context, 'jobs' | 'live'>

/** Everything that is done behind the requests, by name. */
export function allJobs(context: JobContext, transport: MailTransport): Readonly<Record<string, Job>> {
  const { database, log } = context
  return {
    'answer password resets': workOff(
      database,
      'password-reset',
      doing(({ email }, transaction) => answerPasswordReset(context, email, transaction)),
      log,
    ),
    'tell news': workOff(
      database,
      'news',
      doing(({ activityId }, transaction) => tellNews(context, activityId, transaction)),
      log,
    ),
    'send digests': sendDigests(context),
    'send mail': workOff(
      database,
      'mail',
      sendMail(database, transport, () => context.publicUrl),
      log,
    ),
    'check builds': checkBuilds(context),
    'clean up': cleanUp(database),
  }
}
