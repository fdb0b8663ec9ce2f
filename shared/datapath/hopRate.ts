import type { ResolvedPart } from '../build/resolve.ts'
import { lowFigure } from './parts.ts'
import type { HopLane, ResolvedController } from './result.ts'
import { pcieLineRate_GTps } from './lineRate.ts'

interface Rated {
  rate_Gbps: number | null
  limitedBy: ResolvedPart | null
}

/** A part's own highest rate at one end of a hop. */
export interface EndRate {
  part: ResolvedPart
  rate_Gbps: number | null
}

export const controllerRate = ({ part, controller }: ResolvedController): EndRate => ({
  part,
  rate_Gbps: lowFigure(controller.rate_Gbps),
})

export const expanderRate = (part: ResolvedPart): EndRate => ({
  part,
  rate_Gbps: lowFigure(part.model.expander?.rate_Gbps),
})

export const driveRate = (part: ResolvedPart): EndRate => ({
  part,
  rate_Gbps: lowFigure(part.model.drive?.rate_Gbps),
})

/** Rate of one PCI Express lane between a controller and an NVMe drive. */
export function nvmeRates(controller: ResolvedController, drive: ResolvedPart): EndRate[] {
  const { pcie } = drive.model.drive ?? {}
  const { uplink } = controller.controller
  return [
    { part: controller.part, rate_Gbps: uplink ? pcieLineRate_GTps(uplink.generation) : null },
    { part: drive, rate_Gbps: pcie ? pcieLineRate_GTps(pcie.generation) : null },
  ]
}

/** The lowest of some rates, and whose it is; of equal ones the first. */
export function lowestRate(rates: readonly EndRate[]): Rated {
  let lowest: Rated = { rate_Gbps: null, limitedBy: null }
  for (const { part, rate_Gbps } of rates)
    if (rate_Gbps !== null && (lowest.rate_Gbps === null || rate_Gbps < lowest.rate_Gbps))
      lowest = { rate_Gbps, limitedBy: part }
  return lowest
}

/** Gives a lane the lowest rate of both its ends and the cables between. */
export function rateLane(lane: HopLane, ends: readonly EndRate[]): HopLane {
  const cables = lane.through.map((part) => ({ part, rate_Gbps: lowFigure(part.model.cable?.rate_Gbps) }))
  return { ...lane, ...lowestRate([...ends, ...cables]) }
}
