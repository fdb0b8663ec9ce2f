import type { PageMark } from '../page.ts'
import { counted } from '../words.ts'
import { drawBay } from './bayCell.ts'
import type { LidBay, LidMap } from './content.ts'
import type { Section, Strip } from './strips.ts'
import type { Look } from './style.ts'

/** Narrower than this a bay cannot hold its number and the end of a serial. */
const least_mm = 8
const widest_mm = 64
const gap_mm = 0.8

/** Rows of bays as the hand meets them. A row that is wider than the paper goes on below. */
export function mapSection(look: Look, map: LidMap, width: number): Section[] {
  const most = Math.max(1, Math.floor(width / least_mm))
  const bands = Math.max(1, Math.ceil(map.columns / most))
  return Array.from({ length: bands }, (_, band) => {
    const from = band * most
    const columns = Math.min(most, map.columns - from)
    const bays = map.bays.filter(({ column }) => column >= from && column < from + columns)
    const part = bands > 1 ? `, part ${band + 1} of ${bands}` : ''
    const filled = map.bays.filter(({ drives }) => drives.length > 0).length
    const title = `${map.title}${part}: ${filled} of ${counted(map.bays.length, 'bay')} filled`
    const pitch = Math.min(widest_mm, width / columns)
    return { title, strips: rowStrips(look, bays, from, pitch), isWhole: map.rows <= 16 }
  })
}

/** How wide a map wants to be at most; a tower of one column leaves room beside it. */
export const mapWidth = (map: LidMap): number => map.columns * widest_mm

function rowStrips(look: Look, bays: readonly LidBay[], from: number, pitch: number): Strip[] {
  const width = pitch - gap_mm
  const height = cellHeight(look, width)
  const rows = [...new Set(bays.map(({ row }) => row))].sort((a, b) => a - b)
  return rows.map((row, i): Strip => {
    const next = rows[i + 1]
    const isBeforeGap = next !== undefined && next - row > 1.01
    return {
      height: height + gap_mm + (isBeforeGap ? 1.8 : 0),
      draw: (x, y) =>
        bays
          .filter((bay) => bay.row === row)
          .flatMap((bay): PageMark[] => drawBay(look, bay, x + (bay.column - from) * pitch, y, width, height)),
    }
  })
}

/** Wide cells need a line or two, narrow ones say everything below each other. */
function cellHeight(look: Look, width: number): number {
  const scale = look.density.bay_pt / 11
  if (width >= 52) return 8.6 * scale
  if (width >= 27) return 11.5 * scale
  return 16.5
}
