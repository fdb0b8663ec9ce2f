import { known, textOf, wwnOf } from './fields.ts'
import type { Inventory, ObservedDrive } from './observed.ts'

/** What a column of a table may hold. */
export const csvFields = ['serial', 'wwn', 'makerModel', 'capacity', 'bay', 'device', 'firmware'] as const
export type CsvField = (typeof csvFields)[number]
export const csvFieldWords: Readonly<Record<CsvField, string>> = {
  serial: 'serial',
  wwn: 'WWN',
  makerModel: 'model',
  capacity: 'capacity',
  bay: 'bay',
  device: 'device',
  firmware: 'firmware',
}

/** Splits a table into its rows: passed in, because the library that does it stands outside this pure room. */
export type SplitRows = (text: string) => {
  data: string[][]
  errors: readonly { code: string; message: string; row?: number | undefined }[]
}

/** A table as text, with what its columns seem to hold. */
export interface CsvTable {
  columns: string[]
  rows: { line: number; cells: string[] }[]
  guess: (CsvField | null)[]
  troubles: { line: number; message: string }[]
}

const names: Readonly<Record<CsvField, RegExp>> = {
  serial: /^(s\/?n|serial.*|seriennummer)$/i,
  wwn: /^(wwn|world.?wide.?name|naa|lu.?id)$/i,
  makerModel: /^(model.*|product.*|drive|type|part.?(no|number))$/i,
  capacity: /^(capacity|size|tb|gb|bytes)/i,
  bay: /^(bay|slot|position|einschub)/i,
  device: /^(device|name|dev|disk)$/i,
  firmware: /^(firmware|fw|rev.*)$/i,
}

/** Reads a table with a line of headings. The separator is guessed; a table without a known heading has none. */
export function readCsvTable(text: string, splitRows: SplitRows): CsvTable {
  const { data, errors } = splitRows(text.replace(/^\ufeff/, ''))
  const [head = [], ...body] = data
  const guess = head.map((name) => csvFields.find((field) => names[field].test(name.trim())) ?? null)
  const hasHead = guess.some((field) => field !== null)
  const rows = (hasHead ? body : data).map((cells, i) => ({ line: i + (hasHead ? 2 : 1), cells }))
  return {
    columns: hasHead ? head.map((name) => name.trim()) : head.map((_, i) => `column ${i + 1}`),
    rows,
    guess: firstOfEach(guess),
    troubles: errors
      .filter(({ code }) => code !== 'UndetectableDelimiter')
      .map(({ row, message }) => ({ line: (row ?? 0) + 1, message })),
  }
}

/** Each field counts once: the first column that fits. */
const firstOfEach = (guess: readonly (CsvField | null)[]): (CsvField | null)[] =>
  guess.map((field, i) => (field !== null && guess.indexOf(field) === i ? field : null))

/** The drives of a table, its columns read as `columns` says. */
export function readCsvDrives(table: CsvTable, columns: readonly (CsvField | null)[]): Inventory {
  const drives: ObservedDrive[] = []
  const troubles = table.troubles.map(({ line, message }) => ({ from: `line ${line}`, message }))
  for (const { line, cells } of table.rows) {
    const cell = (field: CsvField) => cells[columns.indexOf(field)] ?? ''
    const capacity = cell('capacity')
    const bay = /\d+/.exec(cell('bay'))?.[0]
    const drive = known<ObservedDrive>({
      from: `line ${line}`,
      serial: textOf(cell('serial').replace(/^'/, '')),
      wwn: wwnOf(cell('wwn')),
      makerModel: textOf(cell('makerModel')),
      firmware: textOf(cell('firmware')),
      device: textOf(cell('device'))?.replace(/^\/dev\//, ''),
      capacity_B: capacityOf(capacity, table.columns[columns.indexOf('capacity')] ?? ''),
      isRounded: /[a-z]/i.test(capacity) ? true : undefined,
      bay: bay === undefined ? undefined : Number(bay),
    })
    if (drive.serial === undefined && drive.wwn === undefined)
      troubles.push({ from: `line ${line}`, message: 'neither serial nor WWN stands in it' })
    else drives.push(drive)
  }
  return { drives, troubles, leftOut: 0 }
}

const units: Readonly<Record<string, number>> = { '': 1, k: 1e3, m: 1e6, g: 1e9, t: 1e12 }

/** Capacities are decimal, as drives are sold; the unit stands in the cell or in its heading. Below 1,000 without one: TB. */
function capacityOf(text: string, heading: string): number | undefined {
  const match = /(\d+(?:[.,]\d+)?)\s*([kmgt]?)(?:i?b)?/i.exec(text.trim())
  if (!match) return undefined
  const value = Number(match[1]?.replace(',', '.'))
  const unit = (match[2] || (/\b(tb|gb)\b/i.exec(heading)?.[1]?.[0] ?? '')).toLowerCase()
  const factor = unit === '' && value < 1000 ? 1e12 : (units[unit] ?? 1)
  return value > 0 ? value * factor : undefined
}
