import type { Severity } from '../../check/severity.ts'
import { box, element, group, line, text } from '../svg.ts'
import { textWidth } from '../text/textWidth.ts'
import { palette, severityColour } from './palette.ts'

/** Shape of a severity in a 12 px square: filled triangle, broken run, thick run, dot. */
export function severityShape(x: number, y: number, severity: Severity): string {
  const fill = severityColour[severity]
  switch (severity) {
    case 'danger':
      return element('path', { d: `M${x + 6} ${y + 0.5}L${x + 12} ${y + 11}H${x}Z`, fill })
    case 'fault':
      return group({ stroke: fill, 'stroke-width': 3.5 }, [
        element('path', { d: `M${x} ${y + 6}h5M${x + 7.5} ${y + 6}h4.5`, fill: 'none' }),
      ])
    case 'caution':
      return box(x, y + 3, 12, 6, { fill, radius: 1 })
    case 'note':
      return element('circle', { cx: x + 6, cy: y + 6, r: 3.5, fill })
  }
}

/** Shape and word together: colour never speaks alone. `y` is the baseline; `words` may say more than the severity. */
export function severityTag(x: number, y: number, severity: Severity, size = 10.5, words: string = severity): string {
  return group({}, [
    severityShape(x, y - 10, severity),
    text(x + 16, y, words, { size, weight: 600, fill: severityColour[severity], halo: palette.paper }),
  ])
}

export const severityTagWidth = (severity: Severity, size = 10.5): number => 16 + textWidth(severity, size, 600)

/** A connector on the edge of its part: plugs filled, receptacles open. */
export function connectorMark(x: number, y: number, gender: 'plug' | 'receptacle', colour: string): string {
  const fill = gender === 'plug' ? colour : palette.card
  return box(x - 4, y - 4, 8, 8, { fill, stroke: colour, strokeWidth: 1.25 })
}

/** An end that nothing is joined to, in words beside an open ring. */
export function openEnd(x: number, y: number, words: string, side: 'left' | 'right'): string {
  const way = side === 'left' ? -1 : 1
  return group({}, [
    line(x, y, x + way * 6, y, palette.danger, 1.5),
    element('circle', {
      cx: x + way * 10,
      cy: y,
      r: 4,
      fill: palette.card,
      stroke: palette.danger,
      'stroke-width': 1.5,
    }),
    text(x + way * 17, y + 4, words, {
      size: 11,
      weight: 600,
      fill: palette.danger,
      anchor: side === 'left' ? 'end' : 'start',
      halo: palette.paper,
    }),
  ])
}
