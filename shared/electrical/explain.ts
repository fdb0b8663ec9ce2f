import type { ResolvedBuild } from '../build/resolve.ts'
import type { Figure, MomentId, Subject } from '../check/result.ts'
import { conductorSubject, connectorSubject, jointSubject, railSubject } from '../check/subjects.ts'
import { amount } from '../check/words.ts'
import { nominal_V, type Line, type Rail } from '../quantity/rails.ts'
import { onlyWay } from './downstream.ts'
import { busiest, loadFigures, momentIndex } from './evidence.ts'
import { figureOf } from './figures.ts'
import { lineIndex, lineName } from './lines.ts'
import { atMoment, conductorName, contactName, railName } from './names.ts'
import type { ConductorLoad, ContactLoad, DeviceLoad, PowerResult } from './result.ts'
import { allowedVoltage, toleranceFigure } from './tolerance.ts'

/** One stretch of the way of the current, from the supply on. */
export interface ExplainedHop {
  kind: 'source' | 'contact' | 'wire' | 'device'
  name: string
  subject: Subject
  current_A: number
  resistance_ohm: number
  /** Resistance times current. */
  drop_V: number
  /** What is left of the rail after this hop. */
  voltage_V: number
  limit_A: number | null
}

/** One line of arithmetic: what is worked out, the formula with its values, the result. */
export interface ExplainedStep {
  what: string
  formula: string
  value: number
  unit: 'A' | 'V' | 'W' | 'ohm' | ''
}

/** How a number was made: for the panel that opens on a click. */
export interface Explanation {
  title: string
  moment: MomentId
  /** From the supply to the thing explained; empty where the current has more than one way, or none. */
  hops: ExplainedHop[]
  steps: ExplainedStep[]
  figures: Figure[]
}

/** What can be explained: one contact, wire, rail or device, on one line. */
export type ExplainTarget =
  | { kind: 'joint'; joint: string; line: Line }
  | { kind: 'conductor'; part: string; conductor: number }
  | { kind: 'rail'; part: string; rail: string }
  | { kind: 'device'; part: string; connector: string; rail: Rail }

interface Context {
  build: ResolvedBuild
  power: PowerResult
}

/** Explains a number of the ledger; null where the target is not part of the network. */
export function explain({ build, power }: Context, target: ExplainTarget, moment: MomentId): Explanation | null {
  switch (target.kind) {
    case 'joint': {
      const contact = power.contacts.find(({ joint, line }) => joint.joint.id === target.joint && line === target.line)
      return contact ? ofContact(power, contact, moment) : null
    }
    case 'conductor': {
      const wire = power.conductors.find(
        ({ part, index }) => part.part.id === target.part && index === target.conductor,
      )
      return wire ? ofWire(power, wire, moment) : null
    }
    case 'rail':
      return ofRail(power, target.part, target.rail, moment)
    case 'device': {
      const device = power.devices.find(
        ({ part, connector, rail }) =>
          part.part.id === target.part && connector.connector.id === target.connector && rail === target.rail,
      )
      return device ? ofDevice(build, power, device, moment) : null
    }
  }
}

function ofContact(power: PowerResult, contact: ContactLoad, moment: MomentId): Explanation {
  const { line, branch, contacts, rating, limit_A } = contact
  const current = Math.abs(contact.current_A[momentIndex(moment)]!)
  const limit: ExplainedStep[] =
    limit_A === null || rating === null
      ? []
      : [
          {
            what: 'limit of the contacts that meet',
            formula: `${contacts} contacts x ${rating.value ?? '?'} A`,
            value: limit_A,
            unit: 'A',
          },
        ]
  return {
    title: `${contactName(contact)} ${atMoment(moment)}`,
    moment,
    hops: hopsTo(power, line, branch, moment),
    steps: [...sumStep(power, line, branch, moment, current), ...limit, ...shareStep(current, limit_A)],
    figures: [...(rating ? [rating] : []), ...loadFigures(power.behind(line, branch), moment, 12)],
  }
}

