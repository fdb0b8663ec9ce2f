import type { PageMark } from '../page.ts'
import type { LabelLine } from './label.ts'
import { fitBlock, readable_pt, type TextBlock } from './textBlock.ts'

/** How a label sits on a cable. Trays and bags always get plain ones. */
export const labelForms = ['wrap', 'flag', 'plain'] as const
export type LabelForm = (typeof labelForms)[number]

/** The label's own rectangle, and the cable that it goes round. */
export interface Cell {
  width: number
  height: number
  clearTail_mm: number
  diameter_mm: number
}

/** One label laid out from its own upper left corner. */
export interface LabelLayout {
  marks: readonly PageMark[]
  size_pt: number
  isCut: boolean
  /** False where the label is too short to go round the cable. */
  closes: boolean
  /** How often the words stand on it. */
  copies: number
}

/** A layout while the best one is looked for. */
interface Candidate extends LabelLayout {
  /** Rows of one copy: more of them than lines are broken words. */
  rows: number
  /** Characters of one copy that found room. */
  shown: number
}

const fold = '#8a8a8a'
/** Room between two copies of the same words, and between the last one and the label's edge. */
const gap_mm = 0.6
const edge_mm = 1
/** Overlap that holds a wrap together. */
const overlap_mm = 1

/** A rectangle to set words in. `turn` 90: they read downwards, rows follow each other to the left. */
interface Zone {
  x: number
  y: number
  width: number
  height: number
  turn: 0 | 90 | 180
}

const marginOf = ({ width, height }: { width: number; height: number }): number =>
  Math.max(0.8, Math.min(2, Math.min(width, height) * 0.1))

const inset = (zone: Zone, margin: number): Zone => ({
  ...zone,
  x: zone.x + margin,
  y: zone.y + margin,
  width: zone.width - 2 * margin,
  height: zone.height - 2 * margin,
})

/** Words in the middle of a plain label. */
export function plainLabel(lines: readonly LabelLine[], cell: Cell): LabelLayout {
  const whole: Zone = { x: 0, y: 0, width: cell.width, height: cell.height - cell.clearTail_mm, turn: 0 }
  const zone = inset(whole, marginOf(whole))
  const block = fitBlock(lines, zone.width, zone.height, 14)
  return { marks: setIn(zone, block), size_pt: block.size_pt, isCut: block.isCut, closes: true, copies: 1 }
}

/** Words twice with room for the cable between: folded round it, the flag reads the same from both sides. */
export function flagLabel(lines: readonly LabelLine[], cell: Cell): LabelLayout {
  const round = Math.PI * cell.diameter_mm
  const height = cell.height - cell.clearTail_mm
  const margin = marginOf({ width: cell.width, height })
  const beside = (cell.width - round) / 2
  const above = (height - round) / 2
  const across = flagOf(
    lines,
    [
      { x: 0, y: 0, width: beside, height, turn: 0 },
      { x: cell.width - beside, y: 0, width: beside, height, turn: 0 },
    ],
    margin,
    [vertical(beside, height), vertical(cell.width - beside, height)],
  )
  const down = flagOf(
    lines,
    [
      { x: 0, y: 0, width: cell.width, height: above, turn: 0 },
      { x: 0, y: height - above, width: cell.width, height: above, turn: 180 },
    ],
    margin,
    [horizontal(above, cell.width), horizontal(height - above, cell.width)],
  )
  return better(across, down)
}

function flagOf(lines: readonly LabelLine[], halves: Zone[], margin: number, folds: PageMark[]): Candidate {
  const zones = halves.map((half) => inset(half, margin))
  const [first] = zones
  if (!first || first.width < 2 || first.height < 2)
    return { marks: [], size_pt: 0, isCut: true, closes: false, copies: 0, rows: 0, shown: 0 }
  const block = fitBlock(lines, first.width, first.height, 12)
  return {
    marks: [...folds, ...zones.flatMap((zone) => setIn(zone, block))],
    size_pt: block.size_pt,
    isCut: block.isCut,
    closes: true,
    copies: 2,
    rows: block.rows.length,
    shown: shownIn(block),
  }
}

/**
 * Words repeated round the cable, clear of the part that the overlap covers: the blank end goes on first. Tried along
 * the label's height and its width, with rows along the cable or round it; the most readable one wins.
 */
