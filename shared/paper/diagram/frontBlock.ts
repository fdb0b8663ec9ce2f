import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import { frontMap } from '../../layout/front.ts'
import { box, group, text } from '../svg.ts'
import { bayNumber } from './bays.ts'
import type { Block } from './block.ts'
import { palette } from './palette.ts'
import type { Reading } from './reading.ts'

/** The case front as the hand meets it: numbered bays, filled ones in ink, empty ones dotted. */
export function frontBlock(build: ResolvedBuild, holder: ResolvedPart, reading: Reading): Block {
  const map = frontMap(build, holder, 20, 4)
  const title = `${holder.part.ref} from the ${holder.model.bayView ?? 'front'}`
  return {
    width: Math.max(map.width, 140),
    height: 28 + map.height,
    draw: (x, y) =>
      group({}, [
        text(x, y + 14, title, { size: 13, weight: 700, fill: palette.ink, width: Math.max(map.width, 140) }),
        ...map.cells.flatMap((cell) => {
          const severity = cell.drive === undefined ? undefined : reading.partSeverity(cell.drive)
          const isMarked = severity === 'danger' || severity === 'fault'
          const isFilled = cell.drive !== undefined
          return [
            box(x + cell.x, y + 28 + cell.y, cell.width, cell.height, {
              fill: isFilled ? palette.card : 'none',
              stroke: isMarked ? palette.danger : isFilled ? palette.ink : palette.hairline,
              strokeWidth: isMarked ? 2 : 1,
              radius: 2,
            }),
            text(x + cell.x + cell.width / 2, y + 28 + cell.y + cell.height / 2 + 4, bayNumber(cell.slot), {
              size: 11.5,
              weight: isFilled ? 700 : 400,
              fill: isFilled ? (isMarked ? palette.danger : palette.ink) : palette.soft,
              anchor: 'middle',
            }),
          ]
        }),
      ]),
  }
}