function ofWire(power: PowerResult, wire: ConductorLoad, moment: MomentId): Explanation {
  const { branch, conductor, limit_A, ampacity, resistance_ohm } = wire
  const current = Math.abs(wire.current_A[momentIndex(moment)]!)
  const limit: ExplainedStep[] =
    limit_A === null || ampacity === null
      ? []
      : [
          {
            what: 'limit of the conductor',
            formula: conductor.ampacity_A
              ? `${ampacity.value ?? '?'} A as stated`
              : `${conductor.wires} x ${ampacity.value ?? '?'} A x ${power.network.build.settings.bundleFactor} in a bundle`,
            value: limit_A,
            unit: 'A',
          },
        ]
  const resistance: ExplainedStep = {
    what: 'resistance',
    formula: resistanceFormula(wire, power.network.build.settings.wireTemperature_C),
    value: resistance_ohm,
    unit: 'ohm',
  }
  return {
    title: `${conductorName(wire)} ${atMoment(moment)}`,
    moment,
    hops: hopsTo(power, conductor.line, branch, moment),
    steps: [
      ...sumStep(power, conductor.line, branch, moment, current),
      resistance,
      ...limit,
      ...shareStep(current, limit_A),
    ],
    figures: [
      ...(ampacity ? [ampacity] : []),
      ...(conductor.length_mm ? [figureOf(conductor.length_mm, 'length', 'mm')] : []),
      ...loadFigures(power.behind(conductor.line, branch), moment, 12),
    ],
  }
}

function resistanceFormula({ conductor, resistance_ohm }: ConductorLoad, temperature_C: number): string {
  if (resistance_ohm === 0) return 'none counted: the supply holds its tolerance at the end of its own leads'
  if (conductor.resistance_mohm) return `${conductor.resistance_mohm.value ?? '?'} mohm as stated`
  const size = conductor.awg === undefined ? `${conductor.area_mm2?.value ?? '?'} mm2` : `${conductor.awg} AWG`
  return `rho(${temperature_C} degC) x ${conductor.length_mm?.value ?? '?'} mm / (${size} x ${conductor.wires})`
}

function ofRail(power: PowerResult, partId: string, railId: string, moment: MomentId): Explanation | null {
  const load = power.rails.find(({ part, rail }) => part.part.id === partId && rail.id === railId)
  if (!load) return null
  const draws = power.draws.filter((_, i) => power.devices[i]!.fedBy.some(({ rail }) => rail === load.rail))
  const current = load.current_A[momentIndex(moment)]!
  const limit = load.rail.limit_A.value ?? load.rail.limit_A.low ?? null
  return {
    title: `${railName(load.part, load.rail)} ${atMoment(moment)}`,
    moment,
    hops: [],
    steps: [
      { what: 'sum of all devices on it', formula: sumOf(draws, moment), value: current, unit: 'A' },
      ...shareStep(current, limit),
    ],
    figures: [
      figureOf(load.rail.limit_A, `limit of ${railName(load.part, load.rail)}`, 'A'),
      ...loadFigures(draws, moment, 12),
    ],
  }
}

function ofDevice(build: ResolvedBuild, power: PowerResult, device: DeviceLoad, moment: MomentId): Explanation {
  const m = momentIndex(moment)
  const { rail, connector, part, drop_V } = device
  const { wire, contact, return: back } = drop_V
  const set = device.voltage_V[m]! + wire[m]! + contact[m]! + back[m]!
  const volts = (value: number) => value.toFixed(3)
  const at = lineIndex[rail]
  const last = power.network.byLine[at]!.towardsSource[connector.index]!
  const figure = device.figures[moment]
  const arrives = device.fedBy.length > 0
  return {
    title: `${part.part.ref} on ${lineName[rail]} ${atMoment(moment)}`,
    moment,
    hops: [...(last < 0 ? [] : hopsTo(power, rail, last, moment)), ...(arrives ? [deviceHop(device, m)] : [])],
    steps: arrives
      ? [
          {
            what: 'voltage at its plug',
            formula: `${volts(set)} V - ${volts(wire[m]!)} V in wire - ${volts(contact[m]!)} V in contacts - ${volts(back[m]!)} V in the return`,
            value: device.voltage_V[m]!,
            unit: 'V',
          },
          {
            what: 'lowest that it accepts',
            formula: toleranceFigure(device, moment, build.settings).what,
            value: allowedVoltage(device, moment).lowest_V,
            unit: 'V',
          },
        ]
      : [],
    figures: [toleranceFigure(device, moment, build.settings), ...(figure ? [figure] : [])],
  }
}

