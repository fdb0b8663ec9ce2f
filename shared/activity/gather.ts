import type { Activity, Author } from '../contract/activity.ts'
import { activitySentence, authorWords } from './words.ts'

/** One line as it is shown: a thing that happened, or several saves in a row by one person. */
export interface ActivityLine {
  /** The newest one in it. */
  newest: Activity
  oldest: Activity
  saves: number
}

const idOf = (by: Author): string => (by.kind === 'member' ? by.userId : by.kind === 'guest' ? by.guestId : 'former')

/** Gathers the saves that one person made in a row. The list goes from the newest to the oldest. */
export function gatherActivity(items: readonly Activity[]): ActivityLine[] {
  const lines: ActivityLine[] = []
  for (const item of items) {
    const last = lines.at(-1)
    const joins =
      last !== undefined &&
      item.what.kind === 'revision-saved' &&
      last.newest.what.kind === 'revision-saved' &&
      idOf(item.by) === idOf(last.newest.by)
    if (joins) lines[lines.length - 1] = { ...last, oldest: item, saves: last.saves + 1 }
    else lines.push({ newest: item, oldest: item, saves: item.what.kind === 'revision-saved' ? 1 : 0 })
  }
  return lines
}

/** A gathered line in words. */
export function lineSentence({ newest, oldest, saves }: ActivityLine): string {
  if (saves < 2 || newest.what.kind !== 'revision-saved' || oldest.what.kind !== 'revision-saved')
    return activitySentence(newest.by, newest.what)
  const { revision, label } = newest.what
  return `${authorWords(newest.by)} saved revisions ${oldest.what.revision} to ${revision}, last: ${label}`
}
