import { box, element, escapeXml } from './svg.ts'
import { ink, pt_mm, type Page, type PageCode, type PageMark, type PagePath, type PageText } from './page.ts'

/** One page as an SVG image whose unit is the millimetre: shown on screen, printed, and put into a PDF. */
export function pageSvg(page: Page): string {
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
    marks.map(markSvg).join(''),
  )
}

function textSvg(mark: PageText): string {
  return element(
    'text',
    {
      x: mark.x,
      y: mark.y,
      'font-size': mark.size_pt * pt_mm,
      'font-weight': mark.weight === 400 ? undefined : mark.weight,
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
    escapeXml(mark.text),
  )
}

function markSvg(mark: PageMark): string {
  switch (mark.kind) {
    case 'text':
      return textSvg(mark)
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
      return element('svg', view, marks.map(markSvg).join(''))
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
export const codePath = (modules: PageCode['modules']): string => modules.map(rowPath).join('')

function codeSvg({ x, y, size, modules }: PageCode): string {
  const unit = size / Math.max(1, modules.length)
  return element('path', { d: codePath(modules), fill: ink, transform: `translate(${x} ${y}) scale(${unit})` })
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
