import fc from 'fast-check'
import type { BuildDocument } from '#shared/build/document.ts'

/** The same build written down in another order: lists shuffled, joints turned round, ids renamed. Designations stay. */
export function shuffled(document: BuildDocument): fc.Arbitrary<BuildDocument> {
  const renamed = new Map(document.parts.map((part, i) => [part.id, `renamed-${document.parts.length - i}`]))
  const nameOf = (id: string): string => renamed.get(id) ?? id
  const end = ({ part, connector }: BuildDocument['joints'][number]['a']) => ({ part: nameOf(part), connector })
  return fc
    .record({
      parts: fc.shuffledSubarray(document.parts, { minLength: document.parts.length }),
      joints: fc.shuffledSubarray(document.joints, { minLength: document.joints.length }),
      turned: fc.array(fc.boolean(), { minLength: document.joints.length, maxLength: document.joints.length }),
    })
    .map(({ parts, joints, turned }) => ({
      ...document,
      parts: parts.map((part) => ({
        ...part,
        id: nameOf(part.id),
        ...(part.bay ? { bay: { ...part.bay, case: nameOf(part.bay.case) } } : {}),
      })),
      joints: joints.map(({ a, b }, i) => ({
        id: `renamed-joint-${i}`,
        ...(turned[i] ? { a: end(b), b: end(a) } : { a: end(a), b: end(b) }),
      })),
    }))
}
