import type { ResolvedBuild } from '../../build/resolve.ts'
import { group, text } from '../svg.ts'
import { fitText, textWidth } from '../text/textWidth.ts'
import type { Block } from './block.ts'
import { palette } from './palette.ts'

const columnWidth = 340
const linesInColumn = 9
const pitch = 17

/** "C1 to C8, C11" */
export function refRanges(refs: readonly string[]): string {
  const parsed = refs
    .map((ref) => ({ letter: ref.replace(/\d+$/, ''), number: Number(/\d+$/.exec(ref)?.[0] ?? 0) }))
    .sort((a, b) => (a.letter === b.letter ? a.number - b.number : a.letter < b.letter ? -1 : 1))
  const ranges: { letter: string; first: number; last: number }[] = []
  for (const { letter, number } of parsed) {
    const before = ranges.at(-1)
    if (before && before.letter === letter && before.last + 1 === number) before.last = number
    else ranges.push({ letter, first: number, last: number })
  }
  return ranges
    .map(({ letter, first, last }) => {
      if (first === last) return `${letter}${first}`
      return last === first + 1 ? `${letter}${first}, ${letter}${last}` : `${letter}${first} to ${letter}${last}`
    })
    .join(', ')
}

/** Every model on the sheet with its full name and the designations that it stands for. */
export function partsBlock(build: ResolvedBuild, columns: number): Block {
  const models = new Map<string, { name: string; refs: string[] }>()
  for (const { part, model } of build.parts) {
    const entry = models.get(model.id)
    if (entry) entry.refs.push(part.ref)
    else models.set(model.id, { name: model.name, refs: [part.ref] })
  }
  const entries = [...models.values()].map(({ name, refs }) => ({ refs: refRanges(refs), name }))
  const used = Math.max(1, Math.min(columns, Math.ceil(entries.length / linesInColumn)))
  const lines = Math.ceil(entries.length / used)
  return {
    width: used * columnWidth + (used - 1) * 24,
    height: 28 + lines * pitch,
    draw: (x, y) =>
      group({}, [
        text(x, y + 14, 'Parts', { size: 13, weight: 700, fill: palette.ink }),
        ...entries.flatMap(({ refs, name }, i) => {
          const left = x + Math.floor(i / lines) * (columnWidth + 24)
          const baseline = y + 38 + (i % lines) * pitch
          const shown = fitText(refs, 150, 11.5, 600)
          const indent = Math.max(56, textWidth(shown, 11.5, 600) + 10)
          return [
            text(left, baseline, shown, { size: 11.5, weight: 600, fill: palette.ink }),
            text(left + indent, baseline, name, { size: 11.5, fill: palette.soft, width: columnWidth - indent }),
          ]
        }),
      ]),
  }
}
