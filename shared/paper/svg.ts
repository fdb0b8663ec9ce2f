import { fitText } from './text/textWidth.ts'
import type { Weight } from './text/notoSans.ts'

/* A few words of SVG: everything that is drawn on paper is put together from these, so that all text is escaped. */

type Attributes = Record<string, string | number | undefined>

/** Control characters, halves of characters and other code points that XML 1.0 cannot hold at all. */
const unwritable = /[^\P{Cc}\t\n\r]|[\p{Cs}\ufffe\uffff]/gu

/** Marks XML's own characters and drops what cannot be written. */
export function escapeXml(text: string): string {
  return text.replace(unwritable, '').replace(/[&<>"']/g, (mark) => entities[mark] ?? mark)
}

const entities: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }

const written = (value: string | number): string =>
  typeof value === 'number' ? String(Math.round(value * 100) / 100) : escapeXml(value)

/** One element; `inside` is finished markup. */
export function element(name: string, attributes: Attributes, inside = ''): string {
  let open = `<${name}`
  for (const [key, value] of Object.entries(attributes)) if (value !== undefined) open += ` ${key}="${written(value)}"`
  return inside === '' ? `${open}/>` : `${open}>${inside}</${name}>`
}

export const group = (attributes: Attributes, inside: readonly string[]): string =>
  element('g', attributes, inside.join(''))

export interface TextStyle {
  size: number
  weight?: Weight
  fill: string
  anchor?: 'start' | 'middle' | 'end'
  /** Cut with an ellipsis beyond this width. */
  width?: number
  /** Colour of an outline behind the letters, where text stands over runs. */
  halo?: string
}

/** One line of text with its baseline at `y`. */
export function text(x: number, y: number, content: string, style: TextStyle): string {
  const { size, weight = 400, fill, anchor = 'start', width, halo } = style
  const shown = width === undefined ? content : fitText(content, width, size, weight)
  if (shown === '') return ''
  return element(
    'text',
    {
      x,
      y,
      'font-size': size,
      'font-weight': weight === 400 ? undefined : weight,
      fill,
      'text-anchor': anchor === 'start' ? undefined : anchor,
      ...(halo && { stroke: halo, 'stroke-width': 4, 'stroke-linejoin': 'round', 'paint-order': 'stroke' }),
    },
    escapeXml(shown),
  )
}

export interface BoxStyle {
  fill?: string
  stroke?: string
  strokeWidth?: number
  radius?: number
  dash?: string
}

export function box(x: number, y: number, width: number, height: number, style: BoxStyle): string {
  const { fill = 'none', stroke, strokeWidth, radius, dash } = style
  return element('rect', {
    x,
    y,
    width,
    height,
    rx: radius,
    fill,
    stroke,
    'stroke-width': strokeWidth,
    'stroke-dasharray': dash,
  })
}

export const line = (x1: number, y1: number, x2: number, y2: number, stroke: string, width = 1): string =>
  element('path', { d: `M${x1} ${y1}L${x2} ${y2}`, stroke, 'stroke-width': width, fill: 'none' })
