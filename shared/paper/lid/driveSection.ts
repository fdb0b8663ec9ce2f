import type { LidContent, LidDrive } from './content.ts'
import type { Section } from './strips.ts'
import type { Look } from './style.ts'
import { shareWidth, tableHead, tableRow, wish, type Column } from './table.ts'

/** One row a drive: what feeds it and what talks to it, from the far end to the plug. */
export function driveSection(look: Look, { drives }: LidContent, width: number): Section[] {
  if (drives.length === 0) return []
  const { body_pt, bay_pt } = look.density
  const size = Math.min(bay_pt, body_pt + 1.5)
  const bays = drives.map(bayWords)
  const wishes = {
    bay: Math.max(8, wish([...bays, 'Bay'], size, 700)),
    ref: Math.max(
      10,
      wish(
        drives.map(({ ref }) => ref),
        body_pt,
      ),
    ),
    serial: Math.min(
      width * 0.24,
      Math.max(
        16,
        wish(
          drives.map(({ serial }) => serial),
          body_pt,
          600,
        ),
      ),
    ),
  }
  const left = width - wishes.bay - wishes.ref - wishes.serial
  const [power = 0, data = 0] = shareWidth(
    [
      wish(
        drives.map((drive) => drive.power),
        body_pt,
      ),
      wish(
        drives.map((drive) => drive.data),
        body_pt,
      ),
    ],
    left,
    left * 0.3,
  )
  const columns: Column[] = [
    { title: 'Bay', width: wishes.bay, weight: 700, size_pt: size },
    { title: 'Drive', width: wishes.ref },
    { title: 'Serial', width: wishes.serial, weight: 600 },
    { title: 'Power: supply socket > lead, outlet > splitter > plug', width: power },
    { title: 'Data: slot > controller port, lane > cable, leg or bay', width: data },
  ]
  return [
    {
      title: 'What feeds it, what talks to it',
      head: tableHead(look, columns),
      strips: drives.flatMap((drive, i) =>
        tableRow(look, columns, [
          { words: bays[i] ?? '' },
          { words: drive.ref },
          { words: drive.serial },
          { words: drive.power, isStrong: drive.powerIsOpen },
          { words: drive.data, isStrong: drive.dataIsOpen },
        ]),
      ),
    },
  ]
}

/** A drive outside the bays has a dash. */
const bayWords = ({ bay }: LidDrive): string => bay || '–'
