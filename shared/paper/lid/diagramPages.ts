import type { ResolvedBuild } from '../../build/resolve.ts'
import type { CheckResult, MomentId } from '../../check/result.ts'
import type { Drawing } from '../../layout/drawing.ts'
import { drawDiagram } from '../diagram/flat.ts'
import { palette } from '../diagram/palette.ts'
import { readResult } from '../diagram/reading.ts'
import { extentOf, touches, type Extent } from '../extent.ts'
import { pt_mm, type PageMark } from '../page.ts'
import { moved } from '../place.ts'
import { svgMarks } from '../svgMarks.ts'
import { cutsOf, type Span } from './cuts.ts'
import { smallest_pt, type Inks } from './style.ts'

export interface DiagramInput {
  build: ResolvedBuild
  drawing: Drawing
  result: CheckResult
  moment: MomentId
}

/** A piece of the diagram for one page. */
export interface DiagramPage {
  title: string
  marks: PageMark[]
}

interface Area {
  x: number
  y: number
  width: number
  height: number
}

/** The smallest print of the diagram, in its own units, and the scale at which it can just be read. */
const smallestPrint = 10.5
const readable = (smallest_pt * pt_mm) / smallestPrint
const largest = 0.3

/** The whole diagram on one page, however small it gets. */
export function overviewPage(input: DiagramInput, inks: Inks, area: Area): DiagramPage[] {
  const { bounds } = withRoom(input)
  const scale = Math.min(largest, area.width / bounds.width, area.height / bounds.height)
  const isSmall = scale < readable
  const placing = { scale, dx: area.x - bounds.x * scale, dy: area.y - bounds.y * scale }
  return [
    {
      title: isSmall ? 'Diagram, overview in small print: the tables say the same in words' : 'Diagram',
      marks: svgMarks(markupOf(input), placing, inkOf(inks)),
    },
  ]
}

/** The diagram in print that can be read, on as many pages as that takes, cut where least is cut. */
export function diagramPages(input: DiagramInput, inks: Inks, area: Area): DiagramPage[] {
  const { bounds } = withRoom(input)
  const fit = Math.min(largest, area.width / bounds.width, area.height / bounds.height)
  if (fit >= readable) return overviewPage(input, inks, area)

  const marks = svgMarks(markupOf(input), { scale: readable, dx: 0, dy: 0 }, inkOf(inks))
  const nodes = input.drawing.nodes.filter(({ kind }) => kind !== 'case' && kind !== 'backplane')
  const texts = marks.filter((mark) => mark.kind === 'text' || isPill(mark)).map(extentOf)
  const across = [
    ...nodes.map(({ x, width }): Span => [x * readable, (x + width) * readable]),
    ...texts.map(({ left, right }): Span => [left, right]),
  ]
  const down = [
    ...nodes.map(({ y, height }): Span => [y * readable, (y + height) * readable]),
    ...texts.map(({ top, bottom }): Span => [top, bottom]),
  ]
  const columns = cutsOf([bounds.x * readable, (bounds.x + bounds.width) * readable], across, area.width)
  const rows = cutsOf([bounds.y * readable, (bounds.y + bounds.height) * readable], down, area.height)

  const many = (columns.length - 1) * (rows.length - 1)
  return rows.slice(0, -1).flatMap((top, row) =>
    columns.slice(0, -1).flatMap((left, column): DiagramPage[] => {
      const tile = { x: left, y: top, width: columns[column + 1]! - left, height: rows[row + 1]! - top }
      const sheet = row * (columns.length - 1) + column + 1
      const title = `Diagram, sheet ${sheet} of ${many}: row ${row + 1}, column ${column + 1}`
      const { shapes, texts: words } = tileMarks(marks, tile, area)
      // Runs that only pass need no sheet of their own.
      if (words.length === 0) return []
      const { width, height } = tile
      return [{ title, marks: [{ kind: 'window', x: area.x, y: area.y, width, height, marks: shapes }, ...words] }]
    }),
  )
}

/** The frame of a number on a run. */
const isPill = (mark: PageMark): boolean =>
  mark.kind === 'box' && mark.width < 80 * readable && mark.height < 24 * readable

/** Words at open ends stand out beyond the arrangement. */
function withRoom({ drawing }: DiagramInput) {
  const { bounds } = drawing
  const side = drawing.nodes.some(({ kind }) => kind === 'part') ? 16 : 120
  return {
    bounds: { x: bounds.x - side, y: bounds.y - 14, width: bounds.width + 2 * side, height: bounds.height + 28 },
  }
}

const markupOf = ({ build, drawing, result, moment }: DiagramInput): string =>
  drawDiagram(build, drawing, readResult(build, result, moment)).join('')

/** The colours of the screen's light sheet as inks on white. */
function inkOf(inks: Inks): (colour: string) => string {
  const table: Readonly<Record<string, string>> = {
    [palette.paper]: '#ffffff',
    [palette.card]: '#ffffff',
    [palette.frame]: '#ffffff',
    [palette.ink]: inks.ink,
    [palette.soft]: inks.soft,
    [palette.hairline]: inks.hairline,
    [palette.run]: inks.soft,
    [palette.accent]: inks.accent,
    [palette.danger]: inks.danger,
    [palette.caution]: inks.caution,
  }
  return (colour) => table[colour] ?? colour
}

/** What of the drawing lies in a tile, moved to where it stands on the page. Text is never cut: it stands on top. */
function tileMarks(marks: readonly PageMark[], tile: Area, area: Area) {
  const here = { left: tile.x, top: tile.y, right: tile.x + tile.width, bottom: tile.y + tile.height }
  const shapes: PageMark[] = []
  const texts: PageMark[] = []
  for (const mark of marks) {
    const extent = extentOf(mark)
    if (!touches(extent, here)) continue
    const shifted = moved(mark, area.x - tile.x, area.y - tile.y)
    if (mark.kind !== 'text') shapes.push(shifted)
    else if (isIn((extent.left + extent.right) / 2, (extent.top + extent.bottom) / 2, here)) texts.push(shifted)
  }
  return { shapes, texts }
}

const isIn = (x: number, y: number, { left, top, right, bottom }: Extent): boolean =>
  x >= left && x < right && y >= top && y < bottom
