import { textWidth } from '#shared/paper/text/textWidth.ts'

export interface DrawnText {
  words: string
  x: number
  y: number
  width: number
  height: number
}

/** Parses a drawing as XML; throws where it is not well formed. Needs a page's DOMParser. */
export function parseSvg(svg: string): Document {
  const parsed = new DOMParser().parseFromString(svg, 'image/svg+xml')
  const trouble = parsed.querySelector('parsererror')
  if (trouble) throw new Error(trouble.textContent ?? 'not well formed')
  return parsed
}

/** Every line of text of a drawing with the area that its letters take. */
export function drawnTexts(svg: string): DrawnText[] {
  return [...parseSvg(svg).querySelectorAll('text')].map((element) => {
    const number = (name: string) => Number(element.getAttribute(name) ?? 0)
    const size = number('font-size')
    const weight = (number('font-weight') || 400) as 400 | 600 | 700
    const words = element.textContent ?? ''
    const width = textWidth(words, size, weight)
    const anchor = element.getAttribute('text-anchor')
    const { dx, dy } = shiftOf(element)
    const left = number('x') - (anchor === 'end' ? width : anchor === 'middle' ? width / 2 : 0)
    return { words, x: left + dx, y: number('y') + dy - size * 0.72, width, height: size * 0.72 }
  })
}

function shiftOf(element: Element): { dx: number; dy: number } {
  let [dx, dy] = [0, 0]
  for (let node: Element | null = element; node; node = node.parentElement) {
    const [, x, y] = /^translate\(([-\d.]+) ([-\d.]+)\)$/.exec(node.getAttribute('transform') ?? '') ?? []
    dx += Number(x ?? 0)
    dy += Number(y ?? 0)
  }
  return { dx, dy }
}
