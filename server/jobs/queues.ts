/** What the jobs of each queue carry: ids and no more, but for what has no row of its own. */
export interface QueueData {
  /** A line of activity, whose people are to be told. */
  news: { activityId: number }
  /** A message of the mailbox, to be sent. */
  mail: { messageId: string }
  /** Somebody asked for a link to set a new password. */
  'password-reset': { email: string }
}
export type QueueName = keyof QueueData

const day_minutes = 24 * 60

/** How often and after which pauses a job is tried again. Nothing waits too long to be done: it is kept for a year. */
export const queueSettings = {
  news: { retryLimit: 12, retryDelay: 5, retryBackoff: true, retentionMinutes: 365 * day_minutes },
  mail: { retryLimit: 7, retryDelay: 60, retryBackoff: true, retentionMinutes: 365 * day_minutes },
  'password-reset': { retryLimit: 5, retryDelay: 5, retryBackoff: true, retentionMinutes: 60 },
} as const satisfies Record<QueueName, object>
