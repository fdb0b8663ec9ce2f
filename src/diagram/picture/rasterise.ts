import { toBlob } from 'html-to-image'

/** Pictures are drawn twice as fine as the sheet, unless that makes more pixels than people can send each other. */
const finest = 2
const mostPixels = 24_000_000
const longestSide = 16_000

/** How many pixels a unit of the sheet takes. */
export function pixelRatio(width: number, height: number): number {
  return Math.min(finest, Math.sqrt(mostPixels / (width * height)), longestSide / Math.max(width, height))
}

/** Width and height that a flat drawing states for itself. */
export function sizeOf(svg: string): { width: number; height: number } {
  const [, width, height] = /^<svg[^>]* width="(\d+)" height="(\d+)"/.exec(svg) ?? []
  return { width: Number(width ?? 0), height: Number(height ?? 0) }
}

/** Turns a self-contained drawing into a PNG. */
export async function rasterise(svg: string): Promise<Blob> {
  const { width, height } = sizeOf(svg)
  const image = new Image(width, height)
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`
  await image.decode()
  const ratio = pixelRatio(width, height)
  const png = await toBlob(image, { width, height, pixelRatio: ratio, skipFonts: true, skipAutoScale: true })
  if (!png) throw new Error('The browser could not make it.')
  return png
}
