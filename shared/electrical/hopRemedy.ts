import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import type { MomentId } from '../check/result.ts'
import { counted, listed, placeOf } from '../check/words.ts'
import type { Draw } from './attach.ts'
import { backplaneInlets, powerNeighbours } from './feeding.ts'
import { reliefWords, type Relief } from './relief.ts'

/** A hop that carries too much: whose it is, what hangs on it and what could move. */
export interface BusyHop {
  owner: ResolvedPart
  /** The connector that the relief is told by. */
  at: ResolvedConnector
  draws: readonly Draw[]
  relief: Relief
  moment: MomentId
}

/** What to do about a hop that carries too much; `otherwise` where nothing about it is special. */
export function hopRemedy({ owner, at, draws, relief, moment }: BusyHop, otherwise: string): string {
  const devices = [...new Set(draws.map(({ part }) => part))]
  const [only] = devices
  if (only && devices.length === 1) {
    const alone = aloneRemedy(only, owner)
    if (alone) return alone
  }
  const backplane = sharedBackplane(draws)
  if (backplane && backplane.inlets.length > 1) return backplaneRemedy(backplane, relief, moment)
  const move = reliefWords(relief, at)
  if (move) return moment === 'cold-start' ? `${move} Or start the drives in groups.` : move
  if (owner.model.supply) return `Move some of these devices to another lead of ${owner.part.ref}.`
  return owner.model.kind === 'board' || owner.model.kind === 'backplane'
    ? `Feed fewer devices through ${owner.part.ref}: give them leads of the supply.`
    : otherwise
}

/** A hop with one device on it: nothing can be moved off. Undefined where the lead on the way is the thing to change. */
function aloneRemedy(device: ResolvedPart, owner: ResolvedPart): string | undefined {
  const { ref } = device.part
  const feeding = device.connectors.flatMap(powerNeighbours).map(({ part }) => part)
  const board = [owner, ...feeding].find(({ model }) => model.kind === 'board')
  if (board && board !== device && device.connectors.every(({ type }) => type.side !== 'edge'))
    return `Feed ${ref} from a lead of the supply instead of ${board.part.ref}, through a fitting adapter.`
  if (owner !== device) return undefined
  return `Nothing else hangs on this plug: read the current of ${ref} off its label and state it on the part. If it stands, ${ref} needs another inlet or another model.`
}

/** The backplane in whose bays all these devices sit. */
function sharedBackplane(draws: readonly Draw[]): { part: ResolvedPart; inlets: ResolvedConnector[] } | undefined {
  const holders = new Set(
    draws
      .filter(({ part }) => part.model.kind !== 'backplane')
      .map(({ connector }) => powerNeighbours(connector)[0])
      .map((place) => (place?.connector.bay === undefined ? undefined : place.part)),
  )
  const [part] = holders
  return part && holders.size === 1 ? { part, inlets: backplaneInlets(part) } : undefined
}

function backplaneRemedy(
  { part, inlets }: { part: ResolvedPart; inlets: readonly ResolvedConnector[] },
  { move }: Relief,
  moment: MomentId,
): string {
  const open = inlets.filter((inlet) => powerNeighbours(inlet).length === 0)
  const groups = moment === 'cold-start' || moment === 'wake' ? ', or start the drives in groups' : ''
  if (open.length > 0)
    return `Join ${listed(open.map(placeOf))} to leads of their own, so that more inlets share the current${groups}.`
  const fewer =
    move > 0 ? `Move ${counted(move, 'drive')} out of ${part.part.ref}` : `Put fewer drives into ${part.part.ref}`
  return `${fewer}, or feed its inlets from more leads with thicker wire${groups}.`
}
