import { hoursAlong, squareAt, type PaceLine } from './trackProfile.ts'

/** Something that sets a pace: a kind of drive, or a shared link divided by the drives still reading. */
export interface Pacer<Owner> extends PaceLine {
  owner: Owner
}

export interface LockStep<Owner> {
  hours: number
  /** Hours during which each pacer was the slowest. */
  paced: Map<Owner, number>
}

/**
 * Drives that move in step from the outer to the inner track: at each position the slowest pacer that still stands there
 * sets the pace. Exact: between two events (a pacer ends, a slower one crosses) the slowest is one line.
 * Null where nothing sets a pace somewhere, or the pace is zero.
 */
export function lockStep<Owner>(pacers: readonly Pacer<Owner>[]): LockStep<Owner> | null {
  const ends = [...new Set(pacers.map((pacer) => pacer.end_TB))].filter((end) => end > 0).sort((a, b) => a - b)
  const paced = new Map<Owner, number>()
  let position = 0
  let total = 0
  for (const end of ends) {
    const standing = pacers.filter((pacer) => pacer.end_TB >= end)
    while (position < end) {
      const slowest = slowestAt(standing, position)
      if (!slowest) return null
      const next = nextCrossing(standing, slowest, position, end)
      const hours = hoursAlong(slowest, position, next)
      if (!Number.isFinite(hours)) return null
      paced.set(slowest.owner, (paced.get(slowest.owner) ?? 0) + hours)
      total += hours
      position = next
    }
  }
  return total > 0 ? { hours: total, paced } : null
}

/** Lowest line at a position; of equal ones, the one that falls fastest from there on, then the first given. */
function slowestAt<Owner>(standing: readonly Pacer<Owner>[], position: number): Pacer<Owner> | undefined {
  let slowest: Pacer<Owner> | undefined
  for (const pacer of standing) {
    if (!slowest) slowest = pacer
    else {
      const difference = squareAt(pacer, position) - squareAt(slowest, position)
      const tie = 1e-9 * Math.max(1, slowest.at0)
      if (difference < -tie || (difference <= tie && pacer.fall > slowest.fall)) slowest = pacer
    }
  }
  return slowest
}

/** Where another pacer becomes slower than this one, at the latest `end`. */
function nextCrossing<Owner>(
  standing: readonly Pacer<Owner>[],
  slowest: Pacer<Owner>,
  position: number,
  end: number,
): number {
  let next = end
  for (const pacer of standing) {
    if (pacer.fall <= slowest.fall) continue
    const crossing = (pacer.at0 - slowest.at0) / (pacer.fall - slowest.fall)
    if (crossing > position * (1 + 1e-12) && crossing < next) next = crossing
  }
  return next
}
