import type { MarginChange, WorstOfRow } from '#shared/check/compareResults.ts'
import { atMoment } from '#shared/electrical/names.ts'
import { number } from '../ledger/measure.ts'

/** "6.0 of 4.5 A at cold start", "about 11.62 V, at least 11.40, at rest"; "not there" where the row is missing. */
export function loadWords(side: WorstOfRow | null, unit: MarginChange['unit']): string {
  if (!side) return 'not there'
  const about = side.about ? 'about ' : ''
  const [load, limit] = [number(side.load, unit), number(side.limit, unit)]
  const measure = unit === 'V' ? `${load} V, at least ${limit},` : `${load} of ${limit} ${unit}`
  return `${about}${measure} ${atMoment(side.moment)}`
}

/** What is left, with its sign: "+1.5 A", "−0.4 A". */
export function marginText(side: WorstOfRow | null, unit: MarginChange['unit']): string {
  if (!side) return ''
  return `${side.margin < 0 ? '−' : '+'}${number(Math.abs(side.margin), unit)} ${unit}`
}

export type Way = 'better' | 'worse' | 'new' | 'gone'

export const wayWords: Readonly<Record<Way, string>> = {
  better: 'more left',
  worse: 'less left',
  new: 'new',
  gone: 'gone',
}

/** Which way the margin went. */
export function wayOf({ before, after }: MarginChange): Way {
  if (!before) return 'new'
  if (!after) return 'gone'
  return after.margin < before.margin ? 'worse' : 'better'
}
