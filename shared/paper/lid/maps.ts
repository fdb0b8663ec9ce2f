import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import type { LidBay, LidDrive, LidMap, ViewName } from './content.ts'

/** The bays of each case as they are seen from one side. */
export function mapsOf(
  build: ResolvedBuild,
  drives: ReadonlyMap<string, LidDrive>,
  seenFrom: ViewName | undefined,
): LidMap[] {
  const cases = build.parts.filter(({ model }) => model.kind === 'case' && model.bays.length > 0)
  const inBay = new Map<string, LidDrive[]>()
  for (const { part } of build.parts) {
    const drive = drives.get(part.id)
    if (!drive || !part.bay) continue
    const key = `${part.bay.case}/${part.bay.slot}`
    inBay.set(key, [...(inBay.get(key) ?? []), drive])
  }
  return cases.map((holder) => mapOf(holder, inBay, seenFrom, cases.length > 1))
}

function mapOf(
  holder: ResolvedPart,
  inBay: ReadonlyMap<string, readonly LidDrive[]>,
  seenFrom: ViewName | undefined,
  named: boolean,
): LidMap {
  const { bays, bayView: stated = 'front' } = holder.model
  const rows = ranks(bays.map(({ row }) => row))
  const columns = ranks(bays.map(({ column }) => column))
  const { flipRows, flipColumns, words } = turnOf(stated, seenFrom ?? stated)
  return {
    ref: holder.part.ref,
    title: `${named ? `${holder.part.ref}: bays` : 'Bays'} as seen from ${words}`,
    rows: extentOf(rows),
    columns: extentOf(columns),
    bays: bays
      .map(({ slot, row, column }): LidBay => {
        const at = rows.get(row) ?? 0
        const along = columns.get(column) ?? 0
        return {
          slot,
          row: flipRows ? extentOf(rows) - 1 - at : at,
          column: flipColumns ? extentOf(columns) - 1 - along : along,
          drives: inBay.get(`${holder.part.id}/${slot}`) ?? [],
        }
      })
      .sort((a, b) => a.row - b.row || a.column - b.column),
  }
}

/** Share of a bay that is left free where the case has a gap between its cages. */
const gap = 0.2

/** Where each row or column that holds bays stands, in bays; gaps of the case are kept, but narrow. */
function ranks(places: readonly number[]): Map<number, number> {
  const ranked = new Map<number, number>()
  let at = 0
  let before: number | undefined
  for (const place of [...new Set(places)].sort((a, b) => a - b)) {
    if (before !== undefined) at += place > before + 1 ? 1 + gap : 1
    ranked.set(place, at)
    before = place
  }
  return ranked
}

const extentOf = (ranked: ReadonlyMap<number, number>): number => 1 + Math.max(-1, ...ranked.values())

/**
 * How the stated arrangement turns when one walks round the machine. A view from above turns about; a front seen from
 * above would hide one bay under another, so it stays what it is.
 */
function turnOf(stated: ViewName, wanted: ViewName): { flipRows: boolean; flipColumns: boolean; words: string } {
  const seen = { front: 'the front', rear: 'the rear', top: 'above' }
  if (stated === 'top') {
    const isTurned = wanted === 'rear'
    return { flipRows: isTurned, flipColumns: isTurned, words: isTurned ? 'above, standing at the rear' : 'above' }
  }
  if (wanted === 'top' || wanted === stated) return { flipRows: false, flipColumns: false, words: seen[stated] }
  return { flipRows: false, flipColumns: true, words: seen[wanted] }
}
