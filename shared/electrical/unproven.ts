import type { ResolvedBuild } from '../build/resolve.ts'
import { momentIds, type Figure, type MomentId, type Subject } from '../check/result.ts'
import { conductorSubject, connectorSubject, jointSubject, partSubject, railSubject } from '../check/subjects.ts'
import { nameOf } from '../check/words.ts'
import type { Quantity } from '../quantity/quantity.ts'
import type { Draw } from './attach.ts'
import { loadFigureWithMostRange } from './evidence.ts'
import { exceeds, figureOf } from './figures.ts'
import { lineName } from './lines.ts'
import { conductorName, contactName, railName } from './names.ts'
import type { LoadRange, PerMoment, PowerResult } from './result.ts'
import { allowedVoltage, isStart } from './tolerance.ts'

/** A hop whose verdict would turn within the range of the figure it rests on most. */
export interface UnprovenHop {
  name: string
  subject: Subject
  turns: 'to-beyond' | 'to-within' | 'limit-unknown'
  moment: MomentId
  share: number
  figure: Figure
}

interface Hop {
  name: string
  subject: Subject
  stated: PerMoment
  range: LoadRange
  limit: number
  limitLow: number
  /** What a start may take for its seconds. */
  startLimit: number
  limitFigure: Figure | null
  draws: () => readonly Draw[]
}

interface Context {
  build: ResolvedBuild
  power: PowerResult
}

/** All hops whose verdict is not settled by the figures at hand. */
export function unprovenHops(context: Context): UnprovenHop[] {
  return [
    ...hopsOf(context).flatMap((hop) => judge(context.power, hop)),
    ...unknownRatings(context.power),
    ...unsureVoltages(context),
  ]
}

function hopsOf({ power, build }: Context): Hop[] {
  const { shortTimeAllowance } = build.settings
  const contacts = power.contacts.flatMap((contact): Hop[] => {
    const { limit_A: limit, limitLow_A, current_A, range_A: range, rating } = contact
    if (limit === null || limitLow_A === null) return []
    const draws = () => power.behind(contact.line, contact.branch)
    const head = { name: contactName(contact), subject: jointSubject(contact.joint) }
    return [
      {
        ...head,
        stated: current_A,
        range,
        limit,
        limitLow: limitLow_A,
        startLimit: shortTimeAllowance,
        limitFigure: rating,
        draws,
      },
    ]
  })
  const wires = power.conductors.flatMap((wire): Hop[] => {
    const { limit_A: limit, limitLow_A, current_A, range_A: range, ampacity } = wire
    if (limit === null || limitLow_A === null) return []
    const draws = () => power.behind(wire.conductor.line, wire.branch)
    const head = { name: conductorName(wire), subject: conductorSubject(wire.part, wire.index) }
    return [
      {
        ...head,
        stated: current_A,
        range,
        limit,
        limitLow: limitLow_A,
        startLimit: shortTimeAllowance,
        limitFigure: ampacity,
        draws,
      },
    ]
  })
  return [...contacts, ...wires, ...supplyHops(power)]
}

function supplyHops(power: PowerResult): Hop[] {
  const fed = (wanted: (part: object, rail: string) => boolean) => () =>
    power.draws.filter((_, i) => power.devices[i]!.fedBy.some(({ part, rail }) => wanted(part, rail.id)))
  const hop = (
    head: { name: string; subject: Subject },
    stated: PerMoment,
    range: LoadRange,
    quantity: Quantity | undefined,
    peak: Quantity | undefined,
    unit: 'A' | 'W',
    draws: () => readonly Draw[],
  ): Hop[] => {
    const limit = quantity?.value ?? quantity?.low
    if (!quantity || !limit) return []
    const startLimit = Math.max(1, (peak?.value ?? peak?.low ?? limit) / limit)
    const limitFigure = figureOf(quantity, `limit of ${head.name}`, unit)
    return [{ ...head, stated, range, limit, limitLow: quantity.low ?? limit, startLimit, limitFigure, draws }]
  }
  return [
    ...power.rails.flatMap(({ part, rail, current_A, range_A }) =>
      hop(
        { name: railName(part, rail), subject: railSubject(part, rail.id) },
        current_A,
        range_A,
        rail.limit_A,
        rail.peak_A,
        'A',
        fed((source, id) => source === part && id === rail.id),
      ),
    ),
    ...power.groups.flatMap(({ part, group, load, range, unit }) =>
      hop(
        { name: `${part.part.ref} ${group.name}`, subject: railSubject(part, group.id, 'group') },
        load,
        range,
        unit === 'W' ? group.limit_W : group.limit_A,
        undefined,
        unit,
        fed((source, id) => source === part && group.rails.includes(id)),
      ),
    ),
    ...power.totals.flatMap(({ part, load_W, range_W }) =>
      hop(
        { name: nameOf(part), subject: partSubject(part) },
        load_W,
        range_W,
        part.model.supply!.total_W,
        part.model.supply!.peakTotal_W,
        'W',
        fed((source) => source === part),
      ),
    ),
  ]
}

