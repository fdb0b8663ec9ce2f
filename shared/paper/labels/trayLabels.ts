import { connectorName, listOf } from '../../build/edits/words.ts'
import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import { driveWords, serialTail } from '../words.ts'
import { partnersOf } from './farEnds.ts'
import type { Label, LabelLine } from './label.ts'

/** One label for the tray of every drive: bay and serial tail large, then what the drive is and what feeds it. */
export function trayLabels(build: ResolvedBuild): Label[] {
  const drives = build.parts.filter(({ model }) => model.kind === 'drive')
  const slotOf = ({ part }: ResolvedPart) => part.bay?.slot ?? Infinity
  return drives
    .sort((a, b) => slotOf(a) - slotOf(b))
    .map((drive) => ({
      id: `tray:${drive.part.id}`,
      group: 'tray',
      name: `${drive.part.ref} tray`,
      lines: linesOf(drive, severalCases(build)),
      isJoined: drive.connectors.some(({ joints }) => joints.length > 0),
    }))
}

const severalCases = (build: ResolvedBuild): ((drive: ResolvedPart) => string) => {
  const cases = build.parts.filter(({ model }) => model.kind === 'case')
  return ({ part }) => (cases.length > 1 ? `${build.partById.get(part.bay?.case ?? '')?.part.ref ?? ''} ` : '')
}

function linesOf(drive: ResolvedPart, caseOf: (drive: ResolvedPart) => string): LabelLine[] {
  const { ref, bay, serial, role } = drive.part
  const place = bay ? `${caseOf(drive)}bay ${bay.slot}` : 'no bay'
  const small = (text: string): LabelLine => ({ text, weight: 400, scale: 1 })
  const joined = (what: 'power' | 'lanes') =>
    drive.connectors.flatMap((plug) =>
      plug.joints
        .filter(({ mating }) => (what === 'power' ? mating.power : mating.lanes > 0))
        .flatMap((joint) => partnersOf(plug).filter((other) => other === joint.a || other === joint.b)),
    )
  const [power, data] = [joined('power'), joined('lanes')].map((ends) => listOf([...new Set(ends.map(connectorName))]))
  return [
    { text: `${place} · ${ref}`, weight: 700, scale: 1.4 },
    { text: serial ? serialTail(serial) : 'serial not known', weight: 700, scale: serial ? 1.4 : 1 },
    ...(serial && serialTail(serial) !== serial ? [small(serial)] : []),
    small(`${driveWords(drive.model)}${role ? `, ${role}` : ''}`),
    small(power === data ? `power and data: ${power || 'none'}` : `power: ${power || 'none'}; data: ${data || 'none'}`),
  ]
}
