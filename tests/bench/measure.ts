/** One line of the table that `npm run bench` prints. */
export interface Row {
  what: string
  own_ms: number
  /** What stands beside it, measured in the same run. */
  beside: string
}

/** Median time of a call, after a warm-up, over at least `runs` calls. */
export function median_ms(call: () => unknown, runs = 41): number {
  for (let i = 0; i < Math.max(5, runs >> 1); i++) call()
  const times = Array.from({ length: runs }, () => {
    const start = performance.now()
    call()
    return performance.now() - start
  })
  return times.sort((a, b) => a - b)[runs >> 1]!
}

/** Prints rows as one table. */
export function printTable(rows: readonly Row[]): void {
  const width = Math.max(...rows.map(({ what }) => what.length))
  for (const { what, own_ms, beside } of rows)
    console.log(`${what.padEnd(width)}  ${own_ms.toFixed(own_ms < 10 ? 3 : 1).padStart(9)} ms  ${beside}`)
}
