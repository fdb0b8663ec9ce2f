export const paperSizes = ['A4', 'A3', 'letter', 'tabloid'] as const
export type PaperSize = (typeof paperSizes)[number]

/** Short and long side in millimetres: ISO 216, and inch sizes of ANSI/ASME Y14.1. */
const sides_mm: Readonly<Record<PaperSize, readonly [number, number]>> = {
  A4: [210, 297],
  A3: [297, 420],
  letter: [215.9, 279.4],
  tabloid: [279.4, 431.8],
}

/** Turns the page as the picture lies, and widens the view so that the picture stands in its middle. */
export function sheetSize(paper: PaperSize, width: number, height: number) {
  const [short, long] = sides_mm[paper]
  const [width_mm, height_mm] = width >= height ? [long, short] : [short, long]
  const scale = Math.max(width / width_mm, height / height_mm)
  const view = { width: width_mm * scale, height: height_mm * scale }
  return {
    width_mm,
    height_mm,
    view: { x: (width - view.width) / 2, y: (height - view.height) / 2, ...view },
  }
}
