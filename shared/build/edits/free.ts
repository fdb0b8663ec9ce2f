import { mate, type Mating } from '../mating.ts'
import type { ResolvedConnector } from '../resolve.ts'
import { connectorName } from './words.ts'

/** Whether two connectors could be joined now, and why not. */
export interface JoinVerdict {
  ok: boolean
  mating: Mating
  reason?: string
}

/** What already crosses a connector: power, data or both. */
export function takenBy(connector: ResolvedConnector): { power: boolean; data: boolean } {
  let power = false
  let data = false
  for (const joint of connector.joints) {
    power ||= joint.mating.power
    data ||= joint.mating.lanes > 0
  }
  return { power, data }
}

/** Whether anything can still be plugged into a connector. A drive's plug takes power and data from two sides. */
export function isFree(connector: ResolvedConnector): boolean {
  if (connector.joints.length === 0) return true
  const taken = takenBy(connector)
  return !((taken.power || !connector.type.power) && (taken.data || !connector.type.data))
}

/** Judges a joint before it is made. Says why not: same part, does not mate, or already holds another plug. */
export function canJoin(a: ResolvedConnector, b: ResolvedConnector): JoinVerdict {
  const mating = mate(a.type, b.type)
  if (a.part === b.part) return { ok: false, mating, reason: `Both ends are on ${a.part.part.ref}.` }
  if (!mating.mates) return { ok: false, mating, reason: sentence(mating.reason ?? 'They do not mate') }
  for (const end of [a, b]) {
    const taken = takenBy(end)
    const clash = (mating.power && taken.power) || (mating.lanes > 0 && taken.data) || untyped(end, mating)
    if (clash) {
      const other = end.joints.map((joint) => connectorName(joint.a === end ? joint.b : joint.a))[0] ?? 'another plug'
      return { ok: false, mating, reason: `${connectorName(end)} already holds ${other}. Remove that joint first.` }
    }
  }
  return { ok: true, mating }
}

/** A connector that carries neither power nor data, or a joint that carries nothing, still takes only one plug. */
const untyped = (end: ResolvedConnector, mating: Mating): boolean =>
  end.joints.length > 0 &&
  ((!mating.power && mating.lanes === 0) || end.joints.some((joint) => !joint.mating.power && joint.mating.lanes === 0))

const sentence = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}.`