export function wrapLabel(lines: readonly LabelLine[], cell: Cell): LabelLayout {
  const round = Math.PI * cell.diameter_mm
  const height = cell.height - cell.clearTail_mm
  const margin = marginOf({ width: cell.width, height })
  // A clear tail covers the print; without one the end of the label itself covers its blank beginning.
  const down = cell.clearTail_mm > 0 ? Math.min(height, round) : Math.min(cell.height, round)
  const downStart = cell.clearTail_mm > 0 ? 0 : cell.height - down
  const closesDown = cell.clearTail_mm > 0 ? cell.clearTail_mm >= round : cell.height >= round + overlap_mm
  const along: Zone = { x: 0, y: downStart, width: cell.width, height: down, turn: 0 }
  const across = Math.min(cell.width, round)
  const beside: Zone = { x: cell.width - across, y: 0, width: across, height, turn: 0 }
  const closesAcross = cell.clearTail_mm === 0 && cell.width >= round + overlap_mm
  const startDown = downStart > 0 ? [horizontal(downStart, cell.width)] : []
  const startAcross = across < cell.width ? [vertical(cell.width - across, height)] : []
  const rowsDown = { ...along, x: margin, width: along.width - 2 * margin, height: along.height - edge_mm }
  const columns = { ...beside, y: margin, height: beside.height - 2 * margin, width: beside.width - edge_mm }
  return [
    repeated(lines, rowsDown, 'rows', closesDown, startDown),
    repeated(lines, { ...columns, turn: 90 }, 'rows', closesAcross, startAcross),
    repeated(lines, columns, 'columns', closesAcross, startAcross),
  ].reduce(better)
}

/** The same words as often as they stay readable and unbroken, at most three times: two of them face any side. */
function repeated(
  lines: readonly LabelLine[],
  zone: Zone,
  along: 'rows' | 'columns',
  closes: boolean,
  marks: PageMark[],
): Candidate {
  const [lineRoom, stackRoom] = zone.turn === 90 ? [zone.height, zone.width] : [zone.width, zone.height]
  const part = (count: number, room: number) => Math.max(0, (room - (count - 1) * gap_mm) / count)
  const blockOf = (count: number): TextBlock =>
    along === 'rows'
      ? fitBlock(lines, lineRoom, part(count, stackRoom), 10)
      : fitBlock(lines, part(count, lineRoom), stackRoom, 10)
  const single = blockOf(1)
  const isGood = (block: TextBlock) =>
    block.size_pt >= readable_pt && !block.isCut && block.rows.length <= Math.max(lines.length, single.rows.length)
  const copies = [3, 2].find((count) => isGood(blockOf(count))) ?? 1
  const block = copies === 1 ? single : blockOf(copies)
  return {
    marks: [
      ...marks,
      ...Array.from({ length: copies }, (_, i) => setIn(subZone(zone, along, copies, i), block)).flat(),
    ],
    size_pt: block.size_pt,
    isCut: block.isCut,
    closes,
    copies,
    rows: block.rows.length,
    shown: shownIn(block),
  }
}

function subZone(zone: Zone, along: 'rows' | 'columns', count: number, i: number): Zone {
  const isAcross = along === 'columns' || zone.turn === 90
  const room = isAcross ? zone.width : zone.height
  const size = (room - (count - 1) * gap_mm) / count
  const offset = i * (size + gap_mm)
  return isAcross ? { ...zone, x: zone.x + offset, width: size } : { ...zone, y: zone.y + offset, height: size }
}

/** Sets a block in the middle of its zone, rows beginning at one edge. */
function setIn(zone: Zone, block: TextBlock): PageMark[] {
  const stack = zone.turn === 90 ? zone.width : zone.height
  const before = Math.max(0, (stack - block.height) / 2)
  return block.rows.map(({ text, weight, size_pt, baseline }): PageMark => {
    const at = before + baseline
    const place = {
      0: { x: zone.x, y: zone.y + at },
      90: { x: zone.x + zone.width - at, y: zone.y },
      180: { x: zone.x + zone.width, y: zone.y + zone.height - at },
    }[zone.turn]
    return { kind: 'text', ...place, text, size_pt, weight, ...(zone.turn !== 0 && { turn: zone.turn }) }
  })
}

const horizontal = (y: number, width: number): PageMark => dashed(0, y, width, y)
const vertical = (x: number, height: number): PageMark => dashed(x, 0, x, height)
const dashed = (x1: number, y1: number, x2: number, y2: number): PageMark => ({
  kind: 'line',
  x1,
  y1,
  x2,
  y2,
  width_mm: 0.15,
  colour: fold,
  dash: '0.6 1.2',
})

const shownIn = ({ rows }: TextBlock): number =>
  rows.reduce((sum, { text }) => sum + text.replace(/[\s…]/g, '').length, 0)

/** All of the words first, then going round, then type that reads, lines in one piece, more copies, larger type. */
function better(a: Candidate, b: Candidate): Candidate {
  const rank = (one: Candidate) => [
    one.shown,
    one.closes ? 1 : 0,
    Math.min(one.size_pt, readable_pt),
    -one.rows,
    one.copies,
    one.size_pt,
  ]
  const [left, right] = [rank(a), rank(b)]
  for (const [i, value] of left.entries()) if (value !== right[i]) return value > (right[i] ?? 0) ? a : b
  return a
}
