import type { Protocol } from '../catalog/model.ts'
import type { ResolvedPart } from '../build/resolve.ts'
import type { LinkFault, ResolvedController } from './result.ts'

/**
 * Whether one part takes a drive of a protocol behind it. SAS carries SATA drives too (tunnelled, STP); nothing but NVMe
 * carries NVMe, and a SATA host never speaks SAS.
 */
export function carries(spoken: readonly Protocol[], wanted: Protocol): boolean {
  return spoken.includes(wanted) || (wanted === 'sata' && spoken.includes('sas'))
}

/** First part of a path that does not speak what the path needs there; null where all do. */
export function protocolFault(
  { part, controller }: ResolvedController,
  expanders: readonly ResolvedPart[],
  drive: Protocol,
): LinkFault | null {
  const fault = (at: ResolvedPart, needs: Protocol): LinkFault => ({ kind: 'protocol', part: at, needs })
  if (!carries(controller.protocols, drive)) return fault(part, drive)
  for (const expander of expanders) {
    const spoken = expander.model.expander?.protocols ?? []
    if (spoken.includes('sas') && !controller.protocols.includes('sas')) return fault(part, 'sas')
    if (!carries(spoken, drive)) return fault(expander, drive)
    const isPortMultiplier = spoken.includes('sata') && !spoken.includes('sas')
    if (isPortMultiplier && controller.protocols.includes('sas')) return fault(expander, 'sas')
  }
  return null
}
