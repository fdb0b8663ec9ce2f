import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fairShare } from '#shared/datapath/fairShare.ts'
import { payload_MBps, pciePayload_MBps } from '#shared/datapath/lineRate.ts'

const evenly = (capacity: number, count: number): number => {
  const users = Array.from({ length: count }, (_, i) => i)
  const shares = fairShare(
    users.map(() => Infinity),
    [{ capacity, users }],
  )
  expect(new Set(shares).size).toBe(1)
  return Math.round(shares[0] ?? 0)
}

describe('fair share', () => {
  it.each([
    // Worked table "share in MB/s when N disks stream together", reckoned from the line rates by hand.
    ['SATA multiplier at 3 Gb/s', payload_MBps(3), [4, 8, 12], [75, 38, 25]],
    ['SATA multiplier at 6 Gb/s', payload_MBps(6), [4, 8, 12], [150, 75, 50]],
    ['PCIe 3 x1 card', pciePayload_MBps(1, 3), [4, 8, 12, 16, 24, 36], [246, 123, 82, 62, 41, 27]],
    ['expander x4 at 3 Gb/s', 4 * payload_MBps(3), [4, 8, 12, 16, 24, 36], [300, 150, 100, 75, 50, 33]],
    ['PCIe 2 x4', pciePayload_MBps(4, 2), [4, 8, 12, 16, 24, 36], [500, 250, 167, 125, 83, 56]],
    ['expander x4 at 6 Gb/s', 4 * payload_MBps(6), [4, 8, 12, 16, 24, 36], [600, 300, 200, 150, 100, 67]],
    ['PCIe 2 x8', pciePayload_MBps(8, 2), [8, 12, 16, 24, 36], [500, 333, 250, 167, 111]],
    ['expander x4 at 12 Gb/s', 4 * payload_MBps(12), [8, 12, 16, 24, 36], [600, 400, 300, 200, 133]],
    ['PCIe 3 x8', pciePayload_MBps(8, 3), [8, 12, 16, 24, 36], [985, 656, 492, 328, 219]],
  ])('%s divides evenly', (_, capacity, counts, expected) => {
    expect(counts.map((count) => evenly(capacity, count))).toEqual(expected)
  })

  it('leaves to the others what a slow drive does not take', () => {
    // 600 for three: one takes 100, the others 250 each.
    expect(fairShare([100, 400, 400], [{ capacity: 600, users: [0, 1, 2] }])).toEqual([100, 250, 250])
  })

  it('narrows at the tightest of several links', () => {
    // Link of users 0 and 1 gives 50 each; user 2 then gets 200 of the 300 that all three share.
    const links = [
      { capacity: 100, users: [0, 1] },
      { capacity: 300, users: [0, 1, 2] },
    ]
    expect(fairShare([Infinity, Infinity, Infinity], links)).toEqual([50, 50, 200])
  })

  it('has no limit where there is neither demand nor link', () => {
    expect(fairShare([Infinity], [])).toEqual([Infinity])
    expect(fairShare([], [{ capacity: 10, users: [] }])).toEqual([])
  })

  it('is max-min fair: nobody can get more without somebody poorer getting less', () => {
    const arbitrary = fc.integer({ min: 1, max: 8 }).chain((count) =>
      fc.record({
        demands: fc.array(fc.integer({ min: 1, max: 500 }), { minLength: count, maxLength: count }),
        links: fc.array(
          fc.record({
            capacity: fc.integer({ min: 1, max: 2000 }),
            users: fc.uniqueArray(fc.integer({ min: 0, max: count - 1 }), { minLength: 1 }),
          }),
          { maxLength: 5 },
        ),
      }),
    )
    fc.assert(
      fc.property(arbitrary, ({ demands, links }) => {
        const shares = fairShare(demands, links)
        const used = links.map(({ users }) => users.reduce((sum, user) => sum + shares[user]!, 0))
        links.forEach(({ capacity }, i) => expect(used[i]!).toBeLessThanOrEqual(capacity * (1 + 1e-9)))
        shares.forEach((share, user) => {
          expect(share).toBeLessThanOrEqual(demands[user]! * (1 + 1e-9))
          const satisfied = share >= demands[user]! * (1 - 1e-9)
          const blocked = links.some(
            ({ capacity, users }, i) =>
              users.includes(user) &&
              used[i]! >= capacity * (1 - 1e-9) &&
              users.every((other) => shares[other]! <= share * (1 + 1e-9)),
          )
          expect(satisfied || blocked).toBe(true)
        })
      }),
    )
  })
})
