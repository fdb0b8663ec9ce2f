import fc from 'fast-check'
import type { ResolvedBuild } from '#shared/build/resolve.ts'
import { buildOf, smallCatalog } from './smallCatalog.ts'

const models = [...smallCatalog.models.keys()]

/** Documents that no builder would draw: any parts, any connector joined to any other, bays that may not exist. */
export const wildBuild: fc.Arbitrary<ResolvedBuild> = fc
  .record({
    parts: fc.array(
      fc.record({ model: fc.constantFrom(...models), holder: fc.nat(12), slot: fc.integer({ min: 1, max: 14 }) }),
      { maxLength: 14 },
    ),
    joints: fc.array(fc.record({ a: fc.nat(10_000), b: fc.nat(10_000) }), { maxLength: 24 }),
  })
  .map(({ parts, joints }) => {
    const placed = parts.map(({ model, holder, slot }, i) => ({
      id: `p${i}`,
      model,
      ...(slot <= 12 && { bay: { case: `p${holder}`, slot } }),
    }))
    const connectors = placed.flatMap(({ id, model }) =>
      (smallCatalog.models.get(model)?.connectors ?? []).map((connector) => `${id}.${connector.id}`),
    )
    const pick = (i: number) => connectors[i % connectors.length] ?? ''
    const wires = connectors.length === 0 ? [] : joints.filter(({ a, b }) => pick(a) !== pick(b))
    return buildOf(
      placed,
      wires.map(({ a, b }) => `${pick(a)} ${pick(b)}`),
    )
  })
