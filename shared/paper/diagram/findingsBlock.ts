import type { CheckResult } from '../../check/result.ts'
import { severities, severityRank } from '../../check/severity.ts'
import { group, text } from '../svg.ts'
import { textWidth, wrapText } from '../text/textWidth.ts'
import type { Block } from './block.ts'
import { severityShape, severityTag, severityTagWidth } from './marks.ts'
import { palette, severityColour } from './palette.ts'

const width = 440
const most = 6
const lineHeight = 16

/** How many findings of each kind, and the worst of them in words. */
export function findingsBlock(result: CheckResult): Block {
  const open = result.findings.filter((finding) => !finding.accepted && finding.severity !== 'note')
  const worst = [...open].sort((a, b) => severityRank[a.severity] - severityRank[b.severity]).slice(0, most)
  const entries = worst.map((finding) => ({
    severity: finding.severity,
    lines: wrapText(finding.message, width - 22, 11.5, 400, 2),
  }))
  const rest = open.length - worst.length
  const height = 52 + entries.reduce((sum, { lines }) => sum + lines.length * lineHeight + 6, 0) + (rest > 0 ? 20 : 0)
  return {
    width,
    height,
    draw(x, y) {
      const marks = [
        text(x, y + 14, 'Findings', { size: 13, weight: 700, fill: palette.ink }),
        counts(x, y + 38, result),
      ]
      let top = y + 52
      for (const { severity, lines } of entries) {
        marks.push(severityShape(x, top + 2, severity))
        lines.forEach((words, i) =>
          marks.push(text(x + 22, top + 12 + i * lineHeight, words, { size: 11.5, fill: palette.ink })),
        )
        top += lines.length * lineHeight + 6
      }
      if (rest > 0) marks.push(text(x + 22, top + 12, `and ${rest} more`, { size: 11.5, fill: palette.soft }))
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
