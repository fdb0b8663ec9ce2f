import type { ConnectorType } from '../catalog/connectorType.ts'

/** Whether two connector types mate, and what then crosses the joint. */
export interface Mating {
  mates: boolean
  /** Power contacts meet. */
  power: boolean
  /** Lanes that meet: the smaller of both. */
  lanes: number
  /** Why not, in words. */
  reason?: string
}

/** Compares two connector types. Only what both carry crosses the joint. */
export function mate(a: ConnectorType, b: ConnectorType): Mating {
  if (!a.matesWith.includes(b.id)) return { mates: false, power: false, lanes: 0, reason: whyNot(a, b) }
  return {
    mates: true,
    power: a.power !== undefined && b.power !== undefined,
    lanes: linkedLanes(a, b),
  }
}

/** Shells may fit where lanes do not meet: a U.2 drive in a bay wired for U.3. */
function linkedLanes(a: ConnectorType, b: ConnectorType): number {
  const meets = (one: ConnectorType, other: ConnectorType) => one.data?.linksOnlyWith?.includes(other.id) ?? true
  return meets(a, b) && meets(b, a) ? Math.min(a.data?.lanes ?? 0, b.data?.lanes ?? 0) : 0
}

function whyNot(a: ConnectorType, b: ConnectorType): string {
  if (a.id === b.id || (a.standard === b.standard && a.side === b.side)) return `both are the ${a.side} side: ${a.name}`
  if (a.placement !== b.placement) return `${a.name} is ${a.placement}, ${b.name} is ${b.placement}: the shells differ`
  const keying = a.keying ?? b.keying
  return `${a.name} does not mate with ${b.name}${keying ? ` (${keying})` : ''}`
}
