import type { JointFlow } from '#shared/check/result.ts'
import type { Severity } from '#shared/check/severity.ts'
import type { Drawing } from '#shared/layout/drawing.ts'
import { labelPoint } from '#shared/layout/route.ts'
import { occupancy } from '#shared/paper/diagram/occupancy.ts'
import { ampereWords, currentOf, type RailView } from './amperes.ts'
import type { CanvasRun } from './runs.ts'

/** Amperes beside a run. */
export interface AmpereLabel {
  id: string
  joint: string
  text: string
  x: number
  y: number
  width: number
  severity: Severity | null
  /** Shown at any zoom: strained, or among the large ones. */
  matters: boolean
}

/** Places along the last gap that a number is tried at, nearest the middle first. */
const tries = [0.5, 0.6, 0.4, 0.7, 0.3, 0.8, 0.2]
/** From here on a current is worth reading from afar. */
const large_A = 3.5

/** Numbers for the power runs of a drawing; one that finds no free place is left to pointing at its run. */
export function ampereLabels(
  drawing: Drawing,
  runs: readonly CanvasRun[],
  flows: ReadonlyMap<string, JointFlow>,
  marks: ReadonlyMap<string, Severity>,
  view: RailView,
): AmpereLabel[] {
  const taken = occupancy()
  for (const { kind, x, y, width, height } of drawing.nodes)
    if (kind === 'part' || kind === 'stub') taken.add({ x, y, width, height })
  const power = runs.filter((run) => run.carries === 'power' && run.kind === 'joint' && run.joint !== undefined)
  const ranked = power
    .map((run) => ({
      run,
      severity: marks.get(run.joint ?? '') ?? null,
      current: currentOf(flows.get(run.joint ?? ''), view),
    }))
    .sort((a, b) => Number(b.severity !== null) - Number(a.severity !== null))
  return ranked.flatMap(({ run, severity, current }): AmpereLabel[] => {
    if (!current) return []
    const text = ampereWords(current, view)
    const width = Math.ceil(text.length * 6.1) + 12
    for (const t of tries) {
      const { x, y } = labelPoint(run.course, t)
      const area = { x: x - width / 2, y: y - 8.5, width, height: 17 }
      if (!taken.isFree(area)) continue
      taken.add(area)
      const matters = severity !== null || current.amperes >= large_A
      return [{ id: run.id, joint: run.joint ?? '', text, x, y, width, severity, matters }]
    }
    return []
  })
}
