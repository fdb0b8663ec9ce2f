/** Neighbours of each node, both ways; nodes without any may be left out. */
export type Graph = readonly (readonly number[] | undefined)[]

/**
 * Dominators: which nodes lie on every way from the root to a node. Take one of them away and the node is cut off.
 *
 * Node 0 is the root. Returns each node's nearest dominator, -1 for nodes that the
 * root does not reach; the root is its own. Iterates over the reverse postorder until nothing moves.
 */
export function nearestDominators(neighbours: Graph): Int32Array {
  const order = reversePostorder(neighbours)
  const place = new Int32Array(neighbours.length).fill(-1)
  order.forEach((node, i) => (place[node] = i))
  const nearest = new Int32Array(neighbours.length).fill(-1)
  nearest[0] = 0

  const meet = (a: number, b: number): number => {
    let [left, right] = [a, b]
    while (left !== right)
      if (place[left]! > place[right]!) left = nearest[left]!
      else right = nearest[right]!
    return left
  }

  for (let moved = true; moved;) {
    moved = false
    for (const node of order) {
      if (node === 0) continue
      let best = -1
      for (const before of neighbours[node] ?? [])
        if (nearest[before] !== -1) best = best === -1 ? before : meet(best, before)
      if (best !== nearest[node]) {
        nearest[node] = best
        moved = true
      }
    }
  }
  return nearest
}

function reversePostorder(neighbours: Graph): number[] {
  const seen = new Uint8Array(neighbours.length)
  const next = new Int32Array(neighbours.length)
  const postorder: number[] = []
  const stack = [0]
  seen[0] = 1
  while (stack.length > 0) {
    const node = stack[stack.length - 1]!
    const onward = neighbours[node]?.[next[node]!++]
    if (onward === undefined) {
      postorder.push(node)
      stack.pop()
    } else if (!seen[onward]) {
      seen[onward] = 1
      stack.push(onward)
    }
  }
  return postorder.reverse()
}
