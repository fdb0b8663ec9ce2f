import { baysOf } from '../../build/edits/bays.ts'
import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import type { CheckResult } from '../../check/result.ts'
import { frontMap, type FrontMap } from '../../layout/front.ts'
import { dataPathWords } from '../dataWays.ts'
import { powerWays, powerWords } from '../powerWays.ts'
import { driveWords, serialTail } from '../words.ts'

/** A drive beside the one that goes, as a hand meets it. */
export interface Neighbour {
  where: 'left' | 'right' | 'above' | 'below'
  bay: number
  /** Empty where the bay is. */
  ref: string
  tail: string
}

/** Everything that helps to pull the right drive, in words. */
export interface ReplaceCard {
  drive: string
  ref: string
  title: string
  bay: string
  serial: string
  tail: string
  what: string
  role: string
  power: string
  data: string
  neighbours: readonly Neighbour[]
  map: FrontMap | null
  mapTitle: string
  steps: readonly string[]
  cautions: readonly string[]
}

const noTail = 'no serial'
const tailOf = ({ part }: ResolvedPart): string => (part.serial ? serialTail(part.serial) : noTail)

/** The card for one drive; null where there is none of that id. */
export function replaceCard(build: ResolvedBuild, result: CheckResult | null, id: string): ReplaceCard | null {
  const drive = build.partById.get(id)
  if (!drive || drive.model.kind !== 'drive') return null
  const { ref, bay, serial, role } = drive.part
  const holder = bay ? build.partById.get(bay.case) : undefined
  const several = build.parts.filter(({ model }) => model.kind === 'case').length > 1
  const place = bay ? `${several && holder ? `${holder.part.ref} ` : ''}bay ${bay.slot}` : 'in no bay'
  return {
    drive: id,
    ref,
    title: `Replace ${ref}, ${place}`,
    bay: place,
    serial: serial ?? '',
    tail: tailOf(drive),
    what: driveWords(drive.model),
    role: role ?? '',
    power: powerWords(powerWays(drive)) || 'not fed',
    data: (result && dataPathWords(build, result.dataPaths, drive)) || 'no data path known',
    neighbours: neighboursOf(build, drive),
    map: holder && holder.model.bays.length > 0 ? frontMap(build, holder, 20, 3) : null,
    mapTitle: holder ? `${holder.part.ref} from the ${holder.model.bayView ?? 'front'}` : '',
    steps: stepsFor(drive, place),
    cautions: replaceCautions,
  }
}

const sides = [
  ['left', 0, -1],
  ['right', 0, 1],
  ['above', -1, 0],
  ['below', 1, 0],
] as const

function neighboursOf(build: ResolvedBuild, drive: ResolvedPart): Neighbour[] {
  const places = baysOf(build).filter((place) => place.case.part.id === drive.part.bay?.case)
  const own = places.find(({ bay }) => bay.slot === drive.part.bay?.slot)?.bay
  if (!own) return []
  return sides.flatMap(([where, down, across]) => {
    const beside = places.find(({ bay }) => bay.row === own.row + down && bay.column === own.column + across)
    if (!beside) return []
    const [there] = beside.drives
    return [{ where, bay: beside.bay.slot, ref: there?.part.ref ?? '', tail: there ? tailOf(there) : 'empty' }]
  })
}

/** In general words: what a controller or an array wants in detail is in its own manual. */
function stepsFor(drive: ResolvedPart, place: string): string[] {
  const { serial, role, ref } = drive.part
  const read = serial
    ? `Go to ${place}. Read the serial on the drive: it ends in ${serialTail(serial).replace('…', '')}. If it does not, stop.`
    : `Go to ${place}. The plan has no serial for ${ref}: find it by what the system reports before you pull anything.`
  const isMember = role === 'data' || role === 'parity'
  return [
    isMember
      ? 'See that a backup is there and that the array can bear the loss of this member; no other member may be missing.'
      : 'See that nothing on this drive is still needed, or that a backup is there.',
    'Have the system name the drive by its serial, and take it out of use there, as the manual of the controller or array says.',
    'Power off and disconnect the mains, unless bay, backplane and controller are all stated to allow a change while running.',
    read,
    'Compare the neighbours: their serials end as this card says.',
    'Pull it, note the serial of the new one, and put it in until it seats. Reconnect the same plugs.',
    'Power on. See that the system names the new serial in this bay, then let the array rebuild as its manual says.',
    'Write the new serial into the plan, print the changed label and the lid sheet.',
  ]
}

const replaceCautions = [
  'Pulling the wrong drive of an array with one already missing loses the array.',
  'A drive that was running spins for many seconds: wait before you turn it over.',
  'Touch bare metal of the case first: static discharge destroys electronics.',
  'The manuals of drive, controller, array and case come before this card.',
]
