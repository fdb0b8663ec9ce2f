import type { ResolvedBuild } from '../../build/resolve.ts'
import type { DrawnNode, DrawnPort } from '../../layout/drawing.ts'
import { strip } from '../../layout/metrics.ts'
import type { Rail } from '../../quantity/rails.ts'
import { box, element, group, line, text } from '../svg.ts'
import { textWidth } from '../text/textWidth.ts'
import { driveWords, serialTail, tagWords } from '../words.ts'
import { connectorMark, openEnd, severityTag, severityTagWidth } from './marks.ts'
import { palette, severityColour } from './palette.ts'
import type { Reading } from './reading.ts'

export const bayNumber = (slot: number): string => String(slot).padStart(2, '0')

/** The frame of a case with its name and the names of its cages. */
export function drawCase(node: DrawnNode, build: ResolvedBuild): string {
  const part = build.partById.get(node.part)
  if (!part) return ''
  const { x, y, width, height } = node
  return group({}, [
    box(x, y, width, height, { fill: palette.frame, stroke: palette.ink, strokeWidth: 1.25, radius: 3 }),
    text(x + width / 2, y + 21, `${part.part.ref}  ${part.part.name ?? part.model.name}`, {
      size: 12,
      fill: palette.soft,
      anchor: 'middle',
      width: width - 24,
    }),
    ...node.ports.map((port) => connectorMark(x + port.x, y + port.y, port.gender, palette.ink)),
  ])
}

/** Names of cages, above their rows. */
export const drawCages = ({ x, y, width, headings = [] }: DrawnNode): string =>
  group(
    {},
    headings.map((heading) =>
      text(x + heading.x, y + heading.y, heading.text, {
        size: 11,
        weight: 600,
        fill: palette.soft,
        width: width - 48,
      }),
    ),
  )

/** A backplane as the frame of the rows that it serves. */
export function drawBackplane(node: DrawnNode, build: ResolvedBuild, reading: Reading): string {
  const part = build.partById.get(node.part)
  if (!part) return ''
  const { x, y, width, height } = node
  const severity = reading.partSeverity(node.part)
  const strained = severity === 'danger' || severity === 'fault'
  const refWidth = textWidth(part.part.ref, 11.5, 700)
  return group({}, [
    box(x, y, width, height, {
      fill: '#e9e5db',
      stroke: strained ? severityColour[severity] : palette.soft,
      strokeWidth: strained ? 2 : 1,
      radius: 3,
    }),
    text(x + strip.gutter, y + 16, part.part.ref, { size: 11.5, weight: 700, fill: palette.ink }),
    text(x + strip.gutter + refWidth + 8, y + 16, tagWords(part.part.name, part.model), {
      size: 11,
      fill: palette.soft,
      width: width - 2 * strip.gutter - refWidth - 8 - (severity && severity !== 'note' ? 70 : 0),
    }),
    severity && severity !== 'note'
      ? severityTag(x + width - strip.gutter - severityTagWidth(severity), y + 16, severity)
      : '',
    ...node.ports.map((port) =>
      connectorMark(x + port.x, y + port.y, port.gender, port.joined ? palette.ink : palette.soft),
    ),
    ...node.ports
      .filter((port) => port.side === 'left' && port.x === 0 && !port.joined)
      .map((port) => openEnd(x - strip.framePad, y + port.y, `${port.label}: not fed`, 'left')),
  ])
}

/** One row: bay number, designation, class, end of the serial number, role. */
export function drawRow(node: DrawnNode, frame: DrawnNode | undefined, build: ResolvedBuild, reading: Reading): string {
  const part = build.partById.get(node.part)
  if (!part) return ''
  const { x, y, width, height } = node
  const severity = reading.partSeverity(node.part)
  const strained = severity === 'danger' || severity === 'fault'
  const textX = x + 50
  const { ref, serial, role } = part.part
  const tail = serial ? serialTail(serial) : ''
  const tailWidth = tail ? textWidth(tail, 11.5, 600) + 10 : 0
  const inside = [
    box(x, y, width, height, {
      fill: palette.card,
      stroke: strained ? severityColour[severity] : palette.ink,
      strokeWidth: strained ? 1.75 : 1,
      radius: 3,
    }),
    node.slot === undefined
      ? ''
      : text(x + 14, y + 28.5, bayNumber(node.slot), { size: 18, weight: 700, fill: palette.ink }),
    text(textX, y + 18, ref, { size: 13, weight: 700, fill: palette.ink }),
    text(x + width - 14, y + 18, role ?? '', {
      size: 11,
      weight: role === 'parity' ? 600 : 400,
      fill: role === 'parity' ? palette.accent : palette.soft,
      anchor: 'end',
    }),
    text(textX, y + 35, driveWords(part.model), { size: 11.5, fill: palette.soft, width: width - 64 - tailWidth }),
    text(x + width - 14, y + 35, tail, { size: 11.5, weight: 600, fill: palette.ink, anchor: 'end' }),
    severity
      ? severityTag(
          textX + textWidth(ref, 13, 700) + 12,
          y + 18,
          severity,
          10.5,
          brokenWords(node, reading) || severity,
        )
      : '',
    ...node.ports.map((port) =>
      connectorMark(x + port.x, y + port.y, port.gender, port.joined ? palette.ink : palette.soft),
    ),
    ...openEnds(node, frame),
  ]
  return group({}, inside)
}

const fedWords = (missing: readonly Rail[]): string => {
  if (missing.length === 0) return ''
  return missing.length > 1 || missing[0] === '12V' ? 'not fed' : `${missing[0]?.replace('V', ' V')} missing`
}

/** What does not arrive although something is joined: said in the row, since a run stands where an open end would. */
function brokenWords(node: DrawnNode, reading: Reading): string {
  const [power, data] = [node.ports.find(isPowerPort), node.ports.find(isDataPort)]
  return [
    power?.joined ? fedWords(reading.missingRails(node.part)) : '',
    data?.joined && !reading.hasDataPath(node.part) ? 'no data path' : '',
  ]
    .filter(Boolean)
    .join(', ')
}

const isPowerPort = (port: DrawnPort): boolean => port.side === 'left'
const isDataPort = (port: DrawnPort): boolean => port.side === 'right'

/** What the drive has no partner for, in words outside the strip. */
function openEnds(node: DrawnNode, frame: DrawnNode | undefined): string[] {
  const left = frame?.x ?? node.x
  const right = frame ? frame.x + frame.width : node.x + node.width
  const ends: string[] = []
  const stretch = (from: number, to: number, y: number) => line(from, y, to, y, palette.danger, 1.25)
  for (const port of node.ports) {
    const y = node.y + port.y
    if (port.joined) continue
    if (isPowerPort(port)) ends.push(stretch(left, node.x - 4, y), openEnd(left, y, 'not fed', 'left'))
    else ends.push(stretch(node.x + node.width + 4, right, y), openEnd(right, y, 'no data path', 'right'))
  }
  return ends
}

export function drawEmptyBay(node: DrawnNode): string {
  const { x, y, width, height } = node
  return group({}, [
    element('rect', {
      x,
      y,
      width,
      height,
      rx: 3,
      fill: 'none',
      stroke: palette.hairline,
      'stroke-width': 1,
      'stroke-dasharray': '4 4',
    }),
    text(x + 14, y + 28.5, bayNumber(node.slot ?? 0), { size: 18, weight: 700, fill: palette.soft }),
    text(x + 50, y + 27, 'empty', { size: 11.5, fill: palette.soft }),
  ])
}
