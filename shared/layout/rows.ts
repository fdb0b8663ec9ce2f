import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../build/resolve.ts'

/** One row of a strip: a bay with or without a drive, or a drive that has no bay. */
export interface Row {
  slot?: number
  cage?: string
  drive?: ResolvedPart
  /** The backplane whose frame goes around it. */
  backplane?: ResolvedPart
}

/** One strip: a case, a backplane that no case holds, or (without holder) the drives that have no bay. */
export interface RowGroup {
  holder?: ResolvedPart
  rows: Row[]
}

/** Sorts every drive and bay of a build into strips: cases first, then lone backplanes, then loose drives. */
export function groupRows(build: ResolvedBuild): RowGroup[] {
  const drives = build.parts.filter((part) => part.model.kind === 'drive')
  const backplanes = build.parts.filter((part) => part.model.kind === 'backplane')
  const cases = build.parts.filter((part) => part.model.kind === 'case')
  const placed = new Set<ResolvedPart>()

  const bySlot = new Map<string, ResolvedPart[]>()
  for (const drive of drives) {
    const { bay } = drive.part
    if (!bay || !build.partById.get(bay.case)?.model.bays.some(({ slot }) => slot === bay.slot)) continue
    const key = `${bay.case}#${bay.slot}`
    const held = bySlot.get(key)
    if (held) held.push(drive)
    else bySlot.set(key, [drive])
  }
  const take = (holder: ResolvedPart, slot: number): ResolvedPart[] => {
    const found = bySlot.get(`${holder.part.id}#${slot}`) ?? []
    for (const drive of found) placed.add(drive)
    return found
  }

  const groups: RowGroup[] = cases.map((holder) => ({ holder, rows: caseRows(holder, take) }))
  const homes = new Map<ResolvedPart, { group: RowGroup; row: Row }>()
  for (const group of groups) for (const row of group.rows) if (row.drive) homes.set(row.drive, { group, row })
  const byCase = new Map(groups.map((group) => [group.holder?.part.id, group]))

  const lone = backplanes.filter((backplane) => !claimRows(backplane, byCase, homes))
  for (const backplane of lone) groups.push({ holder: backplane, rows: loneRows(backplane, take, placed) })

  const loose = drives.filter((drive) => !placed.has(drive))
  if (loose.length > 0) groups.push({ rows: loose.map((drive) => ({ drive })) })
  return groups
}

/** Bays in the case's own numbering, cage by cage; a bay that holds two drives has two rows. */
function caseRows(holder: ResolvedPart, take: (holder: ResolvedPart, slot: number) => ResolvedPart[]): Row[] {
  const bays = [...holder.model.bays].sort((a, b) => a.slot - b.slot)
  const cages = new Map<string, Row[]>()
  for (const { slot, cage } of bays) {
    const rows = cages.get(cage) ?? []
    cages.set(cage, rows)
    const drives = take(holder, slot)
    if (drives.length === 0) rows.push({ slot, cage })
    for (const drive of drives) rows.push({ slot, cage, drive })
  }
  return [...cages.values()].flat()
}

/** The drive that sits in a bay receptacle of a backplane. */
export const seatedDrive = (connector: ResolvedConnector): ResolvedPart | undefined => {
  for (const { a, b } of connector.joints) {
    const other = a === connector ? b.part : a.part
    if (other.model.kind === 'drive') return other
  }
  return undefined
}

export const bayConnectors = (backplane: ResolvedPart): ResolvedConnector[] =>
  backplane.connectors.filter(({ connector }) => connector.bay !== undefined)

/** Marks the rows that a backplane serves: the bays it is mounted at, else those of the drives that sit in it. */
function claimRows(
  backplane: ResolvedPart,
  byCase: ReadonlyMap<string | undefined, RowGroup>,
  homes: ReadonlyMap<ResolvedPart, { group: RowGroup; row: Row }>,
): boolean {
  const receptacles = bayConnectors(backplane)
  const seated = receptacles.map(seatedDrive).flatMap((drive) => (drive ? (homes.get(drive) ?? []) : []))
  const { bay } = backplane.part
  const mounted = bay && byCase.get(bay.case)
  const group = mounted ?? seated[0]?.group
  if (!group) return false
  const slots = new Set(receptacles.map(({ connector }) => (bay?.slot ?? 1) - 1 + (connector.bay ?? 1)))
  const seatedRows = new Set(seated.map(({ row }) => row))
  const serves = (row: Row) => (mounted ? row.slot !== undefined && slots.has(row.slot) : seatedRows.has(row))
  const stretch = longestStretch(group.rows, (row) => row.backplane === undefined && serves(row))
  for (const row of stretch) row.backplane = backplane
  return stretch.length > 0
}

function longestStretch(rows: readonly Row[], fits: (row: Row) => boolean): Row[] {
  let best: readonly [number, number] = [0, 0]
  let start = 0
  rows.forEach((row, i) => {
    if (!fits(row)) start = i + 1
    else if (i + 1 - start > best[1] - best[0]) best = [start, i + 1]
  })
  return rows.slice(best[0], best[1])
}

/** A backplane that no case holds has rows of its own, by receptacle. */
function loneRows(
  backplane: ResolvedPart,
  take: (holder: ResolvedPart, slot: number) => ResolvedPart[],
  placed: Set<ResolvedPart>,
): Row[] {
  return bayConnectors(backplane).flatMap((connector) => {
    const slot = connector.connector.bay ?? 1
    const seated = seatedDrive(connector)
    const drives = take(backplane, slot)
    if (seated && !placed.has(seated)) {
      placed.add(seated)
      drives.push(seated)
    }
    if (drives.length === 0) return [{ slot, backplane }]
    return drives.map((drive) => ({ slot, drive, backplane }))
  })
}
