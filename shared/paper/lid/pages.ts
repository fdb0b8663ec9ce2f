import { extentOf } from '../extent.ts'
import type { Page, PageMark, PaperDocument } from '../page.ts'
import { budgetSection } from './budgetSection.ts'
import type { LidContent, PaperName } from './content.ts'
import { diagramPages, overviewPage, type DiagramInput } from './diagramPages.ts'
import { driveSection } from './driveSection.ts'
import { flow, titleStrip, type Placed } from './flow.ts'
import { firstHead, foot, foot_mm, nextHead, nextHead_mm, type Code } from './head.ts'
import { mapSection, mapWidth } from './mapSection.ts'
import { blackInks, colourInks, densities, paperSides_mm, type Look } from './style.ts'
import { twinSection } from './twin.ts'
import {
  addressSection,
  assumedSection,
  beforeSection,
  cautionSection,
  contactSection,
  feedSection,
  findingSections,
  startSection,
} from './wordSections.ts'

/** Whether the diagram goes along: in print that can be read, on one page however small, or not at all. */
export const diagramChoices = ['auto', 'pages', 'overview', 'none'] as const
/** Pages up to which `auto` prints the diagram to be read; beyond, the whole on one page. */
const mostDiagramPages = 4
export type DiagramChoice = (typeof diagramChoices)[number]

export interface LidOptions {
  paper: PaperName
  colour: boolean
  diagram: DiagramChoice
}

/** The code to scan, made from the address; null where there is none. */
export interface LidParts {
  content: LidContent
  code: Code | null
  diagram: DiagramInput
}

/** Clear of what printers cannot reach and of the tape that holds the sheet. */
export const marginOf = (paper: PaperName): number => (paper === 'a5' ? 8 : 10)

/** The lid sheet as pages in millimetres: what the screen shows, the printer prints and the PDF holds. */
export function lidPages(parts: LidParts, options: LidOptions): PaperDocument {
  const { content } = parts
  const [width_mm, height_mm] = paperSides_mm[options.paper]
  const margin = marginOf(options.paper)
  const inks = options.colour ? colourInks : blackInks
  const inner = width_mm - 2 * margin
  const bottom = height_mm - margin - foot_mm
  const head = firstHead(inks, content, parts.code, { x: margin, y: margin, width: inner })
  const next = { x: margin, width: inner, top: margin + nextHead_mm, bottom }
  const frames = { first: { ...next, top: head.bottom }, next }

  const set = densities.map((density) => {
    const look: Look = { density, inks }
    return flow(look, frames, sectionsOf(look, parts, inner))
  })
  const sheets = bestSet(set, bottom)
  sheets[0]?.unshift(...head.marks)

  const look: Look = { density: densities[1]!, inks }
  const diagrams = diagramOf(parts, options, inks, {
    x: margin,
    y: next.top + 7,
    width: inner,
    height: bottom - next.top - 7,
  })
  const bodies = [
    ...sheets.map((marks, i) => ({ title: i === 0 ? 'Lid sheet' : `Lid sheet, page ${i + 1}`, marks })),
    ...diagrams.map(({ title, marks }) => ({
      title,
      marks: [...titleStrip(look, title, inner).draw(margin, next.top), ...marks],
    })),
  ]
  const pages = bodies.map(({ title, marks }, i): Page => {
    const number = `Page ${i + 1} of ${bodies.length}`
    const top: PageMark[] = i === 0 ? [] : nextHead(inks, content, { x: margin, y: margin, width: inner })
    const below = foot(inks, content, number, { x: margin, y: bottom, width: inner })
    return { width_mm, height_mm, title, marks: [...top, ...marks, ...below] }
  })
  return { title: titleOf(content), language: 'en', pages }
}

/** Share of the first page above which nothing is gained by setting it closer. */
const full = 0.85

/** The roomiest of those that take the fewest pages and do not leave the first one half empty. */
function bestSet(set: readonly PageMark[][][], bottom: number): PageMark[][] {
  const fewest = Math.min(...set.map(({ length }) => length))
  const short = set
    .filter(({ length }) => length === fewest)
    .map((pages) => ({ pages, fill: Math.max(0, ...(pages[0] ?? []).map((mark) => extentOf(mark).bottom)) / bottom }))
  const fullest = Math.max(...short.map(({ fill }) => fill))
  const isEnough = fewest === 1 ? 0 : Math.min(full, fullest)
  return short.find(({ fill }) => fill >= isEnough)?.pages ?? []
}

const titleOf = ({ name, machine, revision }: LidContent): string =>
  `${name}${machine === '' ? '' : ` (${machine})`}, lid sheet, revision ${revision}`

function diagramOf(
  { diagram }: LidParts,
  { diagram: choice }: LidOptions,
  inks: Look['inks'],
  area: { x: number; y: number; width: number; height: number },
) {
  if (choice === 'none' || diagram.drawing.nodes.length === 0) return []
  if (choice === 'overview') return overviewPage(diagram, inks, area)
  const pages = diagramPages(diagram, inks, area)
  return choice === 'pages' || pages.length <= mostDiagramPages ? pages : overviewPage(diagram, inks, area)
}

/** What stands on the sheet, in the order in which a hand that holds it asks. */
function sectionsOf(look: Look, { content, code }: LidParts, inner: number): Placed[] {
  const isNarrow = inner < 150
  const pairs = (
    left: (width: number) => ReturnType<typeof budgetSection>,
    right: typeof left,
    share: number,
  ): Placed[] =>
    isNarrow
      ? [
          { kind: 'full', make: left },
          { kind: 'full', make: right },
        ]
      : [{ kind: 'pair', left, right, share }]
  const handling = (width: number) => [
    beforeSection(look, width),
    cautionSection(look, width),
    ...contactSection(look, content, width),
  ]
  const [only, ...others] = content.maps
  const tower = only && others.length === 0 && mapWidth(only) < inner * 0.55 ? only : undefined
  const table: Placed = { kind: 'full', make: (width) => driveSection(look, content, width) }
  const budgets = (width: number) => budgetSection(look, content, width)
  const starts = (width: number) => [startSection(look, content, width), ...feedSection(look, content, width)]
  const last: Placed[] = [
    { kind: 'full', make: (width) => findingSections(look, content, width) },
    ...pairs(
      (width) => [twinSection(look, content, code, width)],
      (width) => [...assumedSection(look, content, width), ...addressSection(look, content, width)],
      0.52,
    ),
  ]
  if (tower)
    return [
      ...pairs((width) => mapSection(look, tower, width), handling, 0.5),
      table,
      ...pairs(budgets, starts, 0.64),
      ...last,
    ]
  return [
    { kind: 'full', make: (width) => content.maps.flatMap((map) => mapSection(look, map, width)) },
    table,
    ...pairs((width) => [...budgets(width), ...starts(width)], handling, 0.64),
    ...last,
  ]
}
