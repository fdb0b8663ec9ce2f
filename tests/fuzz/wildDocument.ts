import fc from 'fast-check'
import {
  documentFormat,
  documentVersion,
  roles,
  toleranceStandards,
  type BuildDocument,
  type BuildDocumentInput,
} from '#shared/build/document.ts'
import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import { bySpinUpMeans, type Model } from '#shared/catalog/model.ts'
import { originKinds, quantitySchema, type Quantity } from '#shared/quantity/quantity.ts'
import { buildDocumentSchema } from '#shared/build/document.ts'
import { refLetter } from '#shared/build/refs.ts'

/** The schema refuses what lies between zero and this. */
const leastFigure = 1e-9
function asFigure(value: number): number {
  return value === 0 ? 0 : Math.max(leastFigure, value)
}

/** Values that break careless arithmetic: nothing, next to nothing, far too much. */
const oddValue = fc.oneof(
  fc.constantFrom(null, 0, 1e-9, 1e-3, 1, 12, 1e3, 1e9),
  fc.double({ min: 0, max: 1e9, noNaN: true }).map(asFigure),
)

const oddQuantity: fc.Arbitrary<Quantity> = fc
  .record({
    value: oddValue,
    spread: fc.option(fc.double({ min: 0, max: 2, noNaN: true })),
    origin: fc.constantFrom(...originKinds),
  })
  .map(({ value, spread, origin }) => ({
    value,
    origin,
    ...(spread === null
      ? {}
      : { low: asFigure((value ?? 1) / (1 + spread)), high: Math.min(1e9, (value ?? 1) * (1 + spread)) }),
  }))

/** Every path of a model at which a part may put its own figure. */
function figurePaths(model: Model): string[] {
  const paths: string[] = []
  const walk = (node: unknown, path: string) => {
    if (typeof node !== 'object' || node === null) return
    if (!Array.isArray(node) && quantitySchema.safeParse(node).success) return void paths.push(path)
    for (const [name, value] of Object.entries(node)) walk(value, path === '' ? name : `${path}.${name}`)
  }
  walk(model, '')
  return paths.filter((path) => path.length <= 120)
}

const pick = <T>(items: readonly T[], choice: number): T | undefined => items[choice % Math.max(1, items.length)]

const wildPart = fc.record({
  model: fc.nat(),
  role: fc.option(fc.constantFrom(...roles)),
  serial: fc.option(fc.constantFrom('', 'A1', 'a1 ', 'B2')),
  mode: fc.option(fc.constantFrom('pass-through' as const, 'combined' as const)),
  bay: fc.option(fc.tuple(fc.nat(), fc.nat())),
  overrides: fc.array(fc.tuple(fc.nat(), oddQuantity), { maxLength: 2 }),
})

const wildJoint = fc.record({ from: fc.nat(), to: fc.nat(), mating: fc.integer({ min: 0, max: 4 }).map((n) => n > 0) })

const wildSettings: fc.Arbitrary<NonNullable<BuildDocumentInput['settings']>> = fc.record({
  tolerance: fc.constantFrom(...toleranceStandards),
  wireTemperature_C: fc.constantFrom(-20, 40, 105),
  derating: fc.constantFrom(0.3, 0.8, 1),
  spinUp: fc.record({
    mode: fc.constantFrom('together' as const, 'staged' as const),
    by: fc.constantFrom(...bySpinUpMeans),
    groupSize: fc.integer({ min: 1, max: 4 }),
    interval_s: fc.constantFrom(0.1, 2, 12, 600),
  }),
  array: fc.record({ needsPassThrough: fc.boolean(), parityDrives: fc.integer({ min: 0, max: 3 }) }),
})

export interface WildOptions {
  maxParts: number
  maxJoints: number
}

/**
 * Documents that the schema accepts and nobody would build: real models joined at random (mostly where they mate, some
 * not, some twice), with odd figures, doubled serials, shared bays and unknown values.
 */
export function wildDocument(catalog: CatalogIndex, { maxParts, maxJoints }: WildOptions): fc.Arbitrary<BuildDocument> {
  const models = [...catalog.models.values()]
  const paths = new Map(models.map((model) => [model.id, figurePaths(model)]))
  return fc
    .record({
      parts: fc.array(wildPart, { maxLength: maxParts }),
      joints: fc.array(wildJoint, { maxLength: maxJoints }),
      settings: wildSettings,
    })
    .map((wild) => {
      const chosen = wild.parts.map((part, i) => ({ ...part, id: `p${i}`, model: pick(models, part.model)! }))
      const cases = chosen.filter((part) => part.model.bays.length > 0)
      const ends = chosen.flatMap((part) =>
        part.model.connectors.map((connector) => ({ part: part.id, connector: connector.id, type: connector.type })),
      )
      const input: BuildDocumentInput = {
        format: documentFormat,
        version: documentVersion,
        name: 'wild',
        settings: wild.settings,
        parts: chosen.map(({ id, model, role, serial, mode, bay, overrides }, i) => {
          const holder = bay && pick(cases, bay[0])
          const slot = holder && bay && pick(holder.model.bays, bay[1])?.slot
          const own = overrides.flatMap(([path, quantity]) => {
            const found = pick(paths.get(model.id) ?? [], path)
            return found === undefined ? [] : [[found, quantity] as const]
          })
          return {
            id,
            model: model.id,
            ref: `${refLetter[model.kind]}${i + 1}`,
            ...(role === null ? {} : { role }),
            ...(serial === null ? {} : { serial }),
            ...(mode === null ? {} : { mode }),
            ...(holder && slot ? { bay: { case: holder.id, slot } } : {}),
            ...(own.length > 0 ? { overrides: Object.fromEntries(own) } : {}),
          }
        }),
        joints: wild.joints.flatMap(({ from, to, mating }, i) => {
          const a = pick(ends, from)
          const fitting = catalog.connectorTypes.get(a?.type ?? '')?.matesWith ?? []
          const others = mating ? ends.filter((end) => fitting.includes(end.type)) : ends
          const b = pick(others, to)
          if (!a || !b || a === b) return []
          const end = ({ part, connector }: typeof a) => ({ part, connector })
          return [{ id: `j${i}`, a: end(a), b: end(b) }]
        }),
      }
      return buildDocumentSchema.parse(input)
    })
}
