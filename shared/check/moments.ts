import type { ResolvedJoint } from '../build/resolve.ts'
import { momentName } from '../electrical/names.ts'
import type { ContactLoad, DeviceLoad, PowerResult } from '../electrical/result.ts'
import { dc_W, wallLoad } from '../electrical/wall.ts'
import { momentIds, type DeviceVoltage, type JointFlow, type MomentResult, type TimelineStep } from './result.ts'

/** Every moment with the currents of the joints, the voltages of the devices and the load at the wall. */
export function momentResults(power: PowerResult): MomentResult[] {
  const joints = contactsByJoint(power.contacts)
  return momentIds.map((moment, index) => {
    const wall = wallLoad(power, moment)
    return {
      moment,
      label: momentName[moment],
      applies: power.applies.has(moment),
      joints: joints.map(([joint, contacts]) => jointFlow(joint, contacts, index)),
      devices: power.devices.map((device) => deviceVoltage(device, index)),
      dc_W: dc_W(power, moment),
      wall_W: wall?.watts ?? null,
      wall_VA: wall?.voltAmperes ?? null,
    }
  })
}

/** The steps of the staged start; empty without one. */
export function timelineSteps({ timeline, rails }: PowerResult): TimelineStep[] {
  return timeline.map(({ from_s, starting, rails_A }) => ({
    from_s,
    rails: rails.map(({ part, rail }, i) => ({ part: part.part.id, rail: rail.id, current_A: rails_A[i]! })),
    starting: starting.map(({ part }) => part.id),
  }))
}

function contactsByJoint(contacts: readonly ContactLoad[]): [ResolvedJoint, ContactLoad[]][] {
  const byJoint = new Map<ResolvedJoint, ContactLoad[]>()
  for (const contact of contacts) {
    const others = byJoint.get(contact.joint)
    if (others) others.push(contact)
    else byJoint.set(contact.joint, [contact])
  }
  return [...byJoint]
}

function jointFlow({ joint }: ResolvedJoint, contacts: readonly ContactLoad[], index: number): JointFlow {
  const current_A: JointFlow['current_A'] = {}
  let share: number | null = null
  for (const { line, current_A: currents, limit_A } of contacts) {
    const current = currents[index]!
    current_A[line] = current
    if (limit_A) share = Math.max(share ?? 0, Math.abs(current) / limit_A)
  }
  return { joint: joint.id, current_A, share }
}

function deviceVoltage({ part, connector, rail, ...load }: DeviceLoad, index: number): DeviceVoltage {
  const arrives = load.fedBy.length > 0
  const { wire, contact, return: back } = load.drop_V
  return {
    part: part.part.id,
    connector: connector.connector.id,
    rail,
    current_A: load.current_A[index]!,
    voltage_V: arrives ? load.voltage_V[index]! : null,
    drop_V: arrives ? { wire: wire[index]!, contact: contact[index]!, return: back[index]! } : null,
  }
}
