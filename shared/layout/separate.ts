/** A thing that must stand in a column: where it would like its top, how tall it is, how much it insists. */
export interface Stacked {
  wish: number
  height: number
  weight: number
}

interface Block {
  first: number
  last: number
  /** Weighted sum of wishes, each brought back by what stands above it in the block. */
  sum: number
  weight: number
  extent: number
}

/**
 * Tops for a column whose order is given, as near to the wishes as the gaps allow: the least sum of weighted
 * squares, found exactly by merging neighbours that clash (pool adjacent violators). Linear in length.
 */
export function separate(items: readonly Stacked[], gap: (above: number, below: number) => number): number[] {
  const offsets = new Float64Array(items.length)
  const blocks: Block[] = []
  items.forEach((item, i) => {
    let block: Block = { first: i, last: i, sum: item.wish * item.weight, weight: item.weight, extent: item.height }
    for (let above = blocks.at(-1); above; above = blocks.at(-1)) {
      const between = gap(block.first - 1, block.first)
      if (above.sum / above.weight + above.extent + between <= block.sum / block.weight) break
      const shift = above.extent + between
      for (let j = block.first; j <= block.last; j++) offsets[j] = (offsets[j] ?? 0) + shift
      block = {
        first: above.first,
        last: block.last,
        sum: above.sum + block.sum - shift * block.weight,
        weight: above.weight + block.weight,
        extent: shift + block.extent,
      }
      blocks.pop()
    }
    blocks.push(block)
  })
  const tops = new Array<number>(items.length).fill(0)
  for (const { first, last, sum, weight } of blocks)
    for (let i = first; i <= last; i++) tops[i] = sum / weight + (offsets[i] ?? 0)
  return tops
}
