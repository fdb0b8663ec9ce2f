import type { ResolvedBuild } from '../build/resolve.ts'
import { momentIds, type Figure, type MomentId, type Subject } from '../check/result.ts'
import { conductorSubject, connectorSubject, jointSubject, partSubject, railSubject } from '../check/subjects.ts'
import { nameOf } from '../check/words.ts'
import type { Quantity } from '../quantity/quantity.ts'
import type { Draw } from './attach.ts'
import { nothing } from './branchValues.ts'
import { loadFigureWithMostRange } from './evidence.ts'
import { exceeds, figureOf } from './figures.ts'
import { lineName } from './lines.ts'
import { conductorName, contactName, railName } from './names.ts'
import type { ContactLoad, ConductorLoad, LoadRange, PerMoment, PowerResult } from './result.ts'
import { allowedVoltage, isStart } from './tolerance.ts'
import { unsureWires, voltageAtLeast } from './unsureWay.ts'

/** A hop whose verdict would turn within the range of the figure it rests on most. */
export interface UnprovenHop extends Turn {
  name: string
  subject: Subject
  figure: Figure
}

interface Turn {
  turns: 'to-beyond' | 'to-within' | 'limit-unknown'
  moment: MomentId
  /** How far beyond the limit the far end lies: share of it, or volts. */
  share: number
}

interface Context {
  build: ResolvedBuild
  power: PowerResult
}

/** All hops whose verdict is not settled by the figures at hand. */
export function unprovenHops({ power, build }: Context): UnprovenHop[] {
  const { shortTimeAllowance } = build.settings
  const found = [...ofSupplies(power), ...ofVoltages(power), ...ofLengths(power)]
  for (const contact of power.contacts) found.push(...ofContact(power, contact, shortTimeAllowance))
  for (const wire of power.conductors) found.push(...ofWire(power, wire, shortTimeAllowance))
  return found
}

const none: UnprovenHop[] = []

function ofContact(power: PowerResult, contact: ContactLoad, allowance: number): UnprovenHop[] {
  const { limit_A, limitLow_A, current_A, rating } = contact
  if (current_A === nothing || (limitLow_A !== null && contact.most_A <= limitLow_A)) return none
  const turn =
    limit_A === null || limitLow_A === null
      ? turnOfUnknown(power, current_A)
      : turnOf(power, current_A, contact.range_A, limit_A, limitLow_A, allowance)
  if (!turn) return none
  const figure: Figure | null =
    turn.turns === 'limit-unknown'
      ? { what: `rating of one contact, ${contact.weaker.type.name}`, value: null, unit: 'A', origin: 'guess' }
      : deciding(power.behind(contact.line, contact.branch), turn.moment, limit_A! - limitLow_A!, rating)
  return figure ? [{ name: contactName(contact), subject: jointSubject(contact.joint), ...turn, figure }] : none
}

function ofWire(power: PowerResult, wire: ConductorLoad, allowance: number): UnprovenHop[] {
  const { limit_A, limitLow_A, current_A, ampacity } = wire
  if (limit_A === null || limitLow_A === null || current_A === nothing || wire.most_A <= limitLow_A) return none
  const turn = turnOf(power, current_A, wire.range_A, limit_A, limitLow_A, allowance)
  if (!turn) return none
  const draws = power.behind(wire.conductor.line, wire.branch)
  const figure = deciding(draws, turn.moment, limit_A - limitLow_A, ampacity)
  return figure
    ? [{ name: conductorName(wire), subject: conductorSubject(wire.part, wire.index), ...turn, figure }]
    : none
}

function ofSupplies(power: PowerResult): UnprovenHop[] {
  const judge = (
    name: string,
    subject: Subject,
    unit: 'A' | 'W',
    loads: { stated: PerMoment; range: LoadRange },
    quantity: Quantity | undefined,
    peak: Quantity | undefined,
    feeds: (source: { part: object; rail: { id: string } }) => boolean,
  ): UnprovenHop[] => {
    const limit = quantity?.value ?? quantity?.low
    if (!quantity || !limit) return none
    const limitLow = quantity.low ?? limit
    const atStart = Math.max(1, (peak?.value ?? peak?.low ?? limit) / limit)
    const turn = turnOf(power, loads.stated, loads.range, limit, limitLow, atStart)
    if (!turn) return none
    const draws = power.draws.filter((_, i) => power.devices[i]!.fedBy.some(feeds))
    const stated = figureOf(quantity, `limit of ${name}`, unit)
    const figure = deciding(draws, turn.moment, limit - limitLow, stated)
    return figure ? [{ name, subject, ...turn, figure }] : none
  }
  return [
    ...power.rails.flatMap(({ part, rail, current_A, range_A }) =>
      judge(
        railName(part, rail),
        railSubject(part, rail.id),
        'A',
        { stated: current_A, range: range_A },
        rail.limit_A,
        rail.peak_A,
        (source) => source.part === part && source.rail === rail,
      ),
    ),
    ...power.groups.flatMap(({ part, group, load, range, unit }) =>
      judge(
        `${part.part.ref} ${group.name}`,
        railSubject(part, group.id, 'group'),
        unit,
        { stated: load, range },
        unit === 'W' ? group.limit_W : group.limit_A,
        undefined,
        (source) => source.part === part && group.rails.includes(source.rail.id),
      ),
    ),
    ...power.totals.flatMap(({ part, load_W, range_W }) =>
      judge(
        nameOf(part),
        partSubject(part),
        'W',
        { stated: load_W, range: range_W },
        part.model.supply!.total_W,
        part.model.supply!.peakTotal_W,
        (source) => source.part === part,
      ),
    ),
  ]
}

