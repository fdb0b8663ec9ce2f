import { bayRange, connectorName, listOf, numberRanges } from '../../build/edits/words.ts'
import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { carriesData, carriesPower, outletsOf } from '../../layout/carries.ts'
import { refRanges } from '../diagram/partsBlock.ts'

/** Names that are listed one by one; more of them are counted. */
const mostNames = 4

/** Connectors of other parts that are plugged into this one. */
export const partnersOf = (connector: ResolvedConnector): ResolvedConnector[] =>
  connector.joints.map((joint) => (joint.a === connector ? joint.b : joint.a))

/** Where connectors are, as a hand looks for them: "C7, bay 7", "K2 port A", "C1 to C4, bays 1 to 4". */
export function placesWords(connectors: readonly ResolvedConnector[]): string {
  if (connectors.length === 0) return 'free'
  const isDrive = ({ part }: ResolvedConnector) => part.model.kind === 'drive'
  const drives = [...new Set(connectors.filter(isDrive).map(({ part }) => part))]
  const others = gathered(connectors.filter((connector) => !isDrive(connector)).map(nameInCase))
  const named =
    others.length > mostNames ? [...others.slice(0, mostNames - 1), `${others.length - mostNames + 1} more`] : others
  return listOf([...(drives.length > 0 ? [drivesWords(drives)] : []), ...named])
}

/** Names that differ only in their last number, told as one: "W8 tail 1 to 4". */
function gathered(names: readonly string[]): string[] {
  const numbers = new Map<string, Set<number>>()
  for (const name of names) {
    const [, stem = name, number] = /^(.*?)(\d+)$/.exec(name) ?? []
    const known = numbers.get(stem) ?? new Set()
    numbers.set(stem, number === undefined ? known : known.add(Number(number)))
  }
  return [...numbers].map(([stem, all]) => `${stem}${numberRanges(all)}`)
}

function drivesWords(drives: readonly ResolvedPart[]): string {
  const refs = refRanges(drives.map(({ part }) => part.ref))
  const slots = drives.flatMap(({ part }) => part.bay?.slot ?? [])
  return slots.length === 0 ? `${refs}, in no bay` : `${refs}, ${bayRange(slots)}`
}

/** A backplane's connector with the bays behind it, where it serves only some. */
function nameInCase(connector: ResolvedConnector): string {
  const name = connectorName(connector)
  const { bay } = connector.connector
  const first = connector.part.part.bay?.slot
  return bay === undefined || first === undefined ? name : `${name}, bay ${first + bay - 1}`
}

/** The ends of the same cable that an end is wired to, told apart by what the wires carry. */
export interface FarEnds {
  data: ResolvedConnector[]
  power: ResolvedConnector[]
}

/** Follows the wires and lanes of one cable from one of its ends to the others. */
export function farEnds(end: ResolvedConnector): FarEnds {
  return { data: carriesData(end) ? alongLanes(end) : [], power: carriesPower(end) ? alongWires(end) : [] }
}

function alongLanes({ part, connector }: ResolvedConnector): ResolvedConnector[] {
  const ids = new Set(
    part.model.lanes.flatMap(({ from, to }) => (from === connector.id ? to : to === connector.id ? from : [])),
  )
  return part.connectors.filter((other) => ids.has(other.connector.id))
}

/** Up the wires from an outlet to the inlets that feed it, down from an inlet to what it feeds. */
function alongWires({ part, connector }: ResolvedConnector): ResolvedConnector[] {
  const outlets = outletsOf(part)
  const isOutlet = outlets.has(connector.id)
  const reached = new Set([connector.id])
  for (const id of reached)
    for (const { from, to, line } of part.model.wiring) {
      if (line === 'return') continue
      if (isOutlet && to === id) reached.add(from)
      if (!isOutlet && from === id) reached.add(to)
    }
  return part.connectors.filter(
    (other) => reached.has(other.connector.id) && outlets.has(other.connector.id) !== isOutlet,
  )
}
