import type { DriveLine } from '../../inventory/driveMap.ts'
import { flow } from '../lid/flow.ts'
import { line } from '../lid/strips.ts'
import { blackInks, densities, paperSides_mm, type Look } from '../lid/style.ts'
import { tableHead, tableRow, type Column } from '../lid/table.ts'
import type { PageMark, PaperDocument } from '../page.ts'

const margin_mm = 12

/** The drive map on paper, on its side: both paths of a drive are long. */
export function drivePages(map: readonly DriveLine[], title: string, paper: 'a4' | 'letter'): PaperDocument {
  const [height_mm, width_mm] = paperSides_mm[paper]
  const width = width_mm - 2 * margin_mm
  const look: Look = { density: densities[1]!, inks: blackInks }
  const ways = (width - 175) / 2
  const columns: Column[] = [
    { title: 'Bay', width: 13 },
    { title: 'Drive', width: 14 },
    { title: 'Serial, WWN', width: 40 },
    { title: 'Model, sectors', width: 46 },
    { title: 'Role', width: 16 },
    { title: 'Data from', width: ways },
    { title: 'Power from', width: ways },
    { title: 'Link', width: 16 },
    { title: 'Note', width: 30 },
  ]
  const frame = { x: margin_mm, width, top: margin_mm + 13, bottom: height_mm - margin_mm }
  const sheets = flow(look, { first: frame, next: frame }, [
    {
      kind: 'full',
      make: () => [
        {
          title: 'Drives',
          head: tableHead(look, columns),
          strips: map.flatMap((one) => tableRow(look, columns, cellsOf(one))),
        },
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

function cellsOf(one: DriveLine) {
  const model = [one.makerModel, one.model, one.sectors && `sectors ${one.sectors} B`].filter(Boolean)
  return [
    {
      words: one.bay === null ? 'none' : [one.case, one.bay].filter((part) => part !== null).join(' '),
      isStrong: true,
    },
    { words: one.ref },
    { words: [one.serial || 'no serial', one.wwn].filter(Boolean).join(', ') },
    { words: model.join(', ') },
    { words: one.role ?? '' },
    { words: one.data || 'not reached' },
    { words: one.power || 'not fed' },
    { words: one.rate_Gbps === null ? '' : `${one.rate_Gbps} Gb/s` },
    { words: one.note },
  ]
}
