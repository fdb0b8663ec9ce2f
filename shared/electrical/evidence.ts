import type { ResolvedPart } from '../build/resolve.ts'
import { momentIds, type Figure, type MomentId } from '../check/result.ts'
import { refsOf } from '../check/words.ts'
import type { Draw } from './attach.ts'

/** Figures of loads, the heaviest together first: "start current on 12 V of C1 to C4". At most `most`. */
export function loadFigures(draws: readonly Draw[], moment: MomentId, most = 4): Figure[] {
  const byFigure = new Map<Figure, { parts: ResolvedPart[]; sum_A: number }>()
  for (const draw of draws) {
    const { figure, value } = busiest(draw, moment)
    const known = byFigure.get(figure)
    if (known) {
      known.parts.push(draw.part)
      known.sum_A += value * draw.share
    } else byFigure.set(figure, { parts: [draw.part], sum_A: value * draw.share })
  }
  return [...byFigure]
    .filter(([, { sum_A }]) => sum_A > 0)
    .sort(([, a], [, b]) => b.sum_A - a.sum_A)
    .slice(0, most)
    .map(([figure, { parts }]) => ({ ...figure, what: `${figure.what} of ${refsOf(parts)}` }))
}

/** The figure by which a device draws most at a moment. */
export function busiest({ courses, currents }: Draw, moment: MomentId) {
  return courses[momentIndex(moment)]!.map(({ state }) => currents.inState[state]).reduce((most, taken) =>
    taken.value > most.value ? taken : most,
  )
}

/** The load figure whose range, over all devices that share it, moves a sum most; null where none has a range. */
export function loadFigureWithMostRange(
  draws: readonly Draw[],
  moment: MomentId,
): { figure: Figure; range: number } | null {
  const ranges = new Map<Figure, { range: number; part: ResolvedPart }>()
  for (const draw of draws) {
    const { figure, low, high } = busiest(draw, moment)
    const range = (high - low) * draw.share
    const known = ranges.get(figure)
    if (known) known.range += range
    else ranges.set(figure, { range, part: draw.part })
  }
  let most: { figure: Figure; range: number } | null = null
  for (const [figure, { range, part }] of ranges)
    if (range > (most?.range ?? 0))
      most = { figure: { ...figure, what: `${figure.what} of "${part.model.name}"` }, range }
  return most
}

/** Seconds for which motors fed by these draws start. */
export const longestStart_s = (draws: readonly Draw[]): number =>
  draws.reduce((most, { currents }) => Math.max(most, currents.start_s), 0)

export const momentIndex = (moment: MomentId): number => momentIds.indexOf(moment)
