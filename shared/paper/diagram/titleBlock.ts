import type { CheckResult } from '../../check/result.ts'
import { box, group, line, text } from '../svg.ts'
import { counted } from '../words.ts'
import type { Block } from './block.ts'
import { palette } from './palette.ts'

export interface Identity {
  name: string
  machine?: string | undefined
  revision: string
  date: string
  moment: string
  checked: string
  /** The approval in a sentence; the line is left out without one. */
  approval?: string | undefined
}

/** "yes", "yes, 2 cautions", "no: 1 danger, 3 faults" */
export function withinLimits({ counts }: CheckResult): { words: string; isWithin: boolean } {
  const stops = [
    counts.danger > 0 ? counted(counts.danger, 'danger') : '',
    counts.fault > 0 ? counted(counts.fault, 'fault') : '',
  ].filter(Boolean)
  if (stops.length > 0) return { words: `no: ${stops.join(', ')}`, isWithin: false }
  return { words: counts.caution > 0 ? `yes, ${counted(counts.caution, 'caution')}` : 'yes', isWithin: true }
}

interface Field {
  label: string
  value: string
  x: number
  row: number
  width: number
  fill?: string
}

const width = 560
const rowHeight = 52

/** Identity of the sheet, as on any technical drawing. */
export function titleBlock(identity: Identity, result: CheckResult): Block {
  const limits = withinLimits(result)
  const machine = identity.machine ? `${identity.name} (${identity.machine})` : identity.name
  const fields: Field[] = [
    { label: 'Machine', value: machine, x: 0, row: 0, width: 344 },
    { label: 'Revision', value: identity.revision, x: 344, row: 0, width: 104 },
    { label: 'Date', value: identity.date, x: 448, row: 0, width: 112 },
    { label: 'Shown', value: `wiring, ${identity.moment.toLowerCase()}`, x: 0, row: 1, width: 168 },
    { label: 'Checked', value: identity.checked, x: 168, row: 1, width: 176 },
    {
      label: 'Within the stated limits',
      value: limits.words,
      x: 344,
      row: 1,
      width: 216,
      fill: limits.isWithin ? palette.accent : palette.danger,
    },
  ]
  const approval: Field[] = identity.approval
    ? [{ label: 'Approval', value: identity.approval, x: 0, row: 2, width }]
    : []
  const rows = 2 + approval.length
  return {
    width,
    height: rows * rowHeight,
    draw: (x, y) =>
      group({}, [
        box(x, y, width, rows * rowHeight, { fill: palette.card, stroke: palette.ink, strokeWidth: 1.5 }),
        ...Array.from({ length: rows - 1 }, (_, i) => (i + 1) * rowHeight).map((down) =>
          line(x, y + down, x + width, y + down, palette.ink),
        ),
        ...fields.filter((field) => field.x > 0).map((field) => divider(x + field.x, y + field.row * rowHeight)),
        ...[...fields, ...approval].flatMap(({ label, value, x: left, row, width: room, fill }) => [
          text(x + left + 10, y + row * rowHeight + 18, label, { size: 10.5, fill: palette.soft, width: room - 16 }),
          text(x + left + 10, y + row * rowHeight + 39, value, {
            size: 14,
            weight: 700,
            fill: fill ?? palette.ink,
            width: room - 16,
          }),
        ]),
      ]),
  }
}

const divider = (x: number, y: number): string => line(x, y, x, y + rowHeight, palette.ink)
