import type { DriveLine } from '#shared/inventory/driveMap.ts'

/** What the table of drives can be sorted by. */
export type DriveColumn = 'bay' | 'ref' | 'serial' | 'model' | 'role' | 'data' | 'power' | 'rate'

const compare = (a: string, b: string): number => a.localeCompare(b, undefined, { numeric: true })

/** Sorted by one column; the map's own order (case and bay) holds among equals, and what is missing comes last. */
export function sortLines(lines: readonly DriveLine[], column: DriveColumn): DriveLine[] {
  if (column === 'bay') return [...lines]
  const keyOf = (line: DriveLine): string =>
    column === 'rate' ? (line.rate_Gbps === null ? '' : String(line.rate_Gbps)) : (line[column] ?? '')
  return [...lines].sort((a, b) => {
    const [left, right] = [keyOf(a), keyOf(b)]
    return left === '' || right === '' ? Number(left === '') - Number(right === '') : compare(left, right)
  })
}
