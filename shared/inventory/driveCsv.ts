import { csvOf } from '../paper/csv.ts'
import type { DriveLine } from './driveMap.ts'

/** The drive map as a table for a spreadsheet. */
export const driveMapCsv = (map: readonly DriveLine[]): string =>
  csvOf([
    [
      'case', 'bay', 'drive', 'serial', 'WWN', 'maker model', 'model', 'capacity TB', 'role', 'data path', 'power path',
      'phy', 'sectors', 'rate Gb/s', 'note',
    ], // prettier-ignore
    ...map.map((line) => [
      line.case,
      line.bay,
      line.ref,
      line.serial,
      line.wwn,
      line.makerModel,
      line.model,
      line.capacity_TB,
      line.role,
      line.data,
      line.power,
      line.phy,
      line.sectors,
      line.rate_Gbps,
      line.note,
    ]),
  ])
