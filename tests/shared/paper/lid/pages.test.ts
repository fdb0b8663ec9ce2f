import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { BuildDocument } from '#shared/build/document.ts'
import { extentOf, type Extent } from '#shared/paper/extent.ts'
import { paperNames } from '#shared/paper/lid/content.ts'
import { marginOf } from '#shared/paper/lid/pages.ts'
import { paperSides_mm, smallest_pt } from '#shared/paper/lid/style.ts'
import type { Page, PageMark, PageText, PaperDocument } from '#shared/paper/page.ts'
import { pageSvg } from '#shared/paper/pageSvg.ts'
import { wildDocument } from '../../../fuzz/wildDocument.ts'
import { catalog, example, lidOf } from './sample.ts'

const textsOf = (marks: readonly PageMark[]): PageText[] =>
  marks.flatMap((mark) => (mark.kind === 'text' ? [mark] : mark.kind === 'window' ? textsOf(mark.marks) : []))

const wordsOf = ({ pages }: PaperDocument): string =>
  pages
    .map(({ marks }) =>
      textsOf(marks)
        .map(({ text }) => text)
        .join(' '),
    )
    .join(' ')

/** Marks that reach beyond the margins of their page, in words. */
const outside = ({ marks, width_mm, height_mm }: Page, margin: number): string[] =>
  marks.flatMap((mark) => {
    const { left, top, right, bottom } = extentOf(mark)
    const slack = 0.3
    const isIn =
      left >= margin - slack &&
      top >= margin - slack &&
      right <= width_mm - margin + slack &&
      bottom <= height_mm - margin + slack
    return isIn ? [] : [`${mark.kind} ${mark.kind === 'text' ? mark.text : ''} ${left} ${top} ${right} ${bottom}`]
  })

/** How far letters may come near each other without touching: accents and descenders are rarer than their boxes. */
const near_mm = 0.35

const overlapOf = (a: Extent, b: Extent): number =>
  Math.min(Math.min(a.right, b.right) - Math.max(a.left, b.left), Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top))

/** Texts, codes and frames of bays that lie over each other, in words. */
function overlaps({ marks }: Page): string[] {
  const all = marks
    .filter((mark) => mark.kind === 'text' || mark.kind === 'code')
    .map((mark) => ({ name: mark.kind === 'text' ? mark.text : 'code', extent: extentOf(mark) }))
  return all.flatMap((one, i) =>
    all
      .slice(i + 1)
      .filter((other) => overlapOf(one.extent, other.extent) > near_mm)
      .map((other) => `"${one.name}" over "${other.name}"`),
  )
}

const tooSmall = ({ marks }: Page): string[] =>
  textsOf(marks)
    .filter(({ size_pt }) => size_pt < smallest_pt - 0.01)
    .map(({ text, size_pt }) => `${text}: ${size_pt} pt`)

const examples = [
  'north-room-clean',
  'north-room',
  'projection-24',
  'stress-60',
  'salvage',
  'twin-inlets',
  'two-supplies',
]
const sheets = examples.flatMap((id) => paperNames.map((paper) => [id, paper] as const))

