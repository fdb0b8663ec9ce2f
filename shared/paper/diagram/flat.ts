import type { BuildDocument } from '../../build/document.ts'
import type { ResolvedBuild } from '../../build/resolve.ts'
import type { CheckResult, MomentId } from '../../check/result.ts'
import type { Drawing, DrawnNode } from '../../layout/drawing.ts'
import { box, element, escapeXml, group, line, text } from '../svg.ts'
import { wrapText } from '../text/textWidth.ts'
import { drawBackplane, drawCages, drawCase, drawEmptyBay, drawRow } from './bays.ts'
import type { Block } from './block.ts'
import { findingsBlock } from './findingsBlock.ts'
import { flow } from './flow.ts'
import { frontBlock } from './frontBlock.ts'
import { legend } from './legend.ts'
import { severityShape } from './marks.ts'
import { palette } from './palette.ts'
import { partsBlock } from './partsBlock.ts'
import { readResult, type Reading } from './reading.ts'
import { drawAmperes, drawRuns } from './runs.ts'
import { sheetSize, type PaperSize } from './sheet.ts'
import { drawStub, drawTag } from './tags.ts'
import { titleBlock, withinLimits } from './titleBlock.ts'

export interface FlatInput {
  document: BuildDocument
  build: ResolvedBuild
  drawing: Drawing
  result: CheckResult
  /** Moment whose amperes stand on the runs. */
  moment: MomentId
  revision: string | number
  /** As it shall be printed. */
  date: string
  /** State of review in words, as "approved in round 2". */
  checked?: string
  /** Who approved which revision, and whether that still holds: a line of its own in the title block. */
  approval?: string
  /** Fits the sheet to a page; without, the picture is as large as the drawing. */
  paper?: PaperSize
  /** `@font-face` rules that carry Noto Sans with them, so that the picture looks the same everywhere. */
  fontCss?: string
}

const margin = 40
const leastWidth = 1240

/**
 * The whole diagram as one self-contained SVG: light ground, every part and run, amperes at the chosen moment,
 * findings, legend, parts and title block. Pure text: the same input gives the same picture.
 */
export function flatDiagram(input: FlatInput): string {
  const { document, build, drawing, result, moment } = input
  const reading = readResult(build, result, moment)
  const { bounds } = drawing
  const inner = Math.max(bounds.width + 2 * sideRoom(build, drawing), leastWidth - 2 * margin)
  const momentLabel = result.moments.find((one) => one.moment === moment)?.label ?? moment
  const title = header(input, momentLabel, inner)
  const band = flow(lowerBand(input, reading, momentLabel, inner), inner, bandGap)

  const diagramTop = margin + title.height + 32
  const bandTop = diagramTop + bounds.height + 56
  const width = inner + 2 * margin
  const height = bandTop + band.height + 20 + cautionHeight + margin
  const dx = margin + (inner - bounds.width) / 2 - bounds.x
  const dy = diagramTop - bounds.y

  const content = [
    title.draw(margin, margin),
    group({ transform: `translate(${dx} ${dy})` }, drawDiagram(build, drawing, reading)),
    line(margin, bandTop - 24, width - margin, bandTop - 24, palette.hairline),
    band.draw(margin, bandTop),
    cautions(margin, height - margin - cautionHeight, inner),
  ]
  return sheet(document.name, width, height, content, input)
}

/** Room on both sides for words at open ends that stick out. */
function sideRoom(build: ResolvedBuild, drawing: Drawing): number {
  const hasLooms = drawing.nodes.some((node) => node.kind === 'part')
  return hasLooms || build.parts.length === 0 ? 8 : 120
}

function sheet(name: string, width: number, height: number, content: readonly string[], input: FlatInput): string {
  const page = input.paper && sheetSize(input.paper, width, height)
  const view = page?.view ?? { x: 0, y: 0, width, height }
  const attributes = {
    xmlns: 'http://www.w3.org/2000/svg',
    width: page ? `${page.width_mm}mm` : Math.ceil(width),
    height: page ? `${page.height_mm}mm` : Math.ceil(height),
    viewBox: `${view.x} ${view.y} ${Math.ceil(view.width)} ${Math.ceil(view.height)}`,
    'font-family': "'Noto Sans', sans-serif",
    role: 'img',
  }
  const style = input.fontCss ? element('style', {}, escapeXml(input.fontCss)) : ''
  return element(
    'svg',
    attributes,
    [
      element('title', {}, escapeXml(`${name}, wiring diagram, revision ${input.revision}`)),
      style,
      box(view.x, view.y, Math.ceil(view.width), Math.ceil(view.height), { fill: palette.paper }),
      ...content,
    ].join(''),
  )
}

