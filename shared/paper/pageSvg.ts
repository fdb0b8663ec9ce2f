import { box, element, escapeXml, group } from './svg.ts'
import { ink, pt_mm, type Page, type PageCode, type PageMark, type PagePath, type PageText } from './page.ts'
import type { Weight } from './text/notoSans.ts'

/** Name and weight of the font that has a character's shape, where one family does not have all of them. */
export type FontOf = (character: string, weight: Weight) => { family: string; weight: 400 | 700 }

export interface SvgOptions {
  /** Absent: the page's own words for the whole family are enough, as in a browser. */
  fontOf?: FontOf
}

/** One page as an SVG image whose unit is the millimetre: shown on screen, printed, and put into a PDF. */
export function pageSvg(page: Page, { fontOf }: SvgOptions = {}): string {
  const { width_mm: width, height_mm: height, title, marks } = page
  return element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      viewBox: `0 0 ${width} ${height}`,
      width: `${width}mm`,
      height: `${height}mm`,
      'font-family': 'Noto Sans',
      role: 'img',
      'aria-label': title,
    },
    marks.map((mark) => markSvg(mark, fontOf)).join(''),
  )
}

function textSvg(mark: PageText, fontOf: FontOf | undefined): string {
  const weight = mark.weight ?? 400
  const runs = fontOf ? runsOf(mark.text, weight, fontOf) : []
  const [only] = runs
  const font = only ?? { family: undefined, weight }
  return element(
    'text',
    {
      x: mark.x,
      y: mark.y,
      'font-size': mark.size_pt * pt_mm,
      'font-family': font.family,
      'font-weight': font.weight === 400 ? undefined : font.weight,
      fill: mark.colour ?? ink,
      'text-anchor': mark.anchor === 'start' ? undefined : mark.anchor,
      transform: mark.turn ? `rotate(${mark.turn} ${mark.x} ${mark.y})` : undefined,
      ...(mark.halo && {
        stroke: mark.halo.colour,
        'stroke-width': mark.halo.width_mm,
        'stroke-linejoin': 'round',
        'paint-order': 'stroke',
      }),
    },
    runs.length > 1
      ? runs
          .map(({ family, weight: own, text }) =>
            element('tspan', { 'font-family': family, 'font-weight': own }, escapeXml(text)),
          )
          .join('')
      : escapeXml(mark.text),
  )
}

/** A line of text in pieces that one font can set. */
function runsOf(text: string, weight: Weight, fontOf: FontOf): (ReturnType<FontOf> & { text: string })[] {
  const runs: (ReturnType<FontOf> & { text: string })[] = []
  for (const character of text) {
    const font = fontOf(character, weight)
    const last = runs.at(-1)
    if (last && last.family === font.family) last.text += character
    else runs.push({ ...font, text: character })
  }
  return runs
}

function markSvg(mark: PageMark, fontOf: FontOf | undefined): string {
  switch (mark.kind) {
    case 'text':
      return textSvg(mark, fontOf)
    case 'line':
      return element('path', {
        d: `M${mark.x1} ${mark.y1}L${mark.x2} ${mark.y2}`,
        stroke: mark.colour ?? ink,
        'stroke-width': mark.width_mm,
        'stroke-dasharray': mark.dash,
        fill: 'none',
      })
    case 'box':
      return box(mark.x, mark.y, mark.width, mark.height, {
        ...(mark.fill !== undefined && { fill: mark.fill }),
        ...(mark.stroke !== undefined && { stroke: mark.stroke, strokeWidth: mark.stroke_mm ?? 0.2 }),
        ...(mark.radius !== undefined && { radius: mark.radius }),
        ...(mark.dash !== undefined && { dash: mark.dash }),
      })
    case 'path':
      return pathSvg(mark)
    case 'code':
      return codeSvg(mark)
    case 'window': {
      const { x, y, width, height, marks } = mark
      const view = { x, y, width, height, viewBox: `${x} ${y} ${width} ${height}` }
      return element('svg', view, marks.map((inner) => markSvg(inner, fontOf)).join(''))
    }
  }
}

const pathSvg = ({ d, fill = 'none', stroke, stroke_mm = 0.2, dash, round }: PagePath): string =>
  element('path', {
    d,
    fill,
    stroke,
    'stroke-width': stroke === undefined ? undefined : stroke_mm,
    'stroke-dasharray': dash,
    'stroke-linecap': round ? 'round' : undefined,
  })

/** One path of unit squares: runs of dark modules in a row are joined, so that no hair shows between them. */
function codeSvg({ x, y, size, modules }: PageCode): string {
  const unit = size / Math.max(1, modules.length)
  const path = modules.map((row, r) => rowPath(row, r)).join('')
  return group({ transform: `translate(${x} ${y}) scale(${unit})` }, [element('path', { d: path, fill: ink })])
}

function rowPath(row: readonly boolean[], r: number): string {
  let path = ''
  for (let c = 0; c < row.length; c++) {
    if (!row[c]) continue
    const start = c
    while (row[c + 1]) c++
    path += `M${start} ${r}h${c - start + 1}v1h${start - c - 1}z`
  }
  return path
}
