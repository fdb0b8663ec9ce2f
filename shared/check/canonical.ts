import type { BuildDocument, Joint } from '../build/document.ts'
import { rankRefs } from '../build/refOrder.ts'
import type { MomentResult } from './result.ts'

/** A document in one fixed order, and the joints that were turned round for it. */
export interface FixedOrder {
  document: BuildDocument
  turned: ReadonlySet<string>
}

/**
 * Puts the lists of a document in one fixed order: parts by designation, joints by what they join, the end of the
 * earlier part first. Everything reckoned from it is then the same to the last bit, however the build was written down.
 */
export function inFixedOrder(document: BuildDocument): FixedOrder {
  const ranks = rankRefs(document.parts.map((part) => part.ref))
  const parts = [...document.parts]
  document.parts.forEach((part, i) => (parts[ranks[i]!] = part))
  const places = new Map(parts.map((part, place) => [part.id, place]))

  const turned = new Set<string>()
  const placed = document.joints.map((joint) => {
    const from = places.get(joint.a.part) ?? -1
    const to = places.get(joint.b.part) ?? -1
    if (from < to || (from === to && joint.a.connector <= joint.b.connector)) return { joint, from, to }
    turned.add(joint.id)
    return { joint: { ...joint, a: joint.b, b: joint.a }, from: to, to: from }
  })
  placed.sort((one, other) => one.from - other.from || one.to - other.to || compareConnectors(one.joint, other.joint))
  return { document: { ...document, parts, joints: placed.map(({ joint }) => joint) }, turned }
}

function compareConnectors(one: Joint, other: Joint): number {
  return compareText(one.a.connector, other.a.connector) || compareText(one.b.connector, other.b.connector)
}

const compareText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0)

/** Gives the currents of turned joints the sign that they have in the document: from its end a to its end b. */
export function turnBack(moments: readonly MomentResult[], turned: ReadonlySet<string>): MomentResult[] {
  if (turned.size === 0) return [...moments]
  return moments.map((moment) => ({
    ...moment,
    joints: moment.joints.map((flow) => {
      if (!turned.has(flow.joint)) return flow
      const current_A = { ...flow.current_A }
      for (const line of Object.keys(current_A) as (keyof typeof current_A)[])
        current_A[line] = 0 - (current_A[line] ?? 0)
      return { ...flow, current_A }
    }),
  }))
}
