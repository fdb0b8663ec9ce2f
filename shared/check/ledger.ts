import type { ResolvedBuild } from '../build/resolve.ts'
import { lineName } from '../electrical/lines.ts'
import type { ContactLoad, ConductorLoad, DeviceLoad, PerMoment, PowerResult } from '../electrical/result.ts'
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
  const moments = momentIds
    .map((moment, index) => ({ moment, index }))
    .filter(({ moment }) => power.applies.has(moment))
  const rows: LedgerRow[] = []
  const addRows = (head: RowHead, load: PerMoment, limitAt: (moment: MomentId) => number | null) => {
    for (const { moment, index } of moments) rows.push(row(head, moment, Math.abs(load[index]!), limitAt(moment)))
  }

  for (const { part, rail, current_A, about } of power.rails)
    addRows(
      {
        subject: railSubject(part, rail.id),
        kind: 'rail',
        name: railName(part, rail),
        rail: rail.rail,
        unit: 'A',
        about,
      },
      current_A,
      (moment) => {
        const sustained = rail.limit_A.value ?? rail.limit_A.low ?? null
        return isStart(moment) ? (rail.peak_A?.value ?? sustained) : sustained
      },
    )
  for (const { part, group, load, unit, about } of power.groups) {
    const limit = unit === 'W' ? group.limit_W : group.limit_A
    addRows(
      {
        subject: railSubject(part, group.id, 'group'),
        kind: 'group',
        name: `${part.part.ref} ${group.name}`,
        unit,
        about,
      },
      load,
      () => limit?.value ?? limit?.low ?? null,
    )
  }
  for (const { part, load_W, about } of power.totals) {
    const { total_W, peakTotal_W } = part.model.supply!
    const sustained = total_W.value ?? total_W.low ?? null
    addRows({ subject: partSubject(part), kind: 'supply', name: nameOf(part), unit: 'W', about }, load_W, (moment) =>
      isStart(moment) ? (peakTotal_W?.value ?? sustained) : sustained,
    )
  }
  for (const contact of power.contacts)
    if (contact.current_A !== nothing) addRows(contactHead(contact), contact.current_A, () => contact.limit_A)
  for (const conductor of power.conductors)
    if (conductor.limit_A !== null && conductor.current_A !== nothing)
      addRows(conductorHead(conductor), conductor.current_A, () => conductor.limit_A)
  for (const device of power.devices)
    if (device.fedBy.length > 0)
      addRows(deviceHead(device), device.voltage_V, (moment) => allowedVoltage(device, moment, build.settings).lowest_V)
  return rows
}

function row(
  { subject, kind, name, rail, unit, about }: RowHead,
  moment: MomentId,
  load: number,
  limit: number | null,
) {
  const made: LedgerRow = {
    subject,
    kind,
    name,
    moment,
    load,
    limit,
    unit,
    margin: limit === null ? null : unit === 'V' ? load - limit : limit - load,
    share: limit === null || limit === 0 ? null : load / limit,
    shortTime: isStart(moment),
    about,
  }
  if (rail !== undefined) made.rail = rail
  return made
}

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
