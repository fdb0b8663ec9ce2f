import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import type { Change } from '#shared/build/changes.ts'
import { compareBuilds } from '#shared/build/compare.ts'
import { differenceWords } from '#shared/build/compareWords.ts'
import { buildDocumentSchema } from '#shared/build/document.ts'
import { notePurchases } from '#shared/build/edits/purchase.ts'
import { invert } from '#shared/build/invert.ts'
import { resolve, type ResolvedBuild } from '#shared/build/resolve.ts'
import { clashes, touched } from '#shared/build/touch.ts'
import type { Finding } from '#shared/check/result.ts'
import { csvOf } from '#shared/paper/csv.ts'
import { lineCautions } from '#shared/paper/partsList/cautions.ts'
import { partsCsv } from '#shared/paper/partsList/partsCsv.ts'
import { partsList } from '#shared/paper/partsList/partsList.ts'
import { tenDrives } from '../../layout/sampleBuilds.ts'
import { smallCatalog } from '../../layout/smallCatalog.ts'

const build = tenDrives()
const noted = (line: string, purchase: object): ResolvedBuild =>
  resolve(apply(build.document, [{ op: 'setPurchase', line, purchase } as Change]), smallCatalog)
const lineOf = (from: ResolvedBuild, model: string) => partsList(from).lines.find((line) => line.model === model)!

describe('what the list holds', () => {
  it('has every part once', () => {
    const refs = partsList(build).lines.flatMap(({ refs }) => refs)
    expect([...refs].sort()).toEqual(build.document.parts.map(({ ref }) => ref).sort())
  })

  it('groups by model, counts connectors and tells plug from receptacle', () => {
    const line = lineOf(build, 'breakout-tails')
    expect(line).toMatchObject({ needed: 2, toBuy: 2, refs: ['W7', 'W8'] })
    expect(line.connectors.map(({ count, side }) => [count, side])).toContainEqual([4, 'receptacle'])
  })

  it('keeps an own length apart: it is another thing to buy', () => {
    const overrides = { 'cable.length_mm': { value: 750, origin: 'measured' as const } }
    const other = resolve(apply(build.document, [{ op: 'updatePart', id: 'W9', patch: { overrides } }]), smallCatalog)
    const lines = partsList(other).lines.filter(({ model }) => model === 'breakout-tails')
    expect(lines.map(({ line, needed }) => [line, needed])).toEqual([
      ['breakout-tails', 1],
      ['breakout-tails@750', 1],
    ])
  })
})

describe('owned, ordered, to buy', () => {
  it('takes what is owned and ordered off what is needed, never below nothing', () => {
    expect(lineOf(noted('drive', { owned: 7, ordered: 2 }), 'drive').toBuy).toBe(1)
    expect(lineOf(noted('drive', { owned: 12 }), 'drive').toBuy).toBe(0)
  })

  it('adds prices by currency, to the cent', () => {
    const from = resolve(
      apply(build.document, [
        { op: 'setPurchase', line: 'drive', purchase: { price: 39.99, currency: 'EUR', owned: 4 } },
        { op: 'setPurchase', line: 'lead-3', purchase: { price: 0.1, currency: 'EUR' } },
        { op: 'setPurchase', line: 'fan', purchase: { price: 9, currency: 'USD' } },
      ]),
      smallCatalog,
    )
    expect(partsList(from).totals).toEqual([
      { currency: 'EUR', all: 400.2, toBuy: 240.24 },
      { currency: 'USD', all: 9, toBuy: 9 },
    ])
    expect(partsList(from).unpriced).toBe(partsList(from).lines.length - 3)
  })

  it('names notes whose line is gone from the diagram', () => {
    expect(partsList(noted('no-such-model', { owned: 1 })).stale).toEqual([{ line: 'no-such-model', owned: 1 }])
  })
})

