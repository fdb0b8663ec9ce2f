import type { ResolvedBuild } from '../../build/resolve.ts'
import type { Finding } from '../../check/result.ts'
import { flow } from '../lid/flow.ts'
import { line, paragraph } from '../lid/strips.ts'
import { blackInks, densities, paperSides_mm, type Look } from '../lid/style.ts'
import { tableHead, tableRow, type Column } from '../lid/table.ts'
import type { PageMark, PaperDocument } from '../page.ts'
import { refRanges } from '../diagram/partsBlock.ts'
import { lineCautions } from './cautions.ts'
import { connectorWords } from './connectorCounts.ts'
import type { PartsLine, PartsList } from './partsList.ts'

const margin_mm = 12

/** "12.50 EUR" */
export const moneyWords = (amount: number, currency: string): string => `${amount.toFixed(2)} ${currency}`.trim()

/** The parts list on paper, to take along: what is needed, there and still to buy, with what not to buy. */
export function partsPages(
  list: PartsList,
  build: ResolvedBuild,
  findings: readonly Finding[],
  title: string,
  paper: 'a4' | 'letter',
): PaperDocument {
  const [width_mm, height_mm] = paperSides_mm[paper]
  const width = width_mm - 2 * margin_mm
  const look: Look = { density: densities[1]!, inks: blackInks }
  const columns: Column[] = [
    { title: 'Part', width: width - 102 },
    { title: 'Names', width: 30 },
    ...['Needed', 'Owned', 'Ordered', 'To buy'].map((name) => ({ title: name, width: 13, isRight: true })),
    { title: 'Price for one', width: 20, isRight: true },
  ]
  const frame = { x: margin_mm, width, top: margin_mm + 13, bottom: height_mm - margin_mm }
  const totals = list.totals.map(({ currency, all, toBuy }) =>
    paragraph(
      look,
      width,
      `All parts ${moneyWords(all, currency)}, of that still to buy ${moneyWords(toBuy, currency)}.`,
    ),
  )
  const unpriced = `${list.unpriced} lines still to buy have no price: the totals lack them.`
  const sheets = flow(look, { first: frame, next: frame }, [
    {
      kind: 'full',
      make: () => [
        {
          title: 'Parts',
          head: tableHead(look, columns),
          strips: list.lines.flatMap((one) =>
            tableRow(look, columns, cellsOf(one, lineCautions(one, build, findings))),
          ),
        },
        ...(totals.length > 0
          ? [{ title: 'Totals', strips: [...totals, ...(list.unpriced > 0 ? [paragraph(look, width, unpriced)] : [])] }]
          : []),
      ],
    },
  ])
  const heading: PageMark[] = line(margin_mm, margin_mm + 6, title, 14, { weight: 700, width })
  return {
    title,
    language: 'en',
    pages: sheets.map((marks, i) => ({
      width_mm,
      height_mm,
      title: i === 0 ? title : `${title}, page ${i + 1}`,
      marks: [...heading, ...marks],
    })),
  }
}

function cellsOf(one: PartsLine, cautions: readonly string[]) {
  const { purchase } = one
  const what = [
    one.name,
    one.length_mm === null || one.name.includes('mm') ? '' : `${one.length_mm} mm`,
    connectorWords(one.connectors),
    purchase?.note ?? '',
    ...cautions,
  ]
  const number = (value: number | undefined) => ({ words: value === undefined ? '' : String(value) })
  return [
    { words: what.filter(Boolean).join('. ').replaceAll('..', '.') },
    { words: refRanges(one.refs) },
    number(one.needed),
    number(purchase?.owned),
    number(purchase?.ordered),
    { words: String(one.toBuy), isStrong: one.toBuy > 0 },
    { words: purchase?.price === undefined ? '' : moneyWords(purchase.price, purchase.currency ?? '') },
  ]
}
