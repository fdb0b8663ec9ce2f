import { useNow } from '@vueuse/core'

const day_ms = 86_400_000
const steps: readonly [Intl.RelativeTimeFormatUnit, number][] = [
  ['day', day_ms],
  ['hour', 3_600_000],
  ['minute', 60_000],
]

/** "3 hours ago" for the last week, the date before that. */
export function relativeTime(iso: string, now: number, locale?: string): string {
  const gone_ms = now - Date.parse(iso)
  if (gone_ms > 7 * day_ms) return new Date(iso).toLocaleDateString(locale, { dateStyle: 'medium' })
  const step = steps.find(([, length_ms]) => gone_ms >= length_ms)
  if (!step) return 'just now'
  const [unit, length_ms] = step
  return new Intl.RelativeTimeFormat(locale, { numeric: 'auto' }).format(-Math.floor(gone_ms / length_ms), unit)
}

export const fullTime = (iso: string, locale?: string): string =>
  new Date(iso).toLocaleString(locale, { dateStyle: 'medium', timeStyle: 'short' })

/** Times in words that stay true while the page is open. */
export function useWhen() {
  const now = useNow({ interval: 30_000 })
  return { when: (iso: string) => relativeTime(iso, now.value.getTime()), fullTime }
}
