import type { MailTiming } from '#shared/contract/mailChoices.ts'

const day_ms = 86_400_000
/** Hour (UTC) at which digests are made. */
const hour = 6
const monday = 1

/** The next time a digest is due after `now`: each day, or each Monday. Who wants none is looked at weekly all the same. */
export function nextDigest(timing: MailTiming, now: Date): Date {
  const next = new Date(Date.UTC(now.getUTCFullYear(), now.getUTCMonth(), now.getUTCDate(), hour))
  if (next <= now) next.setTime(next.getTime() + day_ms)
  if (timing !== 'daily') while (next.getUTCDay() !== monday) next.setTime(next.getTime() + day_ms)
  return next
}
