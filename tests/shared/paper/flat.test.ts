// @vitest-environment jsdom
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { ResolvedBuild } from '#shared/build/resolve.ts'
import { resolve } from '#shared/build/resolve.ts'
import { arrange } from '#shared/layout/arrange.ts'
import { flatDiagram, type FlatInput } from '#shared/paper/diagram/flat.ts'
import { backplanes, manyDrives, tenDrives } from '../layout/sampleBuilds.ts'
import { buildOf, smallCatalog } from '../layout/smallCatalog.ts'
import { wildBuild } from '../layout/wildBuild.ts'
import { drawnTexts, parseSvg } from './drawnText.ts'
import { sampleResult } from './sampleResult.ts'

const sheetOf = (build: ResolvedBuild, more: Partial<FlatInput> = {}): string =>
  flatDiagram({
    document: build.document,
    build,
    drawing: arrange(build),
    result: sampleResult(build),
    moment: 'cold-start',
    revision: 14,
    date: '2026-12-01',
    ...more,
  })

const wordsOf = (svg: string): string[] => drawnTexts(svg).map(({ words }) => words)

const samples = { tenDrives: tenDrives(), backplanes: backplanes(), sixtyDrives: manyDrives(60) }

describe('the sheet of ten drives', () => {
  const svg = sheetOf(samples.tenDrives, { checked: 'approved in round 2' })
  const words = wordsOf(svg)

  it('carries machine, revision, date, moment and state of review', () => {
    expect(words).toEqual(
      expect.arrayContaining([
        'Reel vault, north room (RV-N-01)',
        '14',
        '2026-12-01',
        'wiring, cold start',
        'approved in round 2',
      ]),
    )
  })

  it('says who approved which revision, on a line of its own, where anybody did', () => {
    const approval = 'Approved at revision 14 by Noor Castellan'
    const approved = wordsOf(sheetOf(samples.tenDrives, { checked: 'approved at revision 14', approval }))
    expect(approved).toContain(approval)
    expect(words).not.toContain('Approval')
  })

  it('says whether all is within the stated limits, and never that it is safe', () => {
    expect(words).toContain('no: 1 fault')
    expect(svg).not.toMatch(/\bsafe\b/i)
  })

  it('says the weakest hop in its sentence', () =>
    expect(words.join(' ')).toContain(
      'inlet of splitter W6 at cold start carries 6.0 A on contacts rated 4.5 A in all',
    ))

  it('counts the findings', () =>
    expect(words.join('|')).toMatch(/danger\|0\|fault\|1\|caution\|1\|note\|0\|accepted 1/))

  it('writes amperes on the runs', () => {
    expect(words.filter((word) => word === '2.0 A')).toHaveLength(10)
    expect(words).toContain('6.0 A')
    expect(words).toContain('10.0 A')
  })

  it('numbers the bays with drive, class, end of serial and role', () => {
    expect(words).toEqual(expect.arrayContaining(['01', 'C1', '1 TB SAS, 7200 rpm', '…1B7D', 'parity', '12', 'empty']))
  })

  it('says open ends in words', () => {
    expect(words).toContain('no data path')
    expect(words).toContain('not fed')
    expect(words).toContain('2 outlets left')
  })

  it('breaks the run of a fault and thickens that of a caution, with their words', () => {
    const document = parseSvg(svg)
    const broken = [...document.querySelectorAll('path[stroke-dasharray]')]
    expect(broken).toHaveLength(1)
    expect(broken[0]?.getAttribute('stroke')).toBe('#b3261e')
    const thick = [...document.querySelectorAll('path[stroke="#9a5b00"]')].map((path) =>
      path.getAttribute('stroke-width'),
    )
    expect(thick).toEqual(['9'])
    expect(words.filter((word) => word === 'fault').length).toBeGreaterThan(1)
  })

  it('fills plugs and leaves receptacles open', () => {
    const marks = [...parseSvg(svg).querySelectorAll('rect[width="8"][height="8"]')]
    const filled = marks.filter((mark) => mark.getAttribute('fill') === mark.getAttribute('stroke'))
    const ports = arrange(samples.tenDrives).nodes.flatMap((node) => node.ports)
    const legend = 1
    expect(filled).toHaveLength(ports.filter((port) => port.gender === 'plug').length + legend)
    expect(marks).toHaveLength(ports.length + 2 * legend)
  })

  it('needs nothing from outside', () => expect(svg).not.toMatch(/href|url\((?!data:)|<script|<foreignObject/))

  it('carries the typeface where it is given one', () => {
    const css = "@font-face{font-family:'Noto Sans';src:url(data:font/woff2;base64,AA)}"
    expect(parseSvg(sheetOf(samples.tenDrives, { fontCss: css })).querySelector('style')?.textContent).toBe(css)
  })

  it('is the same every time', () => expect(sheetOf(samples.tenDrives)).toBe(sheetOf(samples.tenDrives)))

  it('fits a page where one is named', () => {
    const root = parseSvg(sheetOf(samples.tenDrives, { paper: 'A3' })).documentElement
    expect(root.getAttribute('width')).toBe('420mm')
    expect(root.getAttribute('height')).toBe('297mm')
    const [, , width, height] = (root.getAttribute('viewBox') ?? '').split(' ').map(Number)
    expect(width! / height!).toBeCloseTo(420 / 297, 2)
  })
})

describe.each(Object.entries(samples))('text on the sheet of %s', (_, build) => {
  const svg = sheetOf(build)
  const texts = drawnTexts(svg)

  it('stays on the sheet', () => {
    const [, , width, height] = (parseSvg(svg).documentElement.getAttribute('viewBox') ?? '').split(' ').map(Number)
    for (const { words, x, y, width: wide, height: high } of texts)
      expect([words, x >= 0 && y >= 0 && x + wide <= width! && y + high <= height!]).toEqual([words, true])
  })

  it('does not run into other text', () => {
    const clashes = texts.flatMap((a, i) =>
      texts
        .slice(i + 1)
        .filter((b) => a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height)
        .map((b) => `${a.words} / ${b.words}`),
    )
    expect(clashes).toEqual([])
  })
})

describe('the parser of these tests', () => {
  it('refuses what is not well formed', () => expect(() => parseSvg('<svg><text>&</svg>')).toThrow())
})

describe('any document', () => {
  it('gives well-formed XML, whatever people write into names', () => {
    const anyText = fc.string({ unit: 'binary', minLength: 1, maxLength: 60 })
    fc.assert(
      fc.property(wildBuild, anyText, anyText, (build, name, serial) => {
        const document = {
          ...build.document,
          name,
          machine: serial,
          parts: build.document.parts.map((part) => ({ ...part, name, serial })),
        }
        expect(parseSvg(sheetOf(resolve(document, smallCatalog))).documentElement.tagName).toBe('svg')
      }),
      { numRuns: 25 },
    )
  })

  it('may be empty', () => expect(wordsOf(sheetOf(buildOf([])))).toContain('Reel vault, north room'))
})