describe('the lid sheet of an example', () => {
  it.each(sheets)('%s on %s: nothing small, nothing outside the margins, nothing over anything', (id, paper) => {
    const { pages } = lidOf(example(id), { paper }).paper
    const [width, height] = paperSides_mm[paper]
    for (const [i, page] of pages.entries()) {
      expect([page.width_mm, page.height_mm]).toEqual([width, height])
      expect(tooSmall(page), `page ${i + 1}`).toEqual([])
      expect(outside(page, marginOf(paper)), `page ${i + 1}`).toEqual([])
      if (!page.title.startsWith('Diagram')) expect(overlaps(page), `page ${i + 1}`).toEqual([])
    }
  })

  it.each(sheets)('%s on %s: every serial, both ways of every drive and every reference stand on it', (id, paper) => {
    const { content, paper: printed, build } = lidOf(example(id), { paper })
    const squeezed = wordsOf(printed).replace(/\s+/g, '')
    for (const { serial, power, data } of content.drives)
      for (const words of [serial, power, data]) expect(squeezed).toContain(words.replace(/\s+/g, ''))
    for (const { part } of build.parts) expect(squeezed).toContain(part.ref)
  })

  it('prints the diagram to be read on up to four pages, a larger one whole on one', () => {
    const count = (id: string, diagram: 'auto' | 'pages' | 'none') => lidOf(example(id), { diagram }).paper.pages.length
    expect(count('north-room-clean', 'auto')).toBe(count('north-room-clean', 'pages'))
    expect(count('stress-60', 'pages')).toBeGreaterThan(count('stress-60', 'none') + 4)
    expect(count('stress-60', 'auto')).toBe(count('stress-60', 'none') + 1)
  })

  it('of up to sixteen drives stands on one page of A4 where little is found', () => {
    const { pages } = lidOf(example('north-room-clean'), { diagram: 'none' }).paper
    expect(pages).toHaveLength(1)
  })

  it('repeats its head and the heads of its tables on further pages', () => {
    const { pages } = lidOf(example('stress-60'), { diagram: 'none' }).paper
    expect(pages.length).toBeGreaterThan(1)
    const second = textsOf(pages[1]!.marks).map(({ text }) => text)
    expect(second).toEqual(
      expect.arrayContaining(['Vault, sixty drives', 'RV-V-60 · revision 14 · 2026-12-01', 'Serial']),
    )
    expect(second).toContain('What feeds it, what talks to it, continued')
    expect(second).toContain(`Page 2 of ${pages.length}`)
  })

  it('is black on white unless colour is asked for', () => {
    const document = example('north-room')
    const isGrey = (colour: string) => new Set(colour.slice(1).match(/../g)).size === 1
    const coloursOf = (printed: PaperDocument) =>
      printed.pages.flatMap((page) => pageSvg(page).match(/#[0-9a-f]{6}/g) ?? [])
    expect(coloursOf(lidOf(document).paper).filter((colour) => !isGrey(colour))).toEqual([])
    expect(coloursOf(lidOf(document, { colour: true }).paper)).toContain('#b3261e')
  })

  it('has the diagram whole: each word of it stands on one of its pages', () => {
    const { paper, build } = lidOf(example('projection-24'))
    const diagram = paper.pages.filter(({ title }) => title.startsWith('Diagram'))
    const words = new Set(diagram.flatMap(({ marks }) => textsOf(marks).map(({ text }) => text)))
    for (const { part } of build.parts.filter(({ model }) => model.kind !== 'case' && model.kind !== 'backplane'))
      expect(words).toContain(part.ref)
  })
})

const wild = wildDocument(catalog, { maxParts: 30, maxJoints: 50 })
const longName =
  'Ärchiv mit einem Namen der kein Ende nehmen will und ohneTrennstelleweitergehtbisinsUnermesslicheundweiter'

describe('the lid sheet of builds that nobody would build', () => {
  it('stays readable, in its margins and free of overlaps', () => {
    fc.assert(
      fc.property(wild, fc.constantFrom(...paperNames), fc.boolean(), (document, paper, isLong) => {
        const named: BuildDocument = isLong ? { ...document, name: longName, machine: longName.slice(0, 60) } : document
        const { pages } = lidOf(named, { paper, diagram: 'none' }).paper
        for (const page of pages) {
          expect(tooSmall(page)).toEqual([])
          expect(outside(page, marginOf(paper))).toEqual([])
          expect(overlaps(page)).toEqual([])
        }
      }),
      { numRuns: 25 },
    )
  })

  it('names every drive with its serial and both ways', () => {
    fc.assert(
      fc.property(wild, (document) => {
        const { content, paper } = lidOf(document, { diagram: 'none' })
        const squeezed = wordsOf(paper).replace(/\s+/g, '')
        for (const { ref, serial, power, data } of content.drives)
          for (const words of [ref, serial, power, data]) expect(squeezed).toContain(words.replace(/\s+/g, ''))
      }),
      { numRuns: 20 },
    )
  })
})
