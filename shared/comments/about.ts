import type { BuildDocument } from '../build/document.ts'
import type { Pin } from '../contract/comments.ts'

/** Part and joint ids that a pin holds on to; with either gone from the document, so is its subject. */
export const heldBy = (pin: Pin): { part: string | null; joint: string | null } => ({
  part: pin.kind === 'part' || pin.kind === 'connector' ? pin.part : null,
  joint: pin.kind === 'joint' ? pin.joint : null,
})

/**
 * What a pin is about in short words that last, made of the document alone: "W4", "W4 out-1", "W4 out-1 to C7 plug".
 * Undefined: only the page that shows it (a finding, a row, a spot) can say.
 */
export function aboutOf(pin: Pin, document: BuildDocument): string | undefined {
  const refOf = (id: string) => document.parts.find((part) => part.id === id)?.ref
  switch (pin.kind) {
    case 'build':
      return 'the build'
    case 'part':
      return refOf(pin.part)
    case 'connector': {
      const ref = refOf(pin.part)
      return ref === undefined ? undefined : `${ref} ${pin.connector}`
    }
    case 'joint': {
      const joint = document.joints.find(({ id }) => id === pin.joint)
      if (!joint) return undefined
      const ends = [joint.a, joint.b].map((end) => `${refOf(end.part) ?? '?'} ${end.connector}`)
      return ends.join(' to ')
    }
    default:
      return undefined
  }
}
