/** A link by the users that cross it, given as indexes into the demands. */
export interface LinkUse {
  capacity: number
  users: readonly number[]
}

/**
 * Max-min fair share: every user's rate rises together until its own demand is met or a link that it crosses is
 * full; the others go on. A demand may be Infinity; a user without limit of any kind keeps Infinity.
 */
export function fairShare(demands: readonly number[], links: readonly LinkUse[]): number[] {
  const share = demands.map(() => Infinity)
  const active = new Set(demands.keys())
  const open = links.map((link) => ({ link, left: link.capacity, waiting: new Set(link.users) }))

  while (active.size > 0) {
    let level = Infinity
    for (const user of active) level = Math.min(level, demands[user] ?? Infinity)
    for (const { left, waiting } of open) if (waiting.size > 0) level = Math.min(level, left / waiting.size)
    if (level === Infinity) break

    const settled = new Set<number>()
    for (const user of active) if ((demands[user] ?? Infinity) <= level) settled.add(user)
    for (const { left, waiting } of open)
      if (waiting.size > 0 && left / waiting.size <= level) for (const user of waiting) settled.add(user)

    for (const user of settled) {
      share[user] = level
      active.delete(user)
    }
    for (const use of open)
      for (const user of settled) if (use.waiting.delete(user)) use.left = Math.max(0, use.left - level)
  }
  return share
}
