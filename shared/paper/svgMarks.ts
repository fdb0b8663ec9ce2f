import { pt_mm, type PageMark } from './page.ts'
import { placePath, type Placing } from './place.ts'
import type { Weight } from './text/notoSans.ts'

/*
 * Reads back what `svg.ts` writes, as marks of a page: so a drawing that is made in its own units can stand on paper,
 * in its true inks, with its text as text.
 */

type Attributes = Readonly<Record<string, string>>

const entities: Readonly<Record<string, string>> = { amp: '&', lt: '<', gt: '>', quot: '"', '#39': "'" }
const plain = (text: string): string => text.replace(/&(#?\w+);/g, (whole, name: string) => entities[name] ?? whole)

function attributesOf(source: string): Attributes {
  const attributes: Record<string, string> = {}
  for (const [, name = '', value = ''] of source.matchAll(/([\w-]+)="([^"]*)"/g)) attributes[name] = plain(value)
  return attributes
}

/** Marks of a piece of drawing, put on the page; `inkOf` turns the drawing's colours into those of the page. */
export function svgMarks(markup: string, placing: Placing, inkOf: (colour: string) => string): PageMark[] {
  const marks: PageMark[] = []
  const moves: { dx: number; dy: number }[] = [{ dx: 0, dy: 0 }]
  let open: { attributes: Attributes; text: string } | undefined
  for (const [, closing, name = '', source = '', , alone, text = ''] of markup.matchAll(
    /<(\/?)(\w+)((\s+[\w-]+="[^"]*")*)\s*(\/?)>([^<]*)/g,
  )) {
    if (name === 'g') {
      if (closing) moves.pop()
      else if (!alone) moves.push(moveOf(attributesOf(source), moves.at(-1)))
      continue
    }
    if (closing) {
      if (name === 'text' && open) marks.push(...textMark(open.attributes, open.text, within(placing, moves), inkOf))
      open = undefined
      continue
    }
    const attributes = attributesOf(source)
    if (name === 'text') open = { attributes, text: plain(text) }
    else marks.push(...shapeMark(name, attributes, within(placing, moves), inkOf))
  }
  return marks
}

function moveOf({ transform = '' }: Attributes, from: { dx: number; dy: number } = { dx: 0, dy: 0 }) {
  const [, x = '0', y = '0'] = /translate\(([-\d.]+)[ ,]+([-\d.]+)\)/.exec(transform) ?? []
  return { dx: from.dx + Number(x), dy: from.dy + Number(y) }
}

function within({ scale, dx, dy }: Placing, moves: readonly { dx: number; dy: number }[]): Placing {
  const move = moves.at(-1) ?? { dx: 0, dy: 0 }
  return { scale, dx: dx + move.dx * scale, dy: dy + move.dy * scale }
}

const at = (attributes: Attributes, name: string): number => Number(attributes[name] ?? 0)

function inks(attributes: Attributes, inkOf: (colour: string) => string) {
  const { fill, stroke } = attributes
  const opacity = Number(attributes['stroke-opacity'] ?? 1)
  return {
    ...(fill !== undefined && fill !== 'none' && { fill: inkOf(fill) }),
    ...(stroke !== undefined && stroke !== 'none' && { stroke: faded(inkOf(stroke), opacity) }),
  }
}

/** A colour as it looks through on white: paper knows no see-through ink. */
function faded(colour: string, opacity: number): string {
  if (opacity >= 1) return colour
  const channel = (i: number) => parseInt(colour.slice(1 + 2 * i, 3 + 2 * i), 16)
  const mixed = [0, 1, 2].map((i) => Math.round(255 - (255 - channel(i)) * opacity))
  return `#${mixed.map((one) => one.toString(16).padStart(2, '0')).join('')}`
}

const dashOf = (attributes: Attributes, scale: number) =>
  attributes['stroke-dasharray'] === undefined
    ? {}
    : {
        dash: attributes['stroke-dasharray']
          .split(/[ ,]+/)
          .map((one) => (Number(one) * scale).toFixed(2))
          .join(' '),
      }

function shapeMark(
  name: string,
  attributes: Attributes,
  placing: Placing,
  inkOf: (colour: string) => string,
): PageMark[] {
  const { scale, dx, dy } = placing
  const common = {
    ...inks(attributes, inkOf),
    stroke_mm: Number(attributes['stroke-width'] ?? 1) * scale,
    ...dashOf(attributes, scale),
  }
  if (name === 'rect') {
    const place = { x: at(attributes, 'x') * scale + dx, y: at(attributes, 'y') * scale + dy }
    const size = { width: at(attributes, 'width') * scale, height: at(attributes, 'height') * scale }
    return [{ kind: 'box', ...place, ...size, ...common, radius: at(attributes, 'rx') * scale }]
  }
  if (name === 'circle') {
    const r = at(attributes, 'r')
    const [x, y, k] = [at(attributes, 'cx'), at(attributes, 'cy'), r * 0.5523]
    const d =
      `M${x - r} ${y}C${x - r} ${y - k} ${x - k} ${y - r} ${x} ${y - r}C${x + k} ${y - r} ${x + r} ${y - k} ${x + r} ${y}` +
      `C${x + r} ${y + k} ${x + k} ${y + r} ${x} ${y + r}C${x - k} ${y + r} ${x - r} ${y + k} ${x - r} ${y}Z`
    return [{ kind: 'path', d: placePath(d, placing), ...common }]
  }
  if (name !== 'path') return []
  return [
    {
      kind: 'path',
      d: placePath(attributes['d'] ?? '', placing),
      ...common,
      ...(attributes['stroke-linecap'] === 'round' && { round: true }),
    },
  ]
}

function textMark(
  attributes: Attributes,
  text: string,
  { scale, dx, dy }: Placing,
  inkOf: (colour: string) => string,
): PageMark[] {
  if (text === '') return []
  const anchor = attributes['text-anchor']
  const halo = attributes['paint-order'] === 'stroke' ? attributes['stroke'] : undefined
  return [
    {
      kind: 'text',
      x: at(attributes, 'x') * scale + dx,
      y: at(attributes, 'y') * scale + dy,
      text,
      size_pt: (at(attributes, 'font-size') * scale) / pt_mm,
      weight: Number(attributes['font-weight'] ?? 400) as Weight,
      ...((anchor === 'middle' || anchor === 'end') && { anchor }),
      colour: inkOf(attributes['fill'] ?? '#000000'),
      ...(halo !== undefined && {
        halo: { colour: inkOf(halo), width_mm: Number(attributes['stroke-width'] ?? 1) * scale },
      }),
    },
  ]
}
