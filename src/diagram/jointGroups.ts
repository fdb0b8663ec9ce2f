import { isFree } from '#shared/build/edits/free.ts'
import { connectorName } from '#shared/build/edits/words.ts'
import { compareRefs } from '#shared/build/refOrder.ts'
import type { ResolvedBuild, ResolvedConnector, ResolvedJoint, ResolvedPart } from '#shared/build/resolve.ts'
import { titleOf } from './face.ts'

/** One connector with what is plugged into it. */
export interface JointLine {
  connector: ResolvedConnector
  free: boolean
  others: { joint: ResolvedJoint; other: ResolvedConnector }[]
}

/** A bay with its drive, or another part, with its connectors. */
export interface JointGroup {
  id: string
  part: string
  title: string
  subtitle: string
  bay: boolean
  lines: JointLine[]
}

export interface JointFilter {
  search: string
  onlyFree: boolean
}

/** The joints of a build in words: bays in their own order first, then the other parts by designation. */
export function jointGroups(build: ResolvedBuild, filter: JointFilter): JointGroup[] {
  const words = filter.search.toLowerCase().split(/\s+/).filter(Boolean)
  return [...build.parts]
    .filter((part) => part.connectors.length > 0)
    .sort(inOrder)
    .flatMap((part): JointGroup[] => {
      const group = groupOf(part)
      const lines = group.lines.filter((line) => (!filter.onlyFree || line.free) && matches(group, line, words))
      return lines.length > 0 ? [{ ...group, lines }] : []
    })
}

function inOrder(a: ResolvedPart, b: ResolvedPart): number {
  const [bayA, bayB] = [bayOf(a), bayOf(b)]
  if (bayA !== undefined && bayB !== undefined && a.part.bay?.case === b.part.bay?.case) return bayA - bayB
  if ((bayA === undefined) !== (bayB === undefined)) return bayA === undefined ? 1 : -1
  return compareRefs(a.part.ref, b.part.ref)
}

const bayOf = (part: ResolvedPart): number | undefined =>
  part.model.kind === 'drive' ? part.part.bay?.slot : undefined

function groupOf(part: ResolvedPart): JointGroup {
  const bay = bayOf(part)
  return {
    id: part.part.id,
    part: part.part.id,
    title: bay === undefined ? part.part.ref : `Bay ${String(bay).padStart(2, '0')}: ${part.part.ref}`,
    subtitle: titleOf(part),
    bay: bay !== undefined,
    lines: part.connectors.map((connector) => ({
      connector,
      free: isFree(connector),
      others: connector.joints.map((joint) => ({ joint, other: joint.a === connector ? joint.b : joint.a })),
    })),
  }
}

function matches(group: JointGroup, line: JointLine, words: readonly string[]): boolean {
  if (words.length === 0) return true
  const text = [
    group.title,
    group.subtitle,
    connectorName(line.connector),
    ...line.others.map(({ other }) => connectorName(other)),
  ]
    .join(' ')
    .toLowerCase()
  // "bay 2" is bay 02, not bay 12, nor a drive of 7200 rpm.
  const numbers = new Set(text.match(/\d+/g)?.map(Number))
  return words.every((word) => (/^\d+$/.test(word) ? numbers.has(Number(word)) : text.includes(word)))
}
