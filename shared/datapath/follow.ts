import type { ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import { laneRoutes, wiredLanes } from './laneRoutes.ts'
import { highFigure, laneCount, type ActivePort } from './parts.ts'
import type { HopLane, Reversal } from './result.ts'

interface Place {
  connector: ResolvedConnector
  lane: number
  joints: readonly ResolvedJoint[]
  through: readonly ResolvedPart[]
  reversed: Reversal | null
  length_mm: number | null
}

/** Where a lane ends, as far as wires go: phys found, and cables passed against their direction on the way. */
export interface Followed {
  lanes: HopLane[]
  reversals: Reversal[]
  /** Last connectors reached that lead no further. */
  deadEnds: ResolvedConnector[]
}

/**
 * Follows one lane outward from a connector through joints (lane i to lane i) and the lanes wired inside passive parts,
 * to every phy that it meets. Normally one; two where somebody joined two plugs to one connector.
 */
export function follow(start: ResolvedConnector, lane: number, ports: readonly (ActivePort | undefined)[]): Followed {
  const found: Followed = { lanes: [], reversals: [], deadEnds: [] }
  const seen = new Set<number>([nodeOf(start, lane)])
  const open: Place[] = [{ connector: start, lane, joints: [], through: [], reversed: null, length_mm: 0 }]
  for (let place = open.pop(); place; place = open.pop()) {
    let onward = false
    for (const joint of place.connector.joints) {
      if (place.lane >= joint.mating.lanes) continue
      const next = joint.a === place.connector ? joint.b : joint.a
      if (seen.has(nodeOf(next, place.lane))) continue
      seen.add(nodeOf(next, place.lane))
      onward = true
      const joints = [...place.joints, joint]
      if (ports[next.index]) found.lanes.push(endAt(start, lane, next, { ...place, joints }))
      else if (!passThrough(next, { ...place, joints }, open, seen, found)) found.deadEnds.push(next)
    }
    if (!onward) found.deadEnds.push(place.connector)
  }
  return found
}

const nodeOf = (connector: ResolvedConnector, lane: number): number => connector.index * 16 + lane

function endAt(from: ResolvedConnector, fromLane: number, to: ResolvedConnector, place: Place): HopLane {
  const { lane: toLane, joints, through, reversed, length_mm } = place
  return { from, fromLane, to, toLane, joints, through, reversed, length_mm, rate_Gbps: null, limitedBy: null }
}

/** Goes on inside a passive part; false where the lane is not wired there. */
function passThrough(
  entered: ResolvedConnector,
  place: Place,
  open: Place[],
  seen: Set<number>,
  found: Followed,
): boolean {
  const { part } = entered
  let wired = false
  for (const end of laneRoutes(part.model).get(entered.connector.id)?.[place.lane] ?? []) {
    const left = part.connectorById.get(end.connector)
    if (!left || seen.has(nodeOf(left, end.lane))) continue
    seen.add(nodeOf(left, end.lane))
    wired = true
    const againstIt = isAgainst(entered, left)
    const reversed = place.reversed ?? (againstIt ? { cable: part, enteredAt: entered } : null)
    if (againstIt) found.reversals.push({ cable: part, enteredAt: entered })
    open.push({
      connector: left,
      lane: end.lane,
      joints: place.joints,
      through: [...place.through, part],
      reversed,
      length_mm: addLength(place.length_mm, part),
    })
  }
  return wired
}

function addLength(length_mm: number | null, part: ResolvedPart): number | null {
  const { cable } = part.model
  if (length_mm === null || !cable) return length_mm
  const own = highFigure(cable.length_mm)
  return own === null ? null : length_mm + own
}

/** Whether a lane that comes from the controller's side passes a cable against its wiring. */
function isAgainst(entered: ResolvedConnector, left: ResolvedConnector): boolean {
  const direction = entered.part.model.cable?.direction ?? 'symmetric'
  if (direction === 'symmetric') return false
  const wider = compareWidth(entered, left)
  return direction === 'forward' ? wider < 0 : wider > 0
}

/** Positive where the first connector is the multilane end. */
function compareWidth(a: ResolvedConnector, b: ResolvedConnector): number {
  const { model } = a.part
  return wiredLanes(model, a.connector.id) - wiredLanes(model, b.connector.id) || laneCount(a) - laneCount(b)
}
