/** One line of the table that `npm run bench` prints. */
export interface Row {
  what: string
  own_ms: number
  /** What stands beside it, measured in the same run. */
  beside: string
}

/** A line whose figure is no time. */
export interface Figure {
  what: string
  own: number
  unit: 'kB' | '/s'
  beside: string
}

/** Calls until the code is warm: for this long, or so many times. */
const warmUp = { ms: 1500, calls: 1000 }

/** Median time of a call, warm, over `runs` calls. */
export function median_ms(call: () => unknown, runs = 101): number {
  const begun = performance.now()
  for (let i = 0; i < warmUp.calls && performance.now() - begun < warmUp.ms; i++) call()
  const times = Array.from({ length: runs }, () => {
    const start = performance.now()
    call()
    return performance.now() - start
  })
  return times.sort((a, b) => a - b)[runs >> 1]!
}

/** Prints rows as one table. */
export function printTable(rows: readonly (Row | Figure)[]): void {
  const width = Math.max(...rows.map(({ what }) => what.length))
  for (const row of rows) {
    const [own, unit] = 'own_ms' in row ? [row.own_ms, 'ms'] : [row.own, row.unit]
    console.log(`${row.what.padEnd(width)}  ${own.toFixed(own < 10 ? 3 : 1).padStart(9)} ${unit}  ${row.beside}`)
  }
}
