import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import type { BuildDocument } from '#shared/build/document.ts'
import { readBuildText } from '#shared/build/read.ts'
import { resolve } from '#shared/build/resolve.ts'
import { refLetter } from '#shared/build/refs.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import type { Finding } from '#shared/check/result.ts'
import { severitySchema } from '#shared/check/severity.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'

const folder = fileURLToPath(new URL('../../examples', import.meta.url))
const catalog = indexCatalog(loadCatalogFiles())

/** What an example is there to show. `subjects` are the parts concerned by reference designation; none: the build. */
const expectedSchema = z.array(
  z.strictObject({ rule: z.string(), severity: severitySchema, subjects: z.array(z.string()) }),
)
type Expected = z.infer<typeof expectedSchema>[number]

const read = (id: string, file: string) => readFileSync(join(folder, id, file), 'utf8')

function load(id: string): BuildDocument {
  const result = readBuildText(read(id, 'build.json'), catalog)
  if (!result.ok) throw new Error(result.problems.map(({ path, message }) => `${path}: ${message}`).join('\n'))
  return result.document
}

const asExpected = ({ rule, severity, subjects }: Finding): Expected => ({
  rule,
  severity,
  subjects: [...new Set(subjects.flatMap(({ ref }) => ref ?? []))].sort(),
})

const asLine = ({ rule, severity, subjects }: Expected): string =>
  `${severity} ${rule} ${[...subjects].sort().join(' ')}`.trim()

const ids = readdirSync(folder, { withFileTypes: true })
  .filter((entry) => entry.isDirectory())
  .map(({ name }) => name)

describe('examples', () => {
  it('are at least six, with the clean and the overloaded north room, the wrecked bench, twin inlets, 24 and 60', () => {
    expect(ids).toEqual(
      expect.arrayContaining([
        'north-room-clean',
        'north-room',
        'salvage',
        'twin-inlets',
        'projection-24',
        'stress-60',
      ]),
    )
  })

  it('have machine identities of their own; a machine before and after its mending is one', () => {
    const machines = ids.map((id) => load(id).machine)
    expect(machines.every(Boolean)).toBe(true)
    expect(new Set(machines).size).toBe(ids.length - 2)
    expect(load('north-room').machine).toBe(load('north-room-clean').machine)
    expect(load('projection-24').machine).toBe(load('projection-24-first').machine)
  })

  it('holds sixty drives and about three hundred parts in the stress case', () => {
    const build = resolve(load('stress-60'), catalog)
    expect(build.parts.filter((part) => part.model.drive && part.part.bay)).toHaveLength(60)
    expect(build.parts.length).toBeGreaterThan(270)
    expect(build.parts.length).toBeLessThan(330)
  })
})

describe.each(ids)('example %s', (id) => {
  it('says in one sentence what it shows', () => {
    const [first, second] = read(id, 'README.md').split('\n')
    expect(first).toMatch(/^[A-Z].{40,200}\.$/)
    expect(first!.slice(0, -1)).not.toMatch(/\. /)
    expect(second).toBe('')
  })

  it('reads, and every part has the letter of its kind', () => {
    const build = resolve(load(id), catalog)
    expect(build.problems).toEqual([])
    for (const { part, model } of build.parts) expect(part.ref.replace(/\d+$/, ''), part.id).toBe(refLetter[model.kind])
  })

  it('mates at every joint, but for the bench that is wrong in many ways', () => {
    const wrong = resolve(load(id), catalog).joints.filter((joint) => !joint.mating.mates)
    expect(wrong.map(({ joint }) => joint.id)).toHaveLength(id === 'salvage' ? 1 : 0)
  })

  it('is found to be what its findings.json says: every danger, fault and caution, and the notes it names', () => {
    const expected = expectedSchema.parse(JSON.parse(read(id, 'findings.json')))
    const found = check(load(id), catalog, { strict: true }).findings.map(asExpected)
    const lines = (items: readonly Expected[]) => items.filter(({ severity }) => severity !== 'note').map(asLine)
    expect(lines(found).sort()).toEqual(lines(expected).sort())
    for (const note of expected.filter(({ severity }) => severity === 'note'))
      expect(found.map(asLine)).toContain(asLine(note))
  })
})