/** The diagram alone, in the units of its arrangement. */
export function drawDiagram(build: ResolvedBuild, drawing: Drawing, reading: Reading): string[] {
  const of = (kind: DrawnNode['kind']) => drawing.nodes.filter((node) => node.kind === kind)
  const cases = of('case')
  const frames = [...cases, ...of('backplane')]
  const frameOf = (row: DrawnNode) =>
    frames.find(
      (frame) =>
        row.x >= frame.x &&
        row.y >= frame.y &&
        row.x + row.width <= frame.x + frame.width &&
        row.y + row.height <= frame.y + frame.height,
    )
  const seats = { ...drawing, runs: drawing.runs.filter((run) => run.kind === 'seat') }
  const looms = { ...drawing, runs: drawing.runs.filter((run) => run.kind !== 'seat') }
  return [
    ...cases.map((node) => drawCase(node, build)),
    ...of('backplane').map((node) => drawBackplane(node, build, reading)),
    ...cases.map(drawCages),
    drawRuns(seats, reading),
    drawRuns(looms, reading),
    ...of('empty-bay').map(drawEmptyBay),
    ...of('drive-row').map((node) => drawRow(node, frameOf(node), build, reading)),
    ...of('part').map((node) => drawTag(node, build, reading)),
    ...of('stub').map((node) => drawStub(node, build)),
    drawAmperes(drawing, reading),
  ]
}

/** Name of the machine and, since it is what everybody asks first, the weakest hop. */
function header({ document, result, revision, date }: FlatInput, moment: string, width: number): Block {
  const limits = withinLimits(result)
  const severity = result.worst ?? 'note'
  const worst = result.findings.find((finding) => !finding.accepted && finding.severity === result.worst)
  const isQuiet = limits.isWithin && result.counts.caution === 0
  const sentence = result.weakestHop ?? (isQuiet ? 'Every hop is within the stated limits.' : (worst?.message ?? ''))
  const lines = wrapText(sentence, Math.min(width, 1160) - 52, 14, 600, 3)
  const subtitle = [
    document.machine ? `machine ${document.machine}` : '',
    `revision ${revision}`,
    date,
    `amperes at: ${moment.toLowerCase()}`,
  ]
    .filter(Boolean)
    .join(' · ')
  const boxHeight = lines.length === 0 ? 0 : 20 + lines.length * 20
  return {
    width,
    height: 52 + (boxHeight > 0 ? boxHeight + 16 : 0),
    draw: (x, y) =>
      group({}, [
        text(x, y + 24, document.name, { size: 26, weight: 700, fill: palette.ink, width }),
        text(x, y + 46, subtitle, { size: 12.5, fill: palette.soft, width }),
        ...(boxHeight === 0
          ? []
          : [
              box(x, y + 64, Math.min(width, 1160), boxHeight, {
                fill: palette.card,
                stroke: limits.isWithin ? palette.hairline : palette.danger,
                strokeWidth: limits.isWithin ? 1 : 1.5,
                radius: 3,
              }),
              severityShape(x + 16, y + 64 + boxHeight / 2 - 6, severity),
              ...lines.map((words, i) =>
                text(x + 40, y + 64 + 24 + i * 20, words, { size: 14, weight: 600, fill: palette.ink }),
              ),
            ]),
      ]),
  }
}

function lowerBand(input: FlatInput, reading: Reading, moment: string, width: number): Block[] {
  const { document, build, result, revision, date, checked = 'not reviewed', approval } = input
  const cases = build.parts.filter((part) => part.model.kind === 'case')
  const blocksWith = (parts: Block) => [
    findingsBlock(result),
    ...cases.map((holder) => frontBlock(build, holder, reading)),
    parts,
    legend(),
    titleBlock(
      { name: document.name, machine: document.machine, revision: String(revision), date, moment, checked, approval },
      result,
    ),
  ]
  const choices = [3, 2, 1].map((columns) => blocksWith(partsBlock(build, columns)))
  return choices.find((blocks) => widthOf(blocks) <= width) ?? choices.at(-1) ?? []
}

const bandGap = 40

const widthOf = (blocks: readonly Block[]): number =>
  blocks.reduce((sum, block) => sum + block.width, 0) + (blocks.length - 1) * bandGap

const cautionHeight = 32

function cautions(x: number, y: number, width: number): string {
  const words =
    'Disconnect the mains and wait before touching. Never mix modular leads between supply families. Measure before ' +
    'mating. When in doubt follow the makers’ manuals, local codes and licensed practice. Computed from stated figures.'
  return wrapText(words, width, 11, 600, 2)
    .map((content, i) => text(x, y + 12 + i * 16, content, { size: 11, weight: 600, fill: palette.ink }))
    .join('')
}
