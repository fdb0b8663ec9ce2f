/** A stretch that should not be cut. */
export type Span = readonly [from: number, to: number]

/** The least share of a page that a cut leaves full, rather than cut through something. */
const least = 0.55

/**
 * Where a drawing is cut so that every piece fits `most`, between its stretches where it can be. Answers the edges of
 * the pieces, both ends included.
 */
export function cutsOf([from, to]: Span, spans: readonly Span[], most: number): number[] {
  const edges = [from]
  for (let start = from; to - start > most + 1e-6;) {
    const cut = bestCut(start + most * least, start + most, spans)
    edges.push(cut)
    start = cut
  }
  return [...edges, to]
}

/** The place that crosses the fewest stretches; of those alike, the last. */
function bestCut(low: number, high: number, spans: readonly Span[]): number {
  const crossing = (place: number) => spans.filter(([a, b]) => a < place && place < b).length
  const candidates = [high, ...spans.flatMap(([a, b]) => [a, b]).filter((place) => place > low && place <= high)]
  let best = high
  let fewest = crossing(high)
  for (const place of candidates) {
    const count = crossing(place)
    if (count < fewest || (count === fewest && place > best)) {
      best = place
      fewest = count
    }
  }
  return best
}
