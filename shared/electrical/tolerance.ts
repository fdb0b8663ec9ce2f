import type { Settings } from '../build/document.ts'
import type { Figure, MomentId } from '../check/result.ts'
import { nominal_V, type Rail } from '../quantity/rails.ts'
import { figureOf } from './figures.ts'
import { lineName } from './lines.ts'
import type { DeviceLoad } from './result.ts'

/** Moments whose currents last for the seconds of a start. */
export const startMoments: readonly MomentId[] = ['cold-start', 'staged-start', 'wake']
export const isStart = (moment: MomentId): boolean => startMoments.includes(moment)

/** Voltages that a device accepts at one moment, and the figure that says so. */
export interface AllowedVoltage {
  lowest_V: number
  highest_V: number
  figure: Figure
}

interface Band {
  lowest_V: number
  /** Lower edge while motors start, where the guide widens it. */
  lowestAtStart_V?: number
  highest_V: number
}

const atxReturns: Readonly<Record<'5V' | '3.3V', Band>> = {
  '5V': { lowest_V: 4.75, highest_V: 5.25 },
  '3.3V': { lowest_V: 3.135, highest_V: 3.465 },
}

/** DC regulation of the supply design guides; the tolerance is that at the load end of the supply's own leads. */
const standards: Readonly<Record<Settings['tolerance'], { source: string; title: string } & Record<Rail, Band>>> = {
  atx: {
    source: 'S1',
    title: 'ATX12V 2.0',
    '12V': { lowest_V: 11.4, lowestAtStart_V: 10.8, highest_V: 12.6 },
    ...atxReturns,
  },
  atx3: { source: 'S7', title: 'ATX 3.0', '12V': { lowest_V: 11.2, highest_V: 12.6 }, ...atxReturns },
  server: {
    source: 'S19',
    title: 'server supply, several outputs',
    '12V': { lowest_V: 11.52, highest_V: 12.6 },
    '5V': { lowest_V: 4.8, highest_V: 5.25 },
    '3.3V': { lowest_V: 3.2, highest_V: 3.46 },
  },
}

/** Lower edge at a card's slot, per cent below nominal: PCI Express card specification, from memory. */
const slotBelow_pct: Readonly<Record<Rail, number>> = { '12V': 8, '5V': 5, '3.3V': 9 }

/** What a device must see: by its own maker's figure, else by its slot's, else by the build's supply standard. */
export function allowedVoltage(device: DeviceLoad, moment: MomentId, settings: Settings): AllowedVoltage {
  const { part, connector, rail } = device
  const nominal = nominal_V[rail]
  const own = part.model.drive?.tolerance[rail]
  if (own) {
    const atStart = isStart(moment) ? own.belowAtStart_pct : undefined
    const quantity = atStart ?? own.below_pct
    const below = quantity.value ?? quantity.low ?? 5
    const above = own.above_pct?.value ?? own.above_pct?.low ?? below
    const what = `tolerance of ${part.part.ref} on ${lineName[rail]}${atStart ? ' while starting' : ''}`
    return {
      lowest_V: nominal * (1 - below / 100),
      highest_V: nominal * (1 + above / 100),
      figure: figureOf(quantity, what, '%'),
    }
  }
  if (connector.type.side === 'edge') {
    const below = slotBelow_pct[rail]
    return {
      lowest_V: nominal * (1 - below / 100),
      highest_V: nominal * (1 + below / 100),
      figure: {
        what: `tolerance of a slot on ${lineName[rail]}`,
        value: below,
        unit: '%',
        origin: 'standard',
        fromMemory: true,
      },
    }
  }
  const { source, title, [rail]: band } = standards[settings.tolerance]
  const lowest_V = (isStart(moment) ? band.lowestAtStart_V : undefined) ?? band.lowest_V
  return {
    lowest_V,
    highest_V: band.highest_V,
    figure: { what: `lowest ${lineName[rail]}, ${title}`, value: lowest_V, unit: 'V', origin: 'standard', source },
  }
}
