import { fitText } from '../text/textWidth.ts'
import { flow } from '../lid/flow.ts'
import { line, paragraph, type Strip } from '../lid/strips.ts'
import { blackInks, densities, paperSides_mm, type Look } from '../lid/style.ts'
import { pt_mm, type PageMark, type PaperDocument } from '../page.ts'
import type { FrontMap } from '../../layout/front.ts'
import type { ReplaceCard } from './replaceCard.ts'

const margin_mm = 12
const mostMap_mm = 70

/** The card on paper: the bay marked on the case, the serial large, then the way of its cables, steps and cautions. */
export function replacePages(card: ReplaceCard, machine: string, paper: 'a4' | 'letter'): PaperDocument {
  const [width_mm, height_mm] = paperSides_mm[paper]
  const width = width_mm - 2 * margin_mm
  const look: Look = { density: densities[0]!, inks: blackInks }
  const words = (lead: string, text: string) => paragraph(look, width, text, { words: lead, width: 22, weight: 700 })
  const frame = { x: margin_mm, width, top: margin_mm + 22, bottom: height_mm - margin_mm }
  const numbered = card.steps.map((text, i) =>
    paragraph(look, width, text, { words: String(i + 1), width: 6, weight: 700 }),
  )
  const { map } = card
  const pages = flow(look, { first: frame, next: frame }, [
    {
      kind: 'full',
      make: () => [
        ...(map ? [{ title: card.mapTitle, strips: [mapStrip(map, card.drive, width)], isWhole: true }] : []),
        {
          title: 'The drive',
          strips: [
            words('serial', card.serial || 'not recorded'),
            words('what', [card.what, card.role].filter(Boolean).join(', ')),
            words('power', card.power),
            words('data', card.data),
            ...card.neighbours.map(({ where, bay, ref, tail }) =>
              words(where, `bay ${bay}: ${ref === '' ? 'empty' : `${ref}, serial ${tail}`}`),
            ),
          ],
        },
        { title: 'Steps', strips: numbered },
        { title: 'Cautions', strips: card.cautions.map((text) => paragraph(look, width, text)), isWhole: true },
      ],
    },
  ])
  return {
    title: `${card.title}, ${machine}`,
    language: 'en',
    pages: pages.map((marks, i) => ({
      width_mm,
      height_mm,
      title: i === 0 ? card.title : `${card.title}, page ${i + 1}`,
      marks: [...head(card, machine, width), ...marks],
    })),
  }
}

function head(card: ReplaceCard, machine: string, width: number): PageMark[] {
  const right = margin_mm + width
  return [
    ...line(margin_mm, margin_mm + 8, card.title, 20, { weight: 700, width: width * 0.68 }),
    ...line(margin_mm, margin_mm + 14.5, machine, 10, { width: width * 0.68 }),
    ...line(right, margin_mm + 8, card.tail, 24, { weight: 700, anchor: 'end', width: width * 0.3 }),
    ...line(right, margin_mm + 14.5, 'end of its serial', 9, { anchor: 'end' }),
    { kind: 'line', x1: margin_mm, y1: margin_mm + 18, x2: right, y2: margin_mm + 18, width_mm: 0.5 },
  ]
}

/** The case as the hand meets it, one bay black. */
function mapStrip(map: FrontMap, drive: string, width: number): Strip {
  const scale = Math.min(width / map.width, mostMap_mm / map.height, 0.7)
  return {
    height: map.height * scale + 2,
    draw: (x, y) =>
      map.cells.flatMap((cell): PageMark[] => {
        const isIt = cell.drive === drive
        const [left, top] = [x + cell.x * scale, y + cell.y * scale]
        const [wide, high] = [cell.width * scale, cell.height * scale]
        const size_pt = Math.max(4.5, Math.min(12, (Math.min(wide, high) * 0.62) / pt_mm))
        return [
          {
            kind: 'box',
            x: left,
            y: top,
            width: wide,
            height: high,
            fill: isIt ? '#000000' : '#ffffff',
            stroke: '#000000',
            stroke_mm: cell.drive === undefined ? 0.1 : 0.3,
            radius: 0.5,
          },
          {
            kind: 'text',
            x: left + wide / 2,
            y: top + high / 2 + size_pt * pt_mm * 0.36,
            text: fitText(String(cell.slot), wide, size_pt * pt_mm, isIt ? 700 : 400),
            size_pt,
            weight: isIt ? 700 : 400,
            anchor: 'middle',
            colour: isIt ? '#ffffff' : '#000000',
          },
        ]
      }),
  }
}
