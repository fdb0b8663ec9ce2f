import type { Pin } from '../contract/comments.ts'

/** One text for each thing that can be pinned to, to find its threads by. Spots are all different: they share none. */
export function pinKey(pin: Pin): string {
  switch (pin.kind) {
    case 'build':
      return 'build'
    case 'part':
      return `part:${pin.part}`
    case 'connector':
      return `connector:${pin.part}/${pin.connector}`
    case 'joint':
      return `joint:${pin.joint}`
    case 'spot':
      return `spot:${pin.x},${pin.y}`
    default:
      return `${pin.kind}:${pin.key}`
  }
}
