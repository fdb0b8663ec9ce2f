import type { Settings } from '../build/document.ts'
import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import type { Tolerance } from '../catalog/model.ts'
import type { Quantity } from '../quantity/quantity.ts'
import type { Figure, MomentId } from '../check/result.ts'
import { nominal_V, type Rail } from '../quantity/rails.ts'
import { figureOf } from './figures.ts'
import { lineName } from './lines.ts'
import type { DeviceLoad } from './result.ts'

/** Moments whose currents last for the seconds of a start. */
export const isStart = (moment: MomentId): boolean =>
  moment === 'cold-start' || moment === 'staged-start' || moment === 'wake'

/** Voltages that a device accepts at one moment. */
export interface AllowedVoltage {
  lowest_V: number
  highest_V: number
}

interface Band extends AllowedVoltage {
  /** While motors start, where the guide widens the band. */
  atStart?: AllowedVoltage
}

const atxLowRails: Readonly<Record<'5V' | '3.3V', Band>> = {
  '5V': { lowest_V: 4.75, highest_V: 5.25 },
  '3.3V': { lowest_V: 3.135, highest_V: 3.465 },
}

/** DC regulation of the supply design guides; the tolerance is that at the load end of the supply's own leads. */
const standards: Readonly<Record<Settings['tolerance'], { source: string; title: string } & Record<Rail, Band>>> = {
  atx: {
    source: 'S1',
    title: 'ATX12V 2.0',
    '12V': { lowest_V: 11.4, highest_V: 12.6, atStart: { lowest_V: 10.8, highest_V: 12.6 } },
    ...atxLowRails,
  },
  atx3: { source: 'S7', title: 'ATX 3.0', '12V': { lowest_V: 11.2, highest_V: 12.6 }, ...atxLowRails },
  server: {
    source: 'S19',
    title: 'server supply, several outputs',
    '12V': { lowest_V: 11.52, highest_V: 12.6 },
    '5V': { lowest_V: 4.8, highest_V: 5.25 },
    '3.3V': { lowest_V: 3.2, highest_V: 3.46 },
  },
}

/** Tolerance at a card's slot, per cent either way: PCI Express card specification, from memory. */
const slot_pct: Readonly<Record<Rail, number>> = { '12V': 8, '5V': 5, '3.3V': 9 }

/** What a device accepts while motors start, and otherwise. */
export interface AllowedBand {
  atStart: AllowedVoltage
  otherwise: AllowedVoltage
}

/** What a device must see: by its own maker's figure, else by its slot's, else by the build's supply standard. */
export function bandOf(part: ResolvedPart, connector: ResolvedConnector, rail: Rail, settings: Settings): AllowedBand {
  const own = part.model.drive?.tolerance[rail]
  if (own) {
    const otherwise = ownBand(rail, own, own.below_pct)
    return { otherwise, atStart: own.belowAtStart_pct ? ownBand(rail, own, own.belowAtStart_pct) : otherwise }
  }
  if (connector.type.side === 'edge') {
    const slot = within(rail, slot_pct[rail], slot_pct[rail])
    return { otherwise: slot, atStart: slot }
  }
  const band = standards[settings.tolerance][rail]
  return { otherwise: band, atStart: band.atStart ?? band }
}

function ownBand(rail: Rail, { above_pct }: Tolerance, { value, low }: Quantity): AllowedVoltage {
  const below = value ?? low ?? slotless_pct
  return within(rail, below, above_pct?.value ?? above_pct?.low ?? below)
}

/** The band of one moment. */
export const allowedVoltage = ({ allowed }: Pick<DeviceLoad, 'allowed'>, moment: MomentId): AllowedVoltage =>
  isStart(moment) ? allowed.atStart : allowed.otherwise

/** Taken where a device gives a tolerance without a figure, per cent. */
const slotless_pct = 5

const within = (rail: Rail, below_pct: number, above_pct: number): AllowedVoltage => ({
  lowest_V: nominal_V[rail] * (1 - below_pct / 100),
  highest_V: nominal_V[rail] * (1 + above_pct / 100),
})

/** The figure behind `allowedVoltage`, for showing. */
export function toleranceFigure(device: DeviceLoad, moment: MomentId, settings: Settings): Figure {
  const { part, connector, rail } = device
  const start = isStart(moment)
  const own = part.model.drive?.tolerance[rail]
  if (own) {
    const widened = start ? own.belowAtStart_pct : undefined
    const what = `tolerance of ${part.part.ref} on ${lineName[rail]}${widened ? ' while starting' : ''}`
    return figureOf(widened ?? own.below_pct, what, '%')
  }
  if (connector.type.side === 'edge') {
    const what = `tolerance of a slot on ${lineName[rail]}`
    return { what, value: slot_pct[rail], unit: '%', origin: 'standard', fromMemory: true }
  }
  const { source, title } = standards[settings.tolerance]
  const { lowest_V } = allowedVoltage(device, moment)
  return { what: `lowest ${lineName[rail]}, ${title}`, value: lowest_V, unit: 'V', origin: 'standard', source }
}
