/**
 * How fast a drive reads at a position, and how long a pace takes over a stretch of capacity.
 *
 * A platter turns at constant speed, so the rate follows the track's radius and the capacity passed follows the area:
 * at the share u of the capacity, counted from the outer track, rate(u)^2 = outer^2 - u (outer^2 - inner^2). The mean
 * over the whole drive is then (outer + inner) / 2, the equal time per track rule. Solid-state drives have
 * inner = outer. The square of every pace is a straight line over the position, so the slowest of many is a chain of
 * lines and integrates exactly.
 */
export interface PaceLine {
  /** Square of the rate at position 0, (MB/s)^2. */
  at0: number
  /** Fall of the square per TB. */
  fall: number
  /** Position up to which the line stands, TB. */
  end_TB: number
}

export function driveLine(capacity_TB: number, outer_MBps: number, inner_MBps: number): PaceLine {
  const fall = capacity_TB > 0 ? (outer_MBps ** 2 - inner_MBps ** 2) / capacity_TB : 0
  return { at0: outer_MBps ** 2, fall, end_TB: capacity_TB }
}

export function capLine(rate_MBps: number, end_TB: number): PaceLine {
  return { at0: rate_MBps ** 2, fall: 0, end_TB }
}

export const squareAt = (line: PaceLine, position_TB: number): number => line.at0 - line.fall * position_TB

/** Hours from one position to another along one line: the integral of dx / rate(x), with 1 TB = 1e6 MB. */
export function hoursAlong(line: PaceLine, from_TB: number, to_TB: number): number {
  const start = Math.sqrt(Math.max(0, squareAt(line, from_TB)))
  const stop = Math.sqrt(Math.max(0, squareAt(line, to_TB)))
  const mean_MBps = (start + stop) / 2
  return mean_MBps > 0 ? ((to_TB - from_TB) * 1e6) / mean_MBps / 3600 : Infinity
}
