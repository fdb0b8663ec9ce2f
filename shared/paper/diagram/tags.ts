import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import type { DrawnNode, DrawnPort } from '../../layout/drawing.ts'
import { tag as size } from '../../layout/metrics.ts'
import { box, group, line, text } from '../svg.ts'
import { textWidth, wrapText } from '../text/textWidth.ts'
import { counted, supplyLines, tagWords } from '../words.ts'
import { connectorMark, openEnd, severityTag } from './marks.ts'
import { palette, severityColour } from './palette.ts'
import type { Reading } from './reading.ts'

const pad = 10

/** A part as a drawing-sheet tag: designation, name, connectors in physical order. */
export function drawTag(node: DrawnNode, build: ResolvedBuild, reading: Reading): string {
  const part = build.partById.get(node.part)
  if (!part) return ''
  const { x, y, width, height } = node
  const severity = reading.partSeverity(node.part)
  const strained = severity === 'danger' || severity === 'fault'
  const inside = [
    box(x, y, width, height, {
      fill: palette.card,
      stroke: strained ? severityColour[severity] : palette.ink,
      strokeWidth: strained ? 2 : 1.25,
      radius: 3,
    }),
    ...drawHeader(node, part),
  ]
  if (part.model.kind === 'supply')
    supplyLines(part.model, size.supplyLines).forEach((words, i) =>
      inside.push(
        text(x + pad, y + size.header + 16 + i * 16, words, { size: 11, fill: palette.ink, width: width - 86 }),
      ),
    )
  if (!node.compact) inside.push(drawSpare(node, part))
  for (const port of node.ports) {
    inside.push(drawPort(node, port))
    if (port.side === 'left' && port.carries === 'power' && !port.joined)
      inside.push(openEnd(x + port.x - 4, y + port.y, 'not fed', 'left'))
  }
  if (severity && severity !== 'note') inside.push(severityTag(x, y - 4, severity))
  return group({}, inside)
}

function drawHeader(node: DrawnNode, part: ResolvedPart): string[] {
  const { x, y, width } = node
  const { ref } = part.part
  const refWidth = textWidth(ref, 13, 700)
  const name = tagWords(part.part.name, part.model)
  const lines = wrapText(name, width - 2 * pad - refWidth - 10, 10.5, 400, 2)
  const first = y + (lines.length > 1 ? 15.5 : 22)
  const marks = [
    text(x + pad, y + 22.5, ref, { size: 13, weight: 700, fill: palette.ink }),
    ...lines.map((words, i) =>
      text(x + pad + refWidth + 10, first + i * 13, words, { size: 10.5, fill: palette.soft }),
    ),
  ]
  if (!node.compact) marks.push(line(x, y + size.header, x + width, y + size.header, palette.hairline))
  return marks
}

/** Power outlets that nothing is plugged into yet. */
function drawSpare(node: DrawnNode, part: ResolvedPart): string {
  if (part.model.kind === 'supply' || part.model.kind === 'board') return ''
  const spare = node.ports.filter((port) => port.side === 'right' && port.carries === 'power' && !port.joined).length
  if (spare === 0) return ''
  return text(node.x + pad, node.y + node.height - 5, `${counted(spare, 'outlet')} left`, {
    size: 10.5,
    fill: palette.soft,
    width: node.width - 60,
  })
}

function drawPort(node: DrawnNode, port: DrawnPort): string {
  const x = node.x + port.x
  const y = node.y + port.y
  const colour = port.joined ? palette.ink : palette.soft
  const mark = connectorMark(x, y, port.gender, colour)
  if (node.compact) return mark
  const left = port.side === 'left'
  return (
    mark +
    text(x + (left ? 10 : -10), y + 4, port.label, {
      size: 11,
      fill: colour,
      anchor: left ? 'start' : 'end',
      width: node.width / 2 - 12,
    })
  )
}

/** A power inlet of a part that lives on the data side. */
export function drawStub(node: DrawnNode, build: ResolvedBuild): string {
  const part = build.partById.get(node.part)
  if (!part) return ''
  const { x, y, width, height } = node
  const inlet = node.ports.find((port) => port.side === 'left')
  const ref = part.part.ref
  const refWidth = textWidth(ref, 11.5, 700)
  const inside = [
    box(x, y, width, height, { fill: palette.card, stroke: palette.soft, strokeWidth: 1, radius: 14 }),
    text(x + 12, y + height / 2 + 4, ref, { size: 11.5, weight: 700, fill: palette.ink }),
    text(x + 16 + refWidth, y + height / 2 + 4, inlet?.label ?? node.ports[0]?.label ?? '', {
      size: 11,
      fill: palette.soft,
      width: width - refWidth - 28,
    }),
    ...node.ports.map((port) =>
      connectorMark(x + port.x, y + port.y, port.gender, port.joined ? palette.ink : palette.soft),
    ),
  ]
  if (inlet && !inlet.joined) inside.push(openEnd(x - 4, y + inlet.y, 'not fed', 'left'))
  return group({}, inside)
}