describe('notes about buying are edits', () => {
  it('are kept in the document, undone, and told in words', () => {
    const made = notePurchases(build.document, [
      { line: 'drive', name: 'drive', patch: { owned: 4, note: 'from the old vault' } },
    ])
    if (!made.ok) throw new Error(made.reason)
    const after = apply(build.document, made.edit.changes)
    expect(buildDocumentSchema.parse(after).purchases).toEqual([
      { line: 'drive', owned: 4, note: 'from the old vault' },
    ])
    expect(apply(after, invert(build.document, made.edit.changes))).toEqual(build.document)
    const [difference] = compareBuilds(build.document, after)
    expect(differenceWords(difference!, { model: () => 'Nearline drive' })).toBe(
      'Parts list, Nearline drive set to 4 owned, "from the old vault".',
    )
  })

  it('leave no trace when the last one is cleared', () => {
    const from = noted('drive', { owned: 4 })
    const made = notePurchases(from.document, [{ line: 'drive', name: 'drive', patch: { owned: null } }])
    if (!made.ok) throw new Error(made.reason)
    expect(apply(from.document, made.edit.changes)).toEqual(build.document)
    const back = apply(apply(from.document, made.edit.changes), invert(from.document, made.edit.changes))
    expect(back).toEqual(from.document)
  })

  it('refuse nothing new, and collide only on the same line', () => {
    expect(notePurchases(build.document, [{ line: 'drive', name: 'drive', patch: { owned: null } }]).ok).toBe(false)
    const set = (line: string): Change[] => [{ op: 'setPurchase', line, purchase: { owned: 1 } }]
    expect(clashes(touched(set('a')), touched(set('b')))).toEqual([])
    expect(clashes(touched(set('a')), touched(set('a')))).toEqual(['purchases/a'])
  })
})

describe('do not buy', () => {
  const finding = (rule: string, parts: string[], more: Partial<Finding> = {}): Finding =>
    ({ rule, severity: 'caution', subjects: parts.map((part) => ({ kind: 'part', part })), ...more }) as Finding

  it('says so on the cable of a wrong direction, not on the drives behind it', () => {
    const findings = [finding('breakout-reversed', ['W8', 'W8', 'C1'])]
    expect(lineCautions(lineOf(build, 'breakout-tails'), build, findings)).toEqual([
      expect.stringContaining('Do not buy this direction'),
    ])
    expect(lineCautions(lineOf(build, 'drive'), build, findings)).toEqual([])
  })

  it('says so on moulded adapters, with the reason where somebody accepted one', () => {
    const accepted = { key: 'k', reason: 'looked inside', by: 'x', on: 'y', severity: 'caution' as const }
    const [words] = lineCautions(lineOf(build, 'splitter-2'), build, [finding('moulded-adapter', ['W5'], { accepted })])
    expect(words).toMatch(/moulded.*Accepted in this plan: looked inside/)
  })

  it('says so on leads whose supply nobody knows', () => {
    expect(lineCautions(lineOf(build, 'lead-3'), build, [])).toEqual([expect.stringContaining('measure every pin')])
  })
})

describe('as a table', () => {
  it('runs no formula and keeps commas, quotes and line ends in their cell', () => {
    expect(csvOf([['=HYPERLINK("x")', '+1', '-2', '@a', 'a,b', 'say "so"', 'two\nrows', 3.5, -4, null]])).toBe(
      '\ufeff"\'=HYPERLINK(""x"")",\'+1,\'-2,\'@a,"a,b","say ""so""","two\nrows",3.5,-4,\r\n',
    )
  })

  it('has a row a line', () => {
    const list = partsList(noted('drive', { owned: 4, price: 39.5, currency: 'EUR', note: '=cmd' }))
    const rows = partsCsv(list, build, []).trim().split('\r\n')
    expect(rows).toHaveLength(list.lines.length + 1)
    expect(rows.find((row) => row.startsWith('drive,'))).toMatch(/,10,4,,6,39\.5,EUR,'=cmd,$/)
  })
})
