import type { ResolvedBuild } from '../build/resolve.ts'
import { lineName } from '../electrical/lines.ts'
import type {
  ConductorLoad,
  ContactLoad,
  DeviceLoad,
  PerMoment,
  PowerResult,
  SupplyGroupLoad,
  SupplyRailLoad,
  SupplyTotalLoad,
} from '../electrical/result.ts'
import type { Quantity } from '../quantity/quantity.ts'
import { nothing } from '../electrical/branchValues.ts'
import { allowedVoltage, isStart } from '../electrical/tolerance.ts'
import { conductorName, contactName, railName } from '../electrical/names.ts'
import { momentIds, type LedgerRow, type MomentId, type Subject } from './result.ts'
import { conductorSubject, connectorSubject, jointSubject, partSubject, railSubject } from './subjects.ts'
import { nameOf } from './words.ts'

/** Everything of a row that stays the same from moment to moment. */
type RowHead = Pick<LedgerRow, 'kind' | 'name' | 'rail' | 'unit' | 'about'> & { subject: Subject }

/**
 * The power ledger: for each moment that the build has, every rail, group, supply, contact, wire and device with load,
 * limit and margin. Currents are magnitudes. Planes of boards have no limit of their own and are left out, as are
 * contacts and wires behind which nothing draws.
 */
export function ledgerRows(build: ResolvedBuild, power: PowerResult): LedgerRow[] {
  const moments = momentIds.filter((moment) => power.applies.has(moment))
  const rows: LedgerRow[] = []
  const add = (head: RowHead, load: PerMoment, sustained: number | null, atStart = sustained) => {
    for (const moment of moments) {
      const limit = isStart(moment) ? atStart : sustained
      rows.push(row(head, moment, Math.abs(load[momentIds.indexOf(moment)]!), limit))
    }
  }

  for (const load of power.rails) {
    const { limit_A, peak_A } = load.rail
    const sustained = known(limit_A)
    add(railHead(load), load.current_A, sustained, known(peak_A) ?? sustained)
  }
  for (const load of power.groups)
    add(groupHead(load), load.load, known(load.unit === 'W' ? load.group.limit_W : load.group.limit_A))
  for (const load of power.totals) {
    const { total_W, peakTotal_W } = load.part.model.supply!
    const sustained = known(total_W)
    add(supplyHead(load), load.load_W, sustained, known(peakTotal_W) ?? sustained)
  }
  for (const contact of power.contacts)
    if (contact.current_A !== nothing) add(contactHead(contact), contact.current_A, contact.limit_A)
  for (const conductor of power.conductors)
    if (conductor.limit_A !== null && conductor.current_A !== nothing)
      add(conductorHead(conductor), conductor.current_A, conductor.limit_A)
  for (const device of power.devices)
    if (device.fedBy.length > 0) {
      const lowest_V = (moment: MomentId) => allowedVoltage(device, moment, build.settings).lowest_V
      add(deviceHead(device), device.voltage_V, lowest_V('at-rest'), lowest_V('cold-start'))
    }
  return rows
}

const known = (quantity: Quantity | undefined): number | null => quantity?.value ?? quantity?.low ?? null

function row(head: RowHead, moment: MomentId, load: number, limit: number | null): LedgerRow {
  return {
    subject: head.subject,
    kind: head.kind,
    name: head.name,
    rail: head.rail,
    moment,
    load,
    limit,
    unit: head.unit,
    margin: limit === null ? null : head.unit === 'V' ? load - limit : limit - load,
    share: limit === null || limit === 0 ? null : load / limit,
    shortTime: isStart(moment),
    about: head.about,
  }
}

const railHead = ({ part, rail, about }: SupplyRailLoad): RowHead => ({
  subject: railSubject(part, rail.id),
  kind: 'rail',
  name: railName(part, rail),
  rail: rail.rail,
  unit: 'A',
  about,
})

const groupHead = ({ part, group, unit, about }: SupplyGroupLoad): RowHead => ({
  subject: railSubject(part, group.id, 'group'),
  kind: 'group',
  name: `${part.part.ref} ${group.name}`,
  unit,
  about,
})

const supplyHead = ({ part, about }: SupplyTotalLoad): RowHead => ({
  subject: partSubject(part),
  kind: 'supply',
  name: nameOf(part),
  unit: 'W',
  about,
})

const contactHead = (contact: ContactLoad): RowHead => ({
  subject: jointSubject(contact.joint),
  kind: 'contact',
  name: contactName(contact),
  rail: contact.line,
  unit: 'A',
  about: contact.about,
})

const conductorHead = (load: ConductorLoad): RowHead => ({
  subject: conductorSubject(load.part, load.index),
  kind: 'wire',
  name: conductorName(load),
  rail: load.conductor.line,
  unit: 'A',
  about: load.about,
})

const deviceHead = ({ part, connector, rail, about }: DeviceLoad): RowHead => ({
  subject: connectorSubject(connector),
  kind: 'device',
  name: `${part.part.ref} ${lineName[rail]}`,
  rail,
  unit: 'V',
  about,
})
