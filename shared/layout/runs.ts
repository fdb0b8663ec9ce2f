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
  return build.joints.flatMap((joint) => {
    const carries = jointCarries(joint)
    const inSlot = isSlot(joint.a) || isSlot(joint.b)
    const main = mainRun(joint, carries === 'power' ? 'power' : 'data', places)
    const inner = carries === 'both' ? innerRun(joint, places) : undefined
    return [main, inner].flatMap((placed) => (placed ? [{ ...placed, inSlot }] : []))
  })
}

type Ends = Omit<PlacedRun, 'inSlot'>

const isSeat = (a: ResolvedConnector, b: ResolvedConnector): boolean =>
  a.connector.bay !== undefined || b.connector.bay !== undefined

function mainRun(joint: ResolvedJoint, carries: 'power' | 'data', places: Places): Ends | undefined {
  const other = carries === 'power' ? 'data' : 'power'
  const from = places[carries].get(joint.a.index) ?? places[other].get(joint.a.index)
  const to = places[carries].get(joint.b.index) ?? places[other].get(joint.b.index)
  const kind = isSeat(joint.a, joint.b) ? 'seat' : 'joint'
  return from && to && ordered({ id: joint.joint.id, joint: joint.joint.id, kind, carries }, from, to)
}

/** Its connector in the run's id is that of the part that brings the power. */
function innerRun(joint: ResolvedJoint, places: Places): Ends | undefined {
  const a = places.power.get(joint.a.index)
  const b = places.power.get(joint.b.index)
  if (!a || !b) return undefined
  const feeder = a.port.side === 'right' || b.port.side !== 'right' ? joint.a : joint.b
  const id = `inner:${feeder.part.part.id}:${feeder.connector.id}`
  const kind = isSeat(joint.a, joint.b) ? 'seat' : 'inner'
  return ordered({ id, joint: joint.joint.id, kind, carries: 'power' }, a, b)
}

/** Runs are told from left to right wherever one end faces right and the other left. */
function ordered(run: Omit<DrawnRun, 'from' | 'to'>, a: Place, b: Place): Ends {
  const [from, to] = a.port.side === 'left' && b.port.side === 'right' ? [b, a] : [a, b]
  const end = ({ node, port }: Place) => ({ node: node.id, port: port.key })
  return { run: { ...run, from: end(from), to: end(to) }, from, to }
}
