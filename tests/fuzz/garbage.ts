import fc from 'fast-check'
import type { BuildDocument } from '#shared/build/document.ts'

/** Anything that JSON can hold, some of it dressed up as a build document. */
export const garbage: fc.Arbitrary<unknown> = fc.oneof(
  fc.jsonValue({ maxDepth: 6 }),
  fc
    .record(
      {
        name: fc.jsonValue(),
        settings: fc.jsonValue(),
        models: fc.jsonValue(),
        parts: fc.jsonValue(),
        joints: fc.jsonValue(),
        accepted: fc.jsonValue(),
      },
      { requiredKeys: [] },
    )
    .map((fields) => ({ format: 'bayloom-build', version: 1, ...fields })),
)

/** Names that have hurt somebody's parser before. */
const names = ['__proto__', 'constructor', 'toString', '', 'id', 'parts', '0', 'length']

/** A sound document with one value somewhere replaced, removed or added. */
export function damaged(document: fc.Arbitrary<BuildDocument>): fc.Arbitrary<unknown> {
  return fc
    .record({
      document,
      steps: fc.array(fc.nat(), { minLength: 1, maxLength: 6 }),
      value: fc.oneof(fc.jsonValue({ maxDepth: 2 }), fc.constantFrom(-1, 1e308, null, '', [], {})),
      deed: fc.constantFrom('replace' as const, 'remove' as const, 'add' as const),
      name: fc.constantFrom(...names),
    })
    .map(({ document: sound, steps, value, deed, name }) => {
      const copy = structuredClone(sound) as unknown as Record<string, unknown>
      let node: Record<string, unknown> = copy
      for (const [i, step] of steps.entries()) {
        const keys = Object.keys(node)
        const key = keys[step % Math.max(1, keys.length)]
        if (key === undefined) break
        const next = node[key]
        if (i < steps.length - 1 && typeof next === 'object' && next !== null) node = next as Record<string, unknown>
        else if (deed === 'replace') node[key] = structuredClone(value)
        else if (deed === 'remove') delete node[key]
        else if (Array.isArray(node)) node.push(structuredClone(value))
        else
          Object.defineProperty(node, name, {
            value: structuredClone(value),
            enumerable: true,
            configurable: true,
            writable: true,
          })
      }
      return JSON.parse(JSON.stringify(copy)) as unknown
    })
}
