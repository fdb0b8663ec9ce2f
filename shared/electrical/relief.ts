import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import type { MomentId } from '../check/result.ts'
import { amount, counted, placeOf } from '../check/words.ts'
import type { Rail } from '../quantity/rails.ts'
import type { Draw } from './attach.ts'
import { busiest } from './evidence.ts'
import { spareOutlets } from './spareOutlets.ts'
import type { PowerResult } from './result.ts'

/** What would bring a load below its limit: devices to move, and where to. */
export interface Relief {
  /** How many devices have to go elsewhere. */
  move: number
  of: number
  /** What moves first, and where it fits. Absent where no open outlet has room. */
  first?: { part: ResolvedPart; from: ResolvedConnector; to: ResolvedConnector; left_A: number }
}

/** Room that an outlet must have beyond the device's own current for a move to be worth proposing. */
const comfort = 1.25

/** Works out how many of the devices behind a hop must go, heaviest first, and whether an open outlet takes the first. */
export function findRelief(
  power: PowerResult,
  draws: readonly Draw[],
  rail: Rail,
  moment: MomentId,
  excess_A: number,
): Relief {
  const loads = loadsByDrive(draws, rail, moment)
  let move = 0
  for (let left = excess_A; left > 1e-9 && move < loads.length; move++) left -= loads[move]!.load_A
  const first = loads[0]
  const outlet = first && feedingOutlet(first.draw)
  const spare = outlet && spareOutlets(power, outlet.type.id, rail, moment)[0]
  if (!first || !outlet || !spare || spare.left_A < first.load_A * comfort) return { move, of: loads.length }
  return {
    move,
    of: loads.length,
    first: { part: first.draw.part, from: outlet, to: spare.connector, left_A: spare.left_A },
  }
}

/** What each drive puts on the hop, heaviest first, at the place where it draws. */
function loadsByDrive(draws: readonly Draw[], rail: Rail, moment: MomentId) {
  const byDrive = new Map<ResolvedPart, { draw: Draw; load_A: number }>()
  for (const draw of draws) {
    if (draw.rail !== rail || draw.part.model.kind !== 'drive') continue
    const load_A = busiest(draw, moment).value * draw.share
    const known = byDrive.get(draw.part)
    if (known) known.load_A += load_A
    else byDrive.set(draw.part, { draw, load_A })
  }
  return [...byDrive.values()].sort((a, b) => b.load_A - a.load_A)
}

/** The connector that feeds a device at the place where it draws. */
export function feedingOutlet({ connector }: Draw): ResolvedConnector | undefined {
  const joint = connector.joints.find(({ mating }) => mating.power)
  return joint && (joint.a === connector ? joint.b : joint.a)
}

/** The proposal as a sentence; empty where there is nothing to move. */
export function reliefWords({ move, of, first }: Relief, hop: ResolvedConnector): string {
  if (move === 0) return ''
  if (!first) return `Feed ${counted(move, 'drive')} of these ${of} another way than through ${placeOf(hop)}.`
  const rest = move > 1 ? ` and ${counted(move - 1, 'more drive')} to another lead` : ''
  return `Move ${first.part.part.ref} from ${placeOf(first.from)} to ${placeOf(first.to)}, which has ${amount(first.left_A, 'A')} left${rest}.`
}
