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
import { isStart } from '../electrical/tolerance.ts'
import { conductorName, contactName, railName } from '../electrical/names.ts'
import { momentIds, type LedgerRow, type MomentId, type Subject } from './result.ts'
import { conductorSubject, connectorSubject, jointSubject, partSubject, railSubject } from './subjects.ts'
import { nameOf } from './words.ts'

/** Everything of a row that stays the same from moment to moment. */
type RowHead = Pick<LedgerRow, 'kind' | 'name' | 'rail' | 'unit' | 'about'> & { subject: Subject }

/** Called for each thing that has a load: what it is, what it carries, its limit for good and at a start. */
type Visit = <T>(
  head: (item: T) => RowHead,
  item: T,
  load: PerMoment,
  sustained: number | null,
  atStart: number | null,
) => void

/** Every rail, group, supply, contact and wire, in the order of the ledger. */
function visitLoads({ rails, groups, totals, contacts, conductors }: PowerResult, visit: Visit): void {
  for (const load of rails) {
    const sustained = known(load.rail.limit_A)
    visit(railHead, load, load.current_A, sustained, known(load.rail.peak_A) ?? sustained)
  }
  for (const load of groups) {
    const limit = known(load.unit === 'W' ? load.group.limit_W : load.group.limit_A)
    visit(groupHead, load, load.load, limit, limit)
  }
  for (const load of totals) {
    const { total_W, peakTotal_W } = load.part.model.supply!
    const sustained = known(total_W)
    visit(supplyHead, load, load.load_W, sustained, known(peakTotal_W) ?? sustained)
  }
  for (const contact of contacts)
    if (contact.current_A !== nothing) visit(contactHead, contact, contact.current_A, contact.limit_A, contact.limit_A)
  for (const conductor of conductors)
    if (conductor.limit_A !== null && conductor.current_A !== nothing)
      visit(conductorHead, conductor, conductor.current_A, conductor.limit_A, conductor.limit_A)
}

/**
 * The power ledger: for each moment that the build has, every rail, group, supply, contact, wire and device with load,
 * limit and margin. Currents are magnitudes. Planes of boards have no limit of their own and are left out, as are
 * contacts and wires behind which nothing draws.
 */
export function ledgerRows(power: PowerResult): LedgerRow[] {
  const moments = momentsOf(power)
  const rows: LedgerRow[] = []
  const add: Visit = (head, item, load, sustained, atStart) => {
    const made = head(item)
    for (const { moment, at, shortTime } of moments)
      rows.push(row(made, moment, Math.abs(load[at]!), shortTime ? atStart : sustained, shortTime))
  }
  visitLoads(power, add)
  for (const device of power.devices)
    if (device.fedBy.length > 0) {
      const { otherwise, atStart } = device.allowed
      add(deviceHead, device, device.voltage_V, otherwise.lowest_V, atStart.lowest_V)
    }
  return rows
}

/** The row of the ledger that is nearest to or furthest past its limit; null while all stay below this share of it. */
export function weakestRow(power: PowerResult, share: number): LedgerRow | null {
  const moments = momentsOf(power)
  let most = share
  let weakest: (() => LedgerRow) | null = null
  visitLoads(power, (head, item, load, sustained, atStart) => {
    for (const { moment, at, shortTime } of moments) {
      const limit = shortTime ? atStart : sustained
      if (limit === null || limit === 0) continue
      const carried = Math.abs(load[at]!)
      if (carried / limit <= most) continue
      most = carried / limit
      weakest = () => row(head(item), moment, carried, limit, shortTime)
    }
  })
  return (weakest as (() => LedgerRow) | null)?.() ?? null
}

const momentsOf = ({ applies }: PowerResult) =>
  momentIds.flatMap((moment, at) => (applies.has(moment) ? [{ moment, at, shortTime: isStart(moment) }] : []))

const known = (quantity: Quantity | undefined): number | null => quantity?.value ?? quantity?.low ?? null

function row(head: RowHead, moment: MomentId, load: number, limit: number | null, shortTime: boolean): LedgerRow {
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
    shortTime,
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
