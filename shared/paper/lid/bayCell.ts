import type { PageMark } from '../page.ts'
import type { LidBay, LidDrive } from './content.ts'
import { line, widthOf } from './strips.ts'
import { smallest_pt, type Look } from './style.ts'

/** Places within a bay, given its size. */
interface Cell {
  look: Look
  x: number
  y: number
  width: number
  height: number
}

const pad = 1.4

/** One bay: its number and the end of the serial large, everything else small. Empty ones are dashed. */
export function drawBay(look: Look, bay: LidBay, x: number, y: number, width: number, height: number): PageMark[] {
  const { inks } = look
  const cell = { look, x, y, width, height }
  const [drive, ...others] = bay.drives
  const number = String(bay.slot).padStart(2, '0')
  const frame: PageMark = {
    kind: 'box',
    x,
    y,
    width,
    height,
    stroke: drive ? inks.ink : inks.hairline,
    stroke_mm: drive ? 0.35 : 0.2,
    radius: 0.6,
    ...(!drive && { dash: '1 0.8' }),
  }
  if (width >= 52) return [frame, ...inOneLine(cell, number, drive, others)]
  if (width >= 27) return [frame, ...inTwoLines(cell, number, drive, others)]
  return [frame, ...below(cell, number, drive, others)]
}

const small = smallest_pt

/** "C3 and C4": two drives in one bay is a fault that the sheet must not hide. */
const names = (drive: LidDrive, others: readonly LidDrive[]): string =>
  [drive, ...others].map(({ ref }) => ref).join(' and ')

/** "3 TB" of "3 TB SAS". */
const shortCapacity = (capacity: string): string => /^(about )?\S+ \S+/.exec(capacity)?.[0] ?? capacity

/** Designation and capacity, shorter where there is little room. */
function whatFits(drive: LidDrive, others: readonly LidDrive[], room: number): string {
  const name = names(drive, others)
  const whole = `${name} · ${drive.capacity}`
  return widthOf(whole, small) <= room ? whole : `${name} · ${shortCapacity(drive.capacity)}`
}

const isStrongRole = (role: string): boolean => role !== '' && role !== 'data'

function inOneLine(cell: Cell, number: string, drive: LidDrive | undefined, others: readonly LidDrive[]): PageMark[] {
  const { look, x, y, width, height } = cell
  const { inks, density } = look
  const size = density.bay_pt + 3
  const at = y + height / 2 + size * 0.127
  const from = x + pad + widthOf('00', size, 700) + 2.4
  const place = line(x + pad, at, number, size, { weight: 700, colour: drive ? inks.ink : inks.soft })
  if (!drive) return [...place, ...line(from, at, 'empty', small, { colour: inks.soft })]
  const role = widthOf(drive.role, small, 700)
  const left = from + Math.max(15, Math.min(width * 0.4, widthOf(drive.tail, size - 1.5, 700)) + 2)
  const room = x + width - pad - role - 1 - left
  return [
    ...place,
    ...line(from, at, drive.tail, size - 1.5, { weight: 700, colour: inks.ink, width: width * 0.4 }),
    ...line(left, at, whatFits(drive, others, room), small, { colour: inks.ink, width: room }),
    ...roleMark(cell, drive, x + width - pad, at),
  ]
}

function inTwoLines(cell: Cell, number: string, drive: LidDrive | undefined, others: readonly LidDrive[]): PageMark[] {
  const { look, x, y, width, height } = cell
  const { inks, density } = look
  const top = y + height * 0.46
  const bottom = y + height - 1.5
  const place = line(x + pad, top, number, density.bay_pt + 3, { weight: 700, colour: drive ? inks.ink : inks.soft })
  if (!drive) return [...place, ...line(x + pad + 10, top, 'empty', small, { colour: inks.soft })]
  const left = x + pad + widthOf('00', density.bay_pt + 3, 700) + 2
  const role = widthOf(drive.role, small, isStrongRole(drive.role) ? 700 : 400)
  return [
    ...place,
    ...line(left, top, drive.tail, density.bay_pt + 1, {
      weight: 700,
      colour: inks.ink,
      width: x + width - pad - left,
    }),
    ...line(x + pad, bottom, whatFits(drive, others, width - 2 * pad - role - 1), small, {
      colour: inks.ink,
      width: width - 2 * pad - role - 1,
    }),
    ...roleMark(cell, drive, x + width - pad, bottom),
  ]
}

function roleMark({ look }: Cell, { role }: LidDrive, right: number, y: number): PageMark[] {
  const isStrong = isStrongRole(role)
  return line(right, y, role, small, {
    anchor: 'end',
    weight: isStrong ? 700 : 400,
    colour: isStrong ? look.inks.accent : look.inks.ink,
  })
}

function below(cell: Cell, number: string, drive: LidDrive | undefined, others: readonly LidDrive[]): PageMark[] {
  const { look, x, y, width, height } = cell
  const { inks } = look
  const middle = x + width / 2
  const room = width - 0.8
  const of = (share: number) => y + height * share
  const centred = { anchor: 'middle' as const, width: room, colour: inks.ink }
  const place = line(middle, of(0.21), number, 9.5, { ...centred, weight: 700, colour: drive ? inks.ink : inks.soft })
  if (!drive) return [...place, ...line(middle, of(0.6), 'empty', small, { ...centred, colour: inks.soft })]
  const bare = drive.tail.replace('…', '')
  const tail = [
    { words: drive.tail, size: 8.5 },
    { words: bare, size: 8.5 },
    { words: bare, size: small },
  ].find(({ words, size }) => widthOf(words, size, 700) <= room) ?? { words: bare, size: small }
  const capacity = widthOf(drive.capacity, small) <= room ? drive.capacity : shortCapacity(drive.capacity)
  return [
    ...place,
    ...line(middle, of(0.4), tail.words, tail.size, { ...centred, weight: 700 }),
    ...line(middle, of(0.585), capacity, small, centred),
    ...line(middle, of(0.765), names(drive, others), small, centred),
    ...line(middle, of(0.945), shortRole(drive.role, room), small, {
      ...centred,
      weight: isStrongRole(drive.role) ? 700 : 400,
    }),
  ]
}

/** "par." where "parity" does not fit. */
const shortRole = (role: string, room: number): string =>
  widthOf(role, small, 700) <= room || role.length <= 4 ? role : `${role.slice(0, 3)}.`
