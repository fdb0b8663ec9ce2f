import type { ResolvedBuild, ResolvedConnector, ResolvedJoint } from '../build/resolve.ts'
import { isSlot, jointCarries } from './carries.ts'
import type { DrawnRun } from './drawing.ts'
import type { Place, Places } from './tag.ts'

/** A run with both its ends found. */
export interface PlacedRun {
  run: DrawnRun
  from: Place
  to: Place
  /** A card in its slot. */
  inSlot: boolean
}

/** One run for every joint, and one more for the power of a joint that carries both. In the order of the joints. */
export function makeRuns(build: ResolvedBuild, places: Places): PlacedRun[] {
  const runs: PlacedRun[] = []
  const inner = new Set<string>()
  for (const joint of build.joints) {
    const carries = jointCarries(joint)
    const id = joint.joint.id
    if (carries === 'power') addRun(runs, joint, id, 'joint', 'power', places.power, places.data)
    else addRun(runs, joint, id, 'joint', 'data', places.data, places.power)
    if (carries !== 'both') continue
    // Two joints on one connector are wrong, and drawn: the second one's power is told apart by its joint.
    const plain = innerId(joint, places)
    const unique = inner.has(plain) ? `${plain}:${id}` : plain
    inner.add(plain)
    addRun(runs, joint, unique, 'inner', 'power', places.power, undefined)
  }
  return runs
}

/** Its connector in the run's id is that of the part that brings the power. */
function innerId({ a, b }: ResolvedJoint, places: Places): string {
  const feeder = places.power.get(a.index)?.port.side === 'left' ? b : a
  return `inner:${feeder.part.part.id}:${feeder.connector.id}`
}

/** Ends are looked for where they should be, else on the other side of the strip; without both there is no run. */
function addRun(
  runs: PlacedRun[],
  joint: ResolvedJoint,
  id: string,
  kind: 'joint' | 'inner',
  carries: 'power' | 'data',
  places: ReadonlyMap<number, Place>,
  others: ReadonlyMap<number, Place> | undefined,
): void {
  const a = places.get(joint.a.index) ?? others?.get(joint.a.index)
  const b = places.get(joint.b.index) ?? others?.get(joint.b.index)
  if (!a || !b) return
  // Runs are told from left to right wherever one end faces right and the other left.
  const isBackwards = a.port.side === 'left' && b.port.side === 'right'
  const from = isBackwards ? b : a
  const to = isBackwards ? a : b
  const run: DrawnRun = {
    id,
    joint: joint.joint.id,
    kind: isSeat(joint.a) || isSeat(joint.b) ? 'seat' : kind,
    carries,
    from: { node: from.node.id, port: from.port.key },
    to: { node: to.node.id, port: to.port.key },
  }
  runs.push({ run, from, to, inSlot: isSlot(joint.a) || isSlot(joint.b) })
}

const isSeat = (connector: ResolvedConnector): boolean => connector.connector.bay !== undefined
