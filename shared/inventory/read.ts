import { readByPath } from './byPath.ts'
import { readCsvTable, type CsvTable, type SplitRows } from './csv.ts'
import { jsonValues } from './jsonValues.ts'
import { isLsblk, readLsblk } from './lsblk.ts'
import type { Inventory, ObservedDrive } from './observed.ts'
import { isSmartctl, readSmartctl } from './smartctl.ts'

/** Letters of a listing that are read at most: about a thousand drives with all their counters. */
export const mostListingLetters = 20_000_000

/** What a pasted or dropped text turned out to be. */
export type Listing =
  { kind: 'drives'; inventory: Inventory } | { kind: 'table'; table: CsvTable } | { kind: 'nothing' }

/**
 * Reads whatever mixture of `smartctl --json`, `lsblk --json` and `ls -l /dev/disk/by-path` a text holds; what holds none of them
 * is taken for a table. Drives seen twice (by two tools, or over both ports) become one.
 */
export function readListing(text: string, splitRows: SplitRows): Listing {
  const inventory: Inventory = { drives: [], troubles: [], leftOut: 0 }
  const values = jsonValues(text)
  values.forEach((found, i) => {
    const from = values.length === 1 ? `line ${found.line}` : `object ${i + 1} (line ${found.line})`
    if ('trouble' in found) inventory.troubles.push({ from, message: `This is not JSON: ${found.trouble}` })
    else readValue(found.value, from, inventory)
  })
  const places = new Map(readByPath(text).map(({ device, place }) => [device, place]))
  if (values.length === 0 && places.size === 0) return tableOrNothing(text, splitRows)
  const drives = mergeDrives(inventory.drives).map((drive) => {
    const place = drive.device === undefined ? undefined : places.get(drive.device)
    return place ? { ...drive, place } : drive
  })
  return { kind: 'drives', inventory: { ...inventory, drives } }
}

function tableOrNothing(text: string, splitRows: SplitRows): Listing {
  const table = readCsvTable(text, splitRows)
  return table.rows.length > 0 && table.columns.length > 0 ? { kind: 'table', table } : { kind: 'nothing' }
}

function readValue(value: unknown, from: string, into: Inventory): void {
  if (Array.isArray(value)) {
    value.forEach((one, i) => readValue(one, `${from}, entry ${i + 1}`, into))
  } else if (isLsblk(value)) {
    const { drives, troubles, leftOut } = readLsblk(value, from)
    into.drives.push(...drives)
    into.troubles.push(...troubles)
    into.leftOut += leftOut
  } else if (isSmartctl(value)) {
    const read = readSmartctl(value, from)
    if (read === null) into.leftOut++
    else if ('message' in read) into.troubles.push(read)
    else into.drives.push(read)
  } else into.troubles.push({ from, message: 'This is neither an output of smartctl --json nor of lsblk --json.' })
}

/** Serials as they are compared: tools pad them and differ in case. */
export const serialKey = (serial: string): string => serial.trim().toUpperCase().replace(/\s+/g, '')

/** Puts together what several tools say of one drive; what was said first counts, gaps are filled. */
function mergeDrives(drives: readonly ObservedDrive[]): ObservedDrive[] {
  const merged: ObservedDrive[] = []
  const byKey = new Map<string, number>()
  for (const drive of drives) {
    const keys = [
      ...(drive.serial === undefined ? [] : [`serial ${serialKey(drive.serial)}`]),
      ...(drive.wwn === undefined ? [] : [`wwn ${drive.wwn}`]),
    ]
    const place = keys.map((key) => byKey.get(key)).find((index) => index !== undefined) ?? merged.length
    const before = merged[place]
    merged[place] = before ? combine(before, drive) : drive
    for (const key of keys) byKey.set(key, place)
  }
  return merged
}

/** An exact capacity goes before a rounded one. */
function combine(first: ObservedDrive, second: ObservedDrive): ObservedDrive {
  const also = [...(first.alsoAs ?? []), second.device].filter(
    (device) => device !== undefined && device !== first.device,
  )
  const both = { ...second, ...first, ...(also.length > 0 && { alsoAs: [...new Set(also)] as string[] }) }
  if (!first.isRounded || second.capacity_B === undefined || second.isRounded) return both
  const { isRounded: _rounded, ...exact } = both
  return { ...exact, capacity_B: second.capacity_B }
}
