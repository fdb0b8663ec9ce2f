import type { DataResult, SharedLink } from '../datapath/result.ts'

/** Share of the scan above which a slow link is worth a caution, and below which it is not worth a word. */
export const slowShare = { caution: 0.1, note: 0.01 } as const

export interface HoursLost {
  hours: number
  alone_hours: number
  lost_hours: number
  /** Lost hours as a share of what the drives alone take. */
  share: number
}

/** What one shared link alone costs a full scan; null where no scan can be computed. */
export function hoursLost(data: DataResult, link: SharedLink): HoursLost | null {
  const alone_hours = data.scan.drivesAlone_hours
  const hours = data.hoursWithOnly(link)
  if (alone_hours === null || hours === null || alone_hours <= 0) return null
  const lost_hours = hours - alone_hours
  return { hours, alone_hours, lost_hours, share: lost_hours / alone_hours }
}
