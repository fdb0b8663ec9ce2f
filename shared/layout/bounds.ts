import type { Drawing, DrawnNode } from './drawing.ts'

export type Bounds = Drawing['bounds']

/** The smallest rectangle that holds every node. */
export function boundsOf(nodes: readonly DrawnNode[]): Bounds {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity]
  for (const { x, y, width, height } of nodes) {
    left = Math.min(left, x)
    top = Math.min(top, y)
    right = Math.max(right, x + width)
    bottom = Math.max(bottom, y + height)
  }
  return nodes.length === 0
    ? { x: 0, y: 0, width: 0, height: 0 }
    : { x: left, y: top, width: right - left, height: bottom - top }
}
