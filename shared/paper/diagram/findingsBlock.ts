import type { CheckResult } from '../../check/result.ts'
import { severities, severityRank } from '../../check/severity.ts'
import { groupBy } from '../../layout/groupBy.ts'
import { group, text } from '../svg.ts'
import { textWidth, wrapText } from '../text/textWidth.ts'
import type { Block } from './block.ts'
import { severityShape, severityTag, severityTagWidth } from './marks.ts'
import { palette, severityColour } from './palette.ts'

const width = 440
const most = 6
const lineHeight = 16

/** How many findings of each kind, and the worst of every rule in words. */
export function findingsBlock(result: CheckResult): Block {
  const open = result.findings.filter((finding) => !finding.accepted && finding.severity !== 'note')
  const sorted = [...open].sort((a, b) => severityRank[a.severity] - severityRank[b.severity])
  const kinds = [...groupBy(sorted, (finding) => `${finding.severity} ${finding.rule}`).values()]
  const entries = kinds.slice(0, most).flatMap(([first, ...alike]) => {
    if (!first) return []
    const lines = wrapText(first.message, width - 22, 11.5, 400, 2)
    return [{ severity: first.severity, lines, alike: alike.length, height: lines.length * lineHeight + 6 }]
  })
  const rest = kinds.slice(most).flat().length
  const total = entries.reduce((sum, { height, alike }) => sum + height + (alike > 0 ? lineHeight : 0), 0)
  return {
    width,
    height: 52 + total + (rest > 0 ? 20 : 0),
    draw(x, y) {
      const marks = [
        text(x, y + 14, 'Findings', { size: 13, weight: 700, fill: palette.ink }),
        counts(x, y + 38, result),
      ]
      let top = y + 52
      const write = (words: string, fill: string) => {
        marks.push(text(x + 22, top + 12, words, { size: 11.5, fill }))
        top += lineHeight
      }
      for (const { severity, lines, alike } of entries) {
        marks.push(severityShape(x, top + 2, severity))
        for (const words of lines) write(words, palette.ink)
        if (alike > 0) write(`and ${alike} more of this kind`, palette.soft)
        top += 6
      }
      if (rest > 0) write(`and ${rest} more`, palette.soft)
      return group({}, marks)
    },
  }
}

function counts(x: number, y: number, { counts: found }: CheckResult): string {
  let left = x
  const marks: string[] = []
  for (const severity of severities) {
    marks.push(severityTag(left, y, severity, 12))
    left += severityTagWidth(severity, 12) + 6
    const number = String(found[severity])
    marks.push(text(left, y, number, { size: 12, weight: 700, fill: severityColour[severity] }))
    left += textWidth(number, 12, 700) + 18
  }
  marks.push(text(left, y, `accepted ${found.accepted}`, { size: 12, fill: palette.soft }))
  return marks.join('')
}
