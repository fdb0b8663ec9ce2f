import { courseFinder } from '../../layout/course.ts'
import type { Drawing, DrawnRun } from '../../layout/drawing.ts'
import { dataWidth, labelPoint, runPath, runStroke, runWidth, type RunCourse } from '../../layout/route.ts'
import type { Severity } from '../../check/severity.ts'
import { box, element, group, text } from '../svg.ts'
import { textWidth } from '../text/textWidth.ts'
import { palette, severityColour } from './palette.ts'
import { flowWords, type Reading } from './reading.ts'
import { occupancy } from './occupancy.ts'

/** Cable runs, the strained ones last so that nothing covers them. */
export function drawRuns(drawing: Drawing, reading: Reading): string {
  const courseOf = courseFinder(drawing)
  const drawn = drawing.runs.map((run) => {
    const severity = strainOf(run, reading)
    const course = courseOf(run)
    return { rank: severity === null ? 0 : 1, markup: course ? drawRun(run, course, severity, reading) : '' }
  })
  drawn.sort((a, b) => a.rank - b.rank)
  return group(
    { fill: 'none', 'stroke-linecap': 'butt' },
    drawn.map(({ markup }) => markup),
  )
}

/** Notes do not change how a run looks. */
function strainOf(run: DrawnRun, reading: Reading): Severity | null {
  const severity = reading.jointSeverity(run.joint)
  return severity === undefined || severity === 'note' ? null : severity
}

function drawRun(run: DrawnRun, course: RunCourse, severity: Severity | null, reading: Reading): string {
  const d = runPath(course)
  const width = run.carries === 'power' ? runWidth(reading.flow(run.joint)?.current_A) : dataWidth
  const stroke = runStroke(width, severity)
  const colour = severity ? severityColour[severity] : run.carries === 'power' ? palette.run : palette.soft
  const line = element('path', {
    d,
    stroke: colour,
    'stroke-width': stroke.width,
    'stroke-dasharray': stroke.dash,
  })
  if (run.carries === 'data') return line
  // A casing in the colour of the paper lets the eye follow a run through a crossing.
  const casing =
    run.kind === 'seat' ? '' : element('path', { d, stroke: palette.paper, 'stroke-width': stroke.width + 4 })
  if (severity === null || severity === 'caution') return casing + line
  const glow = element('path', { d, stroke: colour, 'stroke-width': stroke.width + 8, 'stroke-opacity': 0.14 })
  return casing + glow + line
}

/** Places along the gap that a number is tried at, nearest the middle first. */
const tries = [0.5, 0.6, 0.4, 0.7, 0.3, 0.8, 0.2, 0.9, 0.1]

/** Connectors stand out from the edges of their tags. */
const markRoom = 5

/** Amperes on the power runs. A number that finds no free place is left out rather than laid over another. */
export function drawAmperes(drawing: Drawing, reading: Reading): string {
  const courseOf = courseFinder(drawing)
  const taken = occupancy()
  for (const { kind, x, y, width, height } of drawing.nodes)
    if (kind === 'part' || kind === 'stub') taken.add({ x: x - markRoom, y, width: width + 2 * markRoom, height })
  const power = drawing.runs.filter((run) => run.carries === 'power' && run.kind === 'joint')
  const ranked = power.map((run) => ({ run, severity: strainOf(run, reading) }))
  ranked.sort((a, b) => Number(b.severity !== null) - Number(a.severity !== null))
  return group(
    {},
    ranked.map(({ run, severity }) => {
      const flow = reading.flow(run.joint)
      const course = courseOf(run)
      if (!flow || !course) return ''
      const words = flowWords(flow)
      const width = Math.ceil(textWidth(words, 11, 600)) + 12
      for (const t of tries) {
        const { x, y } = labelPoint(course, t)
        const area = { x: x - width / 2, y: y - 8.5, width, height: 17 }
        if (!taken.isFree(area)) continue
        taken.add(area)
        return pill(area, words, severity)
      }
      return ''
    }),
  )
}

interface Area {
  x: number
  y: number
  width: number
  height: number
}

function pill({ x, y, width, height }: Area, words: string, severity: Severity | null): string {
  const colour = severity ? severityColour[severity] : palette.ink
  return (
    box(x, y, width, height, {
      fill: palette.card,
      stroke: severity ? colour : palette.hairline,
      strokeWidth: 1,
      radius: 8.5,
    }) + text(x + width / 2, y + 12.5, words, { size: 11, weight: 600, fill: colour, anchor: 'middle' })
  )
}