const deviceHop = (device: DeviceLoad, m: number): ExplainedHop => ({
  kind: 'device',
  name: device.part.part.ref,
  subject: connectorSubject(device.connector),
  current_A: device.current_A[m]!,
  resistance_ohm: 0,
  drop_V: 0,
  voltage_V: device.voltage_V[m]!,
  limit_A: null,
})

/** The hops from the supply to a branch and through it; on the return, in the same order, against the current. */
function hopsTo(power: PowerResult, line: Line, branch: number, moment: MomentId): ExplainedHop[] {
  const at = lineIndex[line]
  const network = power.network.byLine[at]!
  const { from, to } = network.plan
  const node = [to[branch]!, from[branch]!].find((end) => network.towardsSource[end] === branch)
  const way = node === undefined ? [] : onlyWay(network, node).reverse()
  const first = way[0] === undefined ? undefined : network.branches[way[0]]
  if (first?.kind !== 'feed') return []
  const m = momentIndex(moment)
  const { source } = first
  let volts = (line === 'return' ? 0 : nominal_V[line]) + source.above_V
  const name = source.rail ? railName(source.part, source.rail) : `${source.part.part.ref} return`
  const hops: ExplainedHop[] = [
    {
      kind: 'source',
      name,
      subject: source.rail ? railSubject(source.part, source.rail.id) : connectorSubject(first.connector),
      current_A: currentOf(power.byBranch[at]![way[0]!] ?? power.byBranch[at]![way[1] ?? -1], m),
      resistance_ohm: 0,
      drop_V: 0,
      voltage_V: volts,
      limit_A: source.rail ? (source.rail.limit_A.value ?? null) : null,
    },
  ]
  for (const each of way) {
    const load = power.byBranch[at]![each]
    if (!load) continue
    const current_A = currentOf(load, m)
    const drop_V = current_A * load.resistance_ohm
    volts += line === 'return' ? drop_V : -drop_V
    hops.push({
      ...nameOf(load),
      current_A,
      resistance_ohm: load.resistance_ohm,
      drop_V,
      voltage_V: volts,
      limit_A: load.limit_A,
    })
  }
  return hops
}

const currentOf = (load: ContactLoad | ConductorLoad | null | undefined, m: number): number =>
  Math.abs(load?.current_A[m] ?? 0)

const nameOf = (load: ContactLoad | ConductorLoad): Pick<ExplainedHop, 'kind' | 'name' | 'subject'> =>
  'joint' in load
    ? { kind: 'contact', name: contactName(load), subject: jointSubject(load.joint) }
    : { kind: 'wire', name: conductorName(load), subject: conductorSubject(load.part, load.index) }

function sumStep(power: PowerResult, line: Line, branch: number, moment: MomentId, current: number): ExplainedStep[] {
  const draws = power.behind(line, branch)
  if (draws.length === 0) return []
  return [{ what: 'sum of all devices behind it', formula: sumOf(draws, moment), value: current, unit: 'A' }]
}

/** "4 x 2.0 A + 0.3 A": devices that take the same are drawn together. */
function sumOf(draws: PowerResult['draws'], moment: MomentId): string {
  const counts = new Map<string, number>()
  for (const draw of draws) {
    const text = `${trim(busiest(draw, moment).value * draw.share)} A`
    counts.set(text, (counts.get(text) ?? 0) + 1)
  }
  const terms = [...counts]
    .filter(([text]) => text !== '0 A')
    .map(([text, count]) => (count === 1 ? text : `${count} x ${text}`))
  return terms.length > 0 ? terms.join(' + ') : '0 A'
}

const trim = (value: number): string => String(Number(value.toFixed(3)))

const shareStep = (current: number, limit: number | null): ExplainedStep[] =>
  limit
    ? [
        {
          what: 'share of the limit',
          formula: `${amount(current, 'A')} / ${amount(limit, 'A')}`,
          value: current / limit,
          unit: '',
        },
      ]
    : []
