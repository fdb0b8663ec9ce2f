import type { Severity } from '../check/severity.ts'

export interface RunEnd {
  x: number
  y: number
  side: 'left' | 'right'
}

/** A run in absolute places: both ends and the points that lead it past columns. */
export interface RunCourse {
  from: RunEnd
  to: RunEnd
  via?: readonly { x: number; y: number }[]
  /** Where it turns in each gap. */
  bends?: readonly (number | undefined)[]
}

interface Cubic {
  x0: number
  y0: number
  x1: number
  y1: number
  x2: number
  y2: number
  x3: number
  y3: number
}

/** A gap narrower than this holds no amperes. */
const labelRoom = 72

/** The stretches of a run: curves in the gaps between columns (even places), lanes past columns (odd places). */
function stretches({ from, to, via = [], bends = [] }: RunCourse): Cubic[] {
  const heading = from.side === 'right' ? 1 : -1
  const points = [from, ...via, to]
  return points.slice(1).map((point, i) => {
    const start = points[i] ?? point
    const starts = heading
    const ends = i === points.length - 2 && via.length === 0 ? (to.side === 'left' ? 1 : -1) : heading
    const distance = Math.abs(point.x - start.x)
    const forward = (point.x - start.x) * heading > 0
    const pull = forward ? distance / 2 : Math.max(48, Math.min(160, distance / 2 + Math.abs(point.y - start.y) / 4))
    const bend = i % 2 === 0 ? bends[i / 2] : undefined
    return {
      x0: start.x,
      y0: start.y,
      x1: bend ?? start.x + starts * pull,
      y1: start.y,
      x2: bend ?? point.x - ends * pull,
      y2: point.y,
      x3: point.x,
      y3: point.y,
    }
  })
}

const round = (value: number): number => Math.round(value * 10) / 10

/** The `d` of a run: calm curves that leave and arrive level, straight wherever both ends are. */
export function runPath(course: RunCourse): string {
  const { from } = course
  let d = `M${round(from.x)} ${round(from.y)}`
  for (const { y0, x1, y1, x2, y2, x3, y3 } of stretches(course))
    d +=
      y0 === y3 && (x3 - x1) * (x2 - x1) >= 0
        ? `H${round(x3)}`
        : `C${round(x1)} ${round(y1)} ${round(x2)} ${round(y2)} ${round(x3)} ${round(y3)}`
  return d
}

/**
 * Where the amperes stand: on the last gap that has room for them, counted from `from`, so that the numbers of runs
 * to neighbouring bays stand in one column. `t` moves the place along that gap, from 0 to 1.
 */
export function labelPoint(course: RunCourse, t = 0.5): { x: number; y: number } {
  const all = stretches(course)
  const gaps = all.filter((_, i) => i % 2 === 0)
  const roomy = gaps.filter(({ x0, x3 }) => Math.abs(x3 - x0) >= labelRoom)
  return pointOn(roomy.at(-1) ?? gaps.at(-1) ?? all[0], t)
}

function pointOn(cubic: Cubic | undefined, t: number): { x: number; y: number } {
  if (!cubic) return { x: 0, y: 0 }
  const u = 1 - t
  const blend = (a: number, b: number, c: number, d: number) =>
    u * u * u * a + 3 * u * u * t * b + 3 * u * t * t * c + t * t * t * d
  return {
    x: round(blend(cubic.x0, cubic.x1, cubic.x2, cubic.x3)),
    y: round(blend(cubic.y0, cubic.y1, cubic.y2, cubic.y3)),
  }
}

/** Stroke width of a data run. */
export const dataWidth = 1.25

/** Stroke width of a power run by the current in it: half a pixel an ampere above a thin line, within bounds. */
export function runWidth(current_A: number | null | undefined): number {
  if (current_A === null || current_A === undefined || !Number.isFinite(current_A)) return 1.5
  return Math.min(9, Math.round((1.5 + 0.5 * Math.abs(current_A)) * 4) / 4)
}

/** How a run tells its strain without colour: caution is a thick run, fault and danger a broken one. */
export interface RunStroke {
  width: number
  dash?: string
}

export function runStroke(width: number, severity: Severity | null): RunStroke {
  if (severity === 'caution') return { width: width + 2.5 }
  if (severity === 'fault' || severity === 'danger') return { width: Math.max(width, 3), dash: '12 5' }
  return { width }
}