function ofVoltages(power: PowerResult): UnprovenHop[] {
  return power.devices.flatMap((device, i): UnprovenHop[] => {
    if (device.fedBy.length === 0) return none
    let lowest: { moment: MomentId; by_V: number } | null = null
    for (let m = 0; m < momentIds.length; m++) {
      const moment = momentIds[m]!
      if (!power.applies.has(moment)) continue
      const { lowest_V } = allowedVoltage(device, moment)
      const by_V = lowest_V - device.atHigh_V[m]!
      if (device.voltage_V[m]! < lowest_V || by_V <= 1e-9) continue
      if (by_V > (lowest?.by_V ?? 0)) lowest = { moment, by_V }
    }
    const byLoad = lowest && loadFigureWithMostRange([power.draws[i]!], lowest.moment)
    if (!lowest || !byLoad) return none
    return [
      {
        name: `${device.part.part.ref} on ${lineName[device.rail]}`,
        subject: connectorSubject(device.connector),
        turns: 'to-beyond',
        moment: lowest.moment,
        share: lowest.by_V,
        figure: byLoad.figure,
      },
    ]
  })
}

/** Devices that see too little only because a length on their way is not known. */
function ofLengths(power: PowerResult): UnprovenHop[] {
  return power.devices.flatMap((device): UnprovenHop[] => {
    if (device.fedBy.length === 0) return none
    const short = momentIds.filter(
      (moment, m) => power.applies.has(moment) && device.voltage_V[m]! < allowedVoltage(device, moment).lowest_V,
    )
    const wires = short.length > 0 ? unsureWires(power, device) : []
    const [moment] = short
    const longest = wires[0]
    if (!moment || !longest) return none
    const turns = short.every((each) => voltageAtLeast(device, wires, each) >= allowedVoltage(device, each).lowest_V)
    return turns
      ? [
          {
            name: `${device.part.part.ref} on ${lineName[device.rail]}`,
            subject: connectorSubject(device.connector),
            turns: 'to-within',
            moment,
            share: 0,
            figure: longest.figure,
          },
        ]
      : none
  })
}

/** Compares the stated load with the far ends of loads and limit; the moment that turns by most. */
function turnOf(
  { applies }: PowerResult,
  stated: PerMoment,
  range: LoadRange,
  limit: number,
  limitLow: number,
  atStart: number,
): Turn | null {
  let found: Turn | null = null
  for (let m = 0; m < momentIds.length; m++) {
    const high = range.high[m]!
    // Most hops are far from any limit: no further look.
    if (high <= limitLow) continue
    const moment = momentIds[m]!
    if (!applies.has(moment)) continue
    const factor = isStart(moment) ? atStart : 1
    const share = high / (limitLow * factor)
    const beyond = exceeds(Math.abs(stated[m]!), limit * factor)
    const turns = beyond
      ? !exceeds(range.low[m]!, limit * factor) && ('to-within' as const)
      : exceeds(share, 1) && ('to-beyond' as const)
    if (turns && exceeds(share, found?.share ?? 0)) found = { turns, moment, share }
  }
  return found
}

/** Loaded, and nobody states what it may carry. */
function turnOfUnknown({ applies }: PowerResult, stated: PerMoment): Turn | null {
  const moment = momentIds.find((candidate, m) => applies.has(candidate) && stated[m] !== 0)
  return moment ? { turns: 'limit-unknown', moment, share: 0 } : null
}

/** The figure whose range moves the verdict most: the limit's, or one of the loads'. */
function deciding(
  draws: readonly Draw[],
  moment: MomentId,
  limitRange: number,
  limitFigure: Figure | null,
): Figure | null {
  const byLoad = loadFigureWithMostRange(draws, moment)
  if (byLoad && byLoad.range >= limitRange) return byLoad.figure
  return limitRange > 0 ? limitFigure : (byLoad?.figure ?? null)
}
