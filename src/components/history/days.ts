import type { Revision } from '#shared/contract/revisions.ts'

export interface Day {
  key: string
  title: string
  revisions: Revision[]
}

/** Revisions under the day on which they were saved, in the reader's own time. They come newest first and stay so. */
export function byDay(revisions: readonly Revision[], now: Date, locale?: string): Day[] {
  const days: Day[] = []
  for (const revision of revisions) {
    const at = new Date(revision.savedAt)
    const key = at.toDateString()
    const last = days.at(-1)
    if (last?.key === key) last.revisions.push(revision)
    else days.push({ key, title: dayWords(at, now, locale), revisions: [revision] })
  }
  return days
}

function dayWords(day: Date, now: Date, locale?: string): string {
  const yesterday = new Date(now)
  yesterday.setDate(now.getDate() - 1)
  const date = day.toLocaleDateString(locale, { dateStyle: 'long' })
  if (day.toDateString() === now.toDateString()) return `Today, ${date}`
  return day.toDateString() === yesterday.toDateString() ? `Yesterday, ${date}` : date
}

export const timeOfDay = (iso: string, locale?: string): string =>
  new Date(iso).toLocaleTimeString(locale, { timeStyle: 'short' })
