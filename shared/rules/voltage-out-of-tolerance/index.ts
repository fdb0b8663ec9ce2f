import { momentIds, type Figure, type MomentId } from '../../check/result.ts'
import { severityRank, type Severity } from '../../check/severity.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { amount, nameOf } from '../../check/words.ts'
import { momentIndex } from '../../electrical/evidence.ts'
import { lineName } from '../../electrical/lines.ts'
import { twoVolts } from '../../electrical/loadWords.ts'
import { atMoment } from '../../electrical/names.ts'
import type { DeviceLoad, PowerResult } from '../../electrical/result.ts'
import { unsureWires } from '../../electrical/unsureWay.ts'
import { allowedVoltage, toleranceFigure } from '../../electrical/tolerance.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  device: DeviceLoad
  moment: MomentId
  seen_V: number
  allowed_V: number
  /** Only once its contacts have aged. */
  whenAged: boolean
  figure: Figure
}

/** Voltages nearer than this count as equal: rounding, not physics. */
const rounding_V = 1e-9

export const voltageOutOfTolerance = defineRule<Facts>({
  meta: {
    id: 'voltage-out-of-tolerance',
    title: 'A device sees a voltage outside its tolerance',
    severities: ['fault', 'caution'],
    finds:
      'Devices whose voltage at the plug leaves their tolerance at some moment: a fault with contacts as new, a caution where only aged contacts bring it there.',
    why: 'A drive that sees too little resets, reports errors or never starts, and the fault looks like a bad disk. The return is shared, so a 12 V start pulls 5 V down too.',
    needs: [
      'length and gauge of every wire',
      'contact resistances',
      'tolerance of the device, or of the supply standard',
    ],
    sources: ['S1', 'S7', 'S19', 'S40', 'S57', 'S58'],
    disputed:
      'Older supply guides let 12 V fall by ten per cent at peak load; some drives do not accept that. A device that states its own tolerance is held to it.',
  },
  check({ power, build }) {
    return power.devices.flatMap((device) => {
      const worst = worstVoltage(device, power)
      if (!worst) return []
      const { severity, ...facts } = worst
      const figure = toleranceFigure(device, facts.moment, build.settings)
      const unsure = unsureWires(power, device)
      return [
        {
          severity,
          subjects: [connectorSubject(device.connector), partSubject(device.part)],
          detail: device.rail,
          moment: facts.moment,
          load: facts.seen_V,
          limit: facts.allowed_V,
          unit: 'V' as const,
          decidedBy: [
            figure,
            ...currentFigure(device, facts.moment),
            ...unsure.slice(0, 3).map(({ figure: length }) => length),
          ],
          about: device.about || unsure.length > 0,
          facts: { device, ...facts, figure },
        },
      ]
    })
  },
  words({ facts, about }) {
    const { device, moment, seen_V, allowed_V, whenAged, figure } = facts
    const m = momentIndex(moment)
    const { wire, contact, return: back } = device.drop_V
    const line = lineName[device.rail]
    const [seen, allowed] = twoVolts(seen_V, allowed_V)
    const sees = `${nameOf(device.part)} sees ${about ? 'about ' : ''}${seen} on ${line} ${atMoment(moment)}`
    if (seen_V > allowed_V)
      return {
        message: `${sees}, more than the ${allowed} that it accepts (${figure.what}).`,
        remedy: 'Check the set point of the supply before joining anything to it.',
      }
    return {
      message:
        `${sees}${whenAged ? ' once the contacts on the way have aged' : ''}, below the ${allowed} that it needs (${figure.what}). ` +
        `Lost on the way with contacts as new: ${amount(wire[m]!, 'V')} in wire, ${amount(contact[m]!, 'V')} in contacts, ${amount(back[m]!, 'V')} in the return.`,
      remedy: largestCause(wire[m]!, contact[m]!, back[m]!),
    }
  },
})

function largestCause(wire: number, contact: number, back: number): string {
  if (back >= wire && back >= contact)
    return 'The return loses most: move devices to other leads, so that fewer share one return.'
  return contact >= wire
    ? 'Contacts lose most: leave out adapters and splitters on the way, or share the load among more outlets.'
    : 'Wire loses most: use a shorter or thicker lead, or share the load among more leads.'
}

const currentFigure = ({ figures }: DeviceLoad, moment: MomentId): Figure[] => {
  const figure = figures[moment]
  return figure ? [figure] : []
}

interface Worst extends Omit<Facts, 'device' | 'figure'> {
  severity: Severity
  by_V: number
}

function worstVoltage(device: DeviceLoad, { applies }: PowerResult): Worst | null {
  if (device.fedBy.length === 0) return null
  let worst: Worst | null = null
  for (let m = 0; m < momentIds.length; m++) {
    const moment = momentIds[m]!
    if (!applies.has(moment)) continue
    const { lowest_V, highest_V } = allowedVoltage(device, moment)
    const fresh = device.voltage_V[m]!
    const aged = device.aged_V[m]!
    if (fresh > highest_V + rounding_V) worst = graver(worst, 'fault', moment, fresh, highest_V, false)
    else if (fresh < lowest_V - rounding_V)
      worst = graver(worst, moment === 'wake' ? 'caution' : 'fault', moment, fresh, lowest_V, false)
    else if (aged < lowest_V - rounding_V) worst = graver(worst, 'caution', moment, aged, lowest_V, true)
  }
  return worst
}

/** The graver of two, then the one that is further off. */
function graver(
  worst: Worst | null,
  severity: Severity,
  moment: MomentId,
  seen_V: number,
  allowed_V: number,
  whenAged: boolean,
): Worst {
  const by_V = Math.abs(seen_V - allowed_V)
  const stays =
    worst !== null &&
    severityRank[severity] >= severityRank[worst.severity] &&
    !(severity === worst.severity && by_V > worst.by_V + rounding_V)
  return stays ? worst : { severity, moment, seen_V, allowed_V, whenAged, by_V }
}
