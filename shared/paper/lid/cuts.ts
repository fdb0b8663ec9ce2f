/** A stretch that should not be cut. */
export type Span = readonly [from: number, to: number]

/** Shares of a page that a cut must leave full; less only where more would cut through several things. */
const leasts = [0.75, 0.55] as const
const tolerable = 1

/**
 * Where a drawing is cut so that every piece fits `most`, between its stretches where it can be. Answers the edges of
 * the pieces, both ends included.
 */
export function cutsOf([from, to]: Span, spans: readonly Span[], most: number): number[] {
  const edges = [from]
  for (let start = from; to - start > most + 1e-6;) {
    const [full, less] = leasts.map((least) => bestCut(start + most * least, start + most, spans))
    const cut = full && less && full.crossed > tolerable && less.crossed < full.crossed ? less : full
    start = cut?.place ?? start + most
    edges.push(start)
  }
  return [...edges, to]
}

/** The place that crosses the fewest stretches; of those alike, the last. */
function bestCut(low: number, high: number, spans: readonly Span[]): { place: number; crossed: number } {
  const crossing = (place: number) => spans.filter(([a, b]) => a < place && place < b).length
  const best = { place: high, crossed: crossing(high) }
  for (const place of spans.flat().filter((one) => one > low && one <= high)) {
    const crossed = crossing(place)
    if (crossed < best.crossed || (crossed === best.crossed && place > best.place))
      Object.assign(best, { place, crossed })
  }
  return best
}
