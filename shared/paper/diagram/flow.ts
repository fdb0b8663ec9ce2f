import type { Block } from './block.ts'

interface PlacedBlock {
  block: Block
  x: number
  y: number
}

/** Sets blocks side by side, in as many lines as the width asks for; the last stands at the lower right, under what is there. */
export function flow(blocks: readonly Block[], width: number, gap: number): Block {
  const placed: PlacedBlock[] = []
  let [x, y, lineHeight] = [0, 0, 0]
  for (const block of blocks) {
    if (x > 0 && x + block.width > width) {
      y += lineHeight + gap
      x = 0
      lineHeight = 0
    }
    placed.push({ block, x, y })
    x += block.width + gap
    lineHeight = Math.max(lineHeight, block.height)
  }
  let height = y + lineHeight
  const last = placed.pop()
  if (last) {
    last.x = Math.max(0, width - last.block.width)
    const above = placed.filter((one) => one.x + one.block.width > last.x).map((one) => one.y + one.block.height)
    const top = Math.max(0, ...above.map((bottom) => bottom + gap))
    height = Math.max(top + last.block.height, ...placed.map((one) => one.y + one.block.height))
    last.y = height - last.block.height
    placed.push(last)
  }
  return {
    width,
    height,
    draw: (left, top) => placed.map(({ block, x: dx, y: dy }) => block.draw(left + dx, top + dy)).join(''),
  }
}
