import type { ResolvedPart } from '../../build/resolve.ts'
import type { HopLane } from '../../datapath/result.ts'

export interface LengthLimit {
  id: string
  length_mm: number
  /** As a sentence names it, before "allows". */
  name: string
  /** Common practice rather than a standard's figure. */
  isPractice: boolean
}

const limits = {
  sata: { id: 'sata', length_mm: 1000, name: 'internal SATA', isPractice: false },
  esata: { id: 'esata', length_mm: 2000, name: 'external SATA', isPractice: false },
  sas: { id: 'sas', length_mm: 1000, name: 'internal SAS, by common practice,', isPractice: true },
  sasExternal3: { id: 'sas-external', length_mm: 6000, name: 'external SAS at 3 Gb/s', isPractice: false },
  sasExternal6: { id: 'sas-external', length_mm: 10_000, name: 'external SAS at 6 Gb/s', isPractice: false },
  sasExternal12: {
    id: 'sas-external',
    length_mm: 6000,
    name: 'external SAS at 12 Gb/s, by common practice,',
    isPractice: true,
  },
  nvme: { id: 'nvme', length_mm: 500, name: 'internal NVMe, by common practice,', isPractice: true },
} as const satisfies Record<string, LengthLimit>

/**
 * The limit of one stretch between two phys. What counts is the link itself: the last hop to a SATA drive is a SATA
 * link whatever the controller is; up to an expander it is SAS.
 */
export function lengthLimit(to: ResolvedPart, lane: HopLane): LengthLimit {
  const protocol = to.model.drive?.protocol ?? (to.model.expander?.protocols.includes('sas') ? 'sas' : 'sata')
  const external = lane.joints.some((joint) => joint.a.type.placement === 'external')
  if (protocol === 'nvme') return limits.nvme
  if (protocol === 'sata') return external ? limits.esata : limits.sata
  if (!external) return limits.sas
  const rate_Gbps = lane.rate_Gbps ?? 12
  if (rate_Gbps <= 3) return limits.sasExternal3
  return rate_Gbps <= 6 ? limits.sasExternal6 : limits.sasExternal12
}
