import fc from 'fast-check'
import { readBuild, readBuildText } from '#shared/build/read.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import { checkResultSchema, type CheckResult } from '#shared/check/result.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'
import { report } from '../../server/cli/report/report.ts'
import { damaged, garbage } from './garbage.ts'
import { networksAgree, networksStaySound } from './networks.ts'
import { shuffled } from './shuffled.ts'
import { wildDocument } from './wildDocument.ts'

/** One thing that must hold, whatever comes. `weight` is its share of a long run. */
export interface FuzzProperty {
  name: string
  weight: number
  property(catalog: CatalogIndex): fc.IRawProperty<unknown>
}

/** The shipped catalog: fuzzing joins real models. */
export const shippedCatalog = (): CatalogIndex => indexCatalog(loadCatalogFiles())

const small = { maxParts: 8, maxJoints: 10 }
const larger = { maxParts: 30, maxJoints: 60 }

/** Throws where a number of the answer is not a number that JSON can hold. */
function assertFinite(value: unknown, path: string): void {
  if (typeof value === 'number' && !Number.isFinite(value)) throw new Error(`${path} is ${value}`)
  if (typeof value !== 'object' || value === null) return
  for (const [name, inner] of Object.entries(value)) assertFinite(inner, `${path}.${name}`)
}

/** What must hold for every answer of the checker. */
function assertSound(result: CheckResult): void {
  assertFinite(result, 'result')
  const parsed = checkResultSchema.safeParse(JSON.parse(JSON.stringify(result)))
  if (!parsed.success) throw new Error(parsed.error.message)
  const keys = result.findings.map((finding) => finding.key)
  const twice = keys.find((key, i) => keys.indexOf(key) !== i)
  if (twice !== undefined) throw new Error(`two findings are known by ${twice}`)
  for (const { message, remedy, rule } of result.findings)
    if (/NaN|Infinity|undefined|\[object/.test(`${message} ${remedy}`))
      throw new Error(`${rule} says: ${message} ${remedy}`)
}

/** What an answer says, without ids and places in lists. */
function gist(result: CheckResult): string {
  const { counts, worst, weakestHop, findings, scan } = result
  return JSON.stringify(
    [
      counts,
      worst,
      weakestHop,
      scan.hours === null ? null : scan.hours.toPrecision(9),
      scan.bottleneck,
      findings.map(({ key, severity, message, remedy }) => [key, severity, message, remedy]),
    ],
    null,
    1,
  )
}

export const fuzzProperties: readonly FuzzProperty[] = [
  {
    name: 'any text is read or refused',
    weight: 3,
    property: (catalog) =>
      fc.property(fc.oneof(fc.string(), fc.json(), fc.string({ unit: 'binary' })), (text) => {
        readBuildText(text, catalog)
      }),
  },
  {
    name: 'any JSON is read or refused with places',
    weight: 4,
    property: (catalog) => fc.property(garbage, (input) => void assertRefusedWithPlaces(input, catalog)),
  },
  {
    name: 'a damaged document is read or refused, and checked where it is read',
    weight: 2,
    property: (catalog) =>
      fc.property(damaged(wildDocument(catalog, small)), (input) => {
        const document = assertRefusedWithPlaces(input, catalog)
        if (document) assertSound(check(document, catalog, { strict: true }))
      }),
  },
  {
    name: 'a small wild build gets a sound answer',
    weight: 5,
    property: (catalog) =>
      fc.property(wildDocument(catalog, small), (document) => assertSound(check(document, catalog, { strict: true }))),
  },
  {
    name: 'a larger wild build gets a sound answer',
    weight: 3,
    property: (catalog) =>
      fc.property(wildDocument(catalog, larger), (document) => assertSound(check(document, catalog, { strict: true }))),
  },
  {
    name: 'order and ids change nothing',
    weight: 2,
    property: (catalog) =>
      fc.property(
        wildDocument(catalog, larger).chain((document) => fc.tuple(fc.constant(document), shuffled(document))),
        ([document, other]) => {
          const [before, after] = [document, other].map((one) => gist(check(one, catalog, { strict: true })))
          if (before !== after) throw new Error(`before:\n${before}\nafter:\n${after}`)
        },
      ),
  },
  {
    name: 'the command line prints any answer at any width',
    weight: 1,
    property: (catalog) =>
      fc.property(
        wildDocument(catalog, small),
        fc.integer({ min: 1, max: 300 }),
        fc.boolean(),
        (document, width, all) => {
          const text = report(check(document, catalog), { width, all })
          if (/NaN|Infinity|undefined|\[object/.test(text)) throw new Error(text)
        },
      ),
  },
  { name: 'random networks agree with ngspice to 1e-9 of the source', weight: 0.05, property: networksAgree },
  { name: 'any network is solved to numbers that keep Kirchhoff', weight: 4, property: networksStaySound },
]

function assertRefusedWithPlaces(input: unknown, catalog: CatalogIndex): BuildDocument | null {
  const read = readBuild(input, catalog)
  if (read.ok) return read.document
  if (read.problems.length === 0) throw new Error('refused without a reason')
  for (const { path, message } of read.problems)
    if (typeof path !== 'string' || message === '') throw new Error('a problem without words')
  return null
}
