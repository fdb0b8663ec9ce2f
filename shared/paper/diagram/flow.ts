import type { Block } from './block.ts'

interface PlacedBlock {
  block: Block
  x: number
  y: number
}

/** Sets blocks side by side, in as many lines as the width asks for; the last block stands at the lower right. */
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
  const height = y + lineHeight
  const last = placed.at(-1)
  if (last) {
    last.x = Math.max(last.x, width - last.block.width)
    last.y = height - last.block.height
  }
  return {
    width,
    height,
    draw: (left, top) => placed.map(({ block, x: dx, y: dy }) => block.draw(left + dx, top + dy)).join(''),
  }
}
