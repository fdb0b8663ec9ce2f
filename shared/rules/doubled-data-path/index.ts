import type { ResolvedPart } from '../../build/resolve.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { listed, nameOf, placeOf } from '../../check/words.ts'
import type { DataResult, LanePath } from '../../datapath/result.ts'
import { defineRule, type RawFinding } from '../rule.ts'

type Facts =
  | { kind: 'twice'; drive: ResolvedPart; paths: readonly LanePath[]; bothWork: boolean }
  | { kind: 'loop'; expander: ResolvedPart; controller: ResolvedPart }

export const doubledDataPath = defineRule<Facts>({
  meta: {
    id: 'doubled-data-path',
    title: 'A drive port reached twice',
    severities: ['fault', 'note'],
    finds:
      'A drive port that two controllers or two ports reach without the drive being dual-ported, or expanders joined in a ring.',
    why: 'A SATA drive, and each single port of a SAS drive, belongs to one initiator; a second way in blocks or disturbs the first. A ring of expanders is an error of the whole domain.',
    needs: ['lanes from every controller', 'ports of each drive'],
    sources: ['R61', 'R69', 'R54'],
  },
  check({ data }) {
    return [...twice(data), ...loops(data)]
  },
  words({ facts }) {
    if (facts.kind === 'loop')
      return {
        message: `${nameOf(facts.expander)} can be reached from ${nameOf(facts.controller)} by two different ways: the expanders form a ring.`,
        remedy: 'Remove one of the links between the expanders, so that a single way leads to each of them.',
      }
    const ways = listed(facts.paths.map((path) => placeOf(path.port)))
    return facts.bothWork
      ? {
          message: `${nameOf(facts.drive)} is reached from ${ways} through the same drive port.`,
          remedy: 'Leave it so only where two controllers are meant to share the drive and the software knows.',
        }
      : {
          message: `${nameOf(facts.drive)} is reached from ${ways}, but that port of the drive takes one partner only.`,
          remedy: 'Keep one of these ways and remove the other.',
        }
  },
})

function twice(data: DataResult): RawFinding<Facts>[] {
  const byPort = new Map<string, LanePath[]>()
  for (const path of data.paths) {
    if (path.fault) continue
    const key = `${path.drive.index}.${path.drivePort}`
    const paths = byPort.get(key)
    if (paths) paths.push(path)
    else byPort.set(key, [path])
  }
  return [...byPort.values()].flatMap((paths): RawFinding<Facts>[] => {
    const [first, second] = paths
    if (!first || !second) return []
    const { drive, drivePort } = first
    const sharedEntry = new Set(paths.map(entryOf)).size === 1
    const bothWork = drive.model.drive?.protocol === 'sas' && sharedEntry
    return [
      {
        severity: bothWork ? 'note' : 'fault',
        subjects: [partSubject(drive), ...paths.map((path) => connectorSubject(path.port))],
        detail: `port ${drivePort}`,
        facts: { kind: 'twice', drive, paths, bothWork },
      },
    ]
  })
}

/** The phy that the drive's port is joined to, whichever controller comes through it. */
function entryOf(path: LanePath): string {
  const lane = path.hops.at(-1)?.lanes[0]
  return lane ? `${lane.from.index}.${lane.fromLane}` : ''
}

function loops(data: DataResult): RawFinding<Facts>[] {
  const byExpander = new Map(data.loops.map((loop) => [loop.expander, loop.controller.part]))
  return [...byExpander].map(([expander, controller]) => ({
    severity: 'fault',
    subjects: [partSubject(expander), partSubject(controller)],
    detail: 'ring',
    facts: { kind: 'loop', expander, controller },
  }))
}