/** Compares the stated load with the far ends of loads and limit; keeps the moment that turns by most. */
function judge(power: PowerResult, hop: Hop): UnprovenHop[] {
  let found: Pick<UnprovenHop, 'turns' | 'moment' | 'share'> | null = null
  for (const [m, moment] of momentIds.entries()) {
    if (!power.applies.has(moment)) continue
    const factor = isStart(moment) ? hop.startLimit : 1
    const beyond = exceeds(Math.abs(hop.stated[m]!), hop.limit * factor)
    const worstShare = hop.range.high[m]! / (hop.limitLow * factor)
    const bestShare = hop.range.low[m]! / (hop.limit * factor)
    const turns = beyond ? (exceeds(bestShare, 1) ? null : 'to-within') : exceeds(worstShare, 1) ? 'to-beyond' : null
    if (turns && exceeds(worstShare, found?.share ?? 0)) found = { turns, moment, share: worstShare }
  }
  const figure = found && decidingFigure(power, hop, found.moment)
  return found && figure ? [{ name: hop.name, subject: hop.subject, ...found, figure }] : []
}

/** The figure whose range moves the verdict most: the limit's, or one of the loads'. */
function decidingFigure(power: PowerResult, hop: Hop, moment: MomentId): Figure | null {
  const byLoad = loadFigureWithMostRange(power, hop.draws(), moment)
  const limitRange = hop.limit - hop.limitLow
  return byLoad && byLoad.range >= limitRange
    ? byLoad.figure
    : limitRange > 0
      ? hop.limitFigure
      : (byLoad?.figure ?? null)
}

/** Loaded contacts whose rating nobody states. */
function unknownRatings(power: PowerResult): UnprovenHop[] {
  return power.contacts.flatMap((contact): UnprovenHop[] => {
    if (contact.limit_A !== null) return []
    const loaded = momentIds.find((moment, m) => power.applies.has(moment) && contact.current_A[m] !== 0)
    if (!loaded) return []
    return [
      {
        name: contactName(contact),
        subject: jointSubject(contact.joint),
        turns: 'limit-unknown',
        moment: loaded,
        share: 0,
        figure: { what: `rating of one contact, ${contact.weaker.type.name}`, value: null, unit: 'A', origin: 'guess' },
      },
    ]
  })
}

function unsureVoltages({ power, build }: Context): UnprovenHop[] {
  return power.devices.flatMap((device, i): UnprovenHop[] => {
    if (device.fedBy.length === 0) return []
    let lowest: { moment: MomentId; by_V: number } | null = null
    for (const [m, moment] of momentIds.entries()) {
      if (!power.applies.has(moment)) continue
      const { lowest_V } = allowedVoltage(device, moment, build.settings)
      const by_V = lowest_V - device.atHigh_V[m]!
      if (device.voltage_V[m]! < lowest_V || by_V <= 1e-9) continue
      if (by_V > (lowest?.by_V ?? 0)) lowest = { moment, by_V }
    }
    const byLoad = lowest && loadFigureWithMostRange(power, [power.draws[i]!], lowest.moment)
    if (!lowest || !byLoad) return []
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
