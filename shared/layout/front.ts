import type { ResolvedBuild, ResolvedPart } from '../build/resolve.ts'

/** One bay on the case front. */
export interface FrontCell {
  slot: number
  cage: string
  x: number
  y: number
  width: number
  height: number
  /** Part id of the drive in it. */
  drive?: string
}

/** The case front as the hand meets it. */
export interface FrontMap {
  case: string
  width: number
  height: number
  cells: FrontCell[]
}

/**
 * Map of a case front: rows from the top, columns from the left, as the case's model states them. Cells are wide
 * where drives lie flat (fewer columns than rows) and tall where they stand. `cell` is the short side of a bay.
 */
export function frontMap(build: ResolvedBuild, holder: ResolvedPart, cell = 20, gap = 4): FrontMap {
  const { bays } = holder.model
  const columns = 1 + Math.max(0, ...bays.map(({ column }) => column))
  const rows = 1 + Math.max(0, ...bays.map(({ row }) => row))
  const isStanding = columns > rows * 2
  const width = isStanding ? cell * 1.5 : cell * 2.5
  const height = isStanding ? cell * 3 : cell
  const drives = new Map<number, string>()
  for (const { part, model } of build.parts)
    if (model.kind === 'drive' && part.bay?.case === holder.part.id && !drives.has(part.bay.slot))
      drives.set(part.bay.slot, part.id)
  const cells = [...bays]
    .sort((a, b) => a.slot - b.slot)
    .map(({ slot, cage, row, column }): FrontCell => {
      const drive = drives.get(slot)
      const place = { slot, cage, x: column * (width + gap), y: row * (height + gap), width, height }
      return drive === undefined ? place : { ...place, drive }
    })
  return {
    case: holder.part.id,
    width: bays.length === 0 ? 0 : columns * (width + gap) - gap,
    height: bays.length === 0 ? 0 : rows * (height + gap) - gap,
    cells,
  }
}
