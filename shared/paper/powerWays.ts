import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import { carriesPower, outletsOf } from '../layout/carries.ts'
import { refRanges } from './diagram/partsBlock.ts'

/** One outlet passed on the way from a supply: the part and the label beside its connector. */
export interface WayStep {
  part: ResolvedPart
  outlet: ResolvedConnector
}

/** A way that power takes to a part, the supply's socket first. */
export interface PowerWay {
  steps: readonly WayStep[]
  /** Where it begins: at a supply, nowhere, or in itself. */
  from: 'supply' | 'open' | 'circle'
}

/** Steps of a way that are followed before it is taken for a circle, and ways before one stops counting. */
const mostSteps = 24
const mostWays = 12

/** Every way by which power comes to a part; several where a backplane has several inlets. None: nothing is plugged in. */
export function powerWays(part: ResolvedPart): PowerWay[] {
  const ways: PowerWay[] = []
  follow(part.connectors, [], ways)
  return ways
}

function follow(inlets: readonly ResolvedConnector[], behind: readonly WayStep[], ways: PowerWay[]): void {
  const joints = inlets.flatMap((inlet) => inlet.joints.map((joint) => ({ joint, inlet })))
  const feeding = joints.filter(({ joint }) => joint.mating.power)
  if (feeding.length === 0 && behind.length > 0) ways.push({ steps: behind, from: 'open' })
  const seen = new Set<ResolvedConnector>()
  for (const { joint, inlet } of feeding) {
    if (ways.length >= mostWays) return
    const outlet = joint.a === inlet ? joint.b : joint.a
    if (seen.has(outlet)) continue
    seen.add(outlet)
    const steps = [{ part: outlet.part, outlet }, ...behind]
    if (outlet.part.model.kind === 'supply') ways.push({ steps, from: 'supply' })
    else if (steps.length >= mostSteps || behind.some((step) => step.outlet === outlet))
      ways.push({ steps, from: 'circle' })
    else follow(inletsBehind(outlet), steps, ways)
  }
}

/**
 * Inlets whose wires lead to an outlet, those with a partner first. The planes of a board tie all that they touch
 * together; a cable is followed against the way it is wired.
 */
function inletsBehind({ part, connector }: ResolvedConnector): ResolvedConnector[] {
  const outlets = outletsOf(part)
  const hasPlanes = part.model.kind === 'backplane' || part.model.kind === 'board'
  const back = new Set([connector.id])
  for (const id of back)
    for (const { from, to, line } of part.model.wiring) {
      if (line === 'return') continue
      if (to === id) back.add(from)
      if (hasPlanes && from === id) back.add(to)
    }
  return part.connectors
    .filter((one) => carriesPower(one) && back.has(one.connector.id) && !outlets.has(one.connector.id))
    .sort((a, b) => Math.sign(b.joints.length) - Math.sign(a.joints.length))
}

const stepWords = ({ part, outlet }: WayStep): string => `${part.part.ref} ${outlet.connector.label}`

/** "T1 drives 1 > W2 1 > W5 2", from the supply to the plug. */
export const wayWords = ({ steps }: PowerWay): string => steps.map(stepWords).join(' > ')

/** All ways of a part in words; what is shared is said once: "T1 > W3 to W8 > U1 bay 3". Empty: nothing is plugged in. */
export function powerWords(ways: readonly PowerWay[]): string {
  const [first, ...others] = ways
  if (!first) return ''
  const words = others.length === 0 ? wayWords(first) : severalWords(first, ways)
  if (ways.some(({ from }) => from === 'circle')) return `in a circle at ${words}`
  return ways.every(({ from }) => from === 'open') ? `open at ${words}` : words
}

function severalWords(first: PowerWay, ways: readonly PowerWay[]): string {
  let shared = 0
  const fromEnd = (way: PowerWay, i: number) => way.steps.at(-1 - i)?.outlet
  while (shared < first.steps.length && ways.every((way) => fromEnd(way, shared) === fromEnd(first, shared))) shared++
  const heads = ways.map(({ steps }) => steps.slice(0, steps.length - shared))
  const after = first.steps.slice(first.steps.length - shared).map(stepWords)
  return [...headWords(heads), ...after].join(' > ')
}

/** Ways of one length level by level, others each for itself. */
function headWords(heads: readonly (readonly WayStep[])[]): string[] {
  const depth = heads[0]?.length ?? 0
  if (heads.some((steps) => steps.length !== depth))
    return [heads.map((steps) => steps.map(stepWords).join(' > ')).join(' and ')]
  return Array.from({ length: depth }, (_, level) =>
    refRanges([...new Set(heads.flatMap((steps) => steps[level]?.part.part.ref ?? []))]),
  )
}
