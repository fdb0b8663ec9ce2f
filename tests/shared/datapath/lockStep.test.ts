import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { lockStep } from '#shared/datapath/lockStep.ts'
import { capLine, driveLine, squareAt, type PaceLine } from '#shared/datapath/trackProfile.ts'

const hours = (...lines: PaceLine[]): number | null =>
  lockStep(lines.map((line, i) => ({ ...line, owner: i })))?.hours ?? null

describe('time to read a drive from outer to inner track', () => {
  it.each([
    // Worked table, TB x 277.8 / MB/s at a mean rate, idle array.
    [4, 150, 7.4],
    [8, 180, 12.3],
    [12, 200, 16.7],
    [16, 200, 22.2],
    [20, 280, 19.8],
    [20, 210, 26.5],
    [24, 220, 30.3],
  ])('%s TB at a steady %s MB/s take %s h', (capacity_TB, rate_MBps, expected) => {
    expect(hours(driveLine(capacity_TB, rate_MBps, rate_MBps))).toBeCloseTo(expected, 1)
  })

  it('a 20 TB drive from 280 at the outer to half at the inner track has the mean of 210: 26.5 h', () => {
    expect(hours(driveLine(20, 280, 140))).toBeCloseTo((20 * 1e6) / 210 / 3600, 9)
    expect(hours(driveLine(20, 280, 140))).toBeCloseTo(26.5, 1)
  })

  it('Deskstar 7K500 (specification table 10): 64.8 outer and 31.0 MB/s inner give the mean of both', () => {
    expect(hours(driveLine(0.5, 64.8, 31.0))).toBeCloseTo((0.5 * 1e6) / ((64.8 + 31) / 2) / 3600, 9)
  })

  it('3 TB drives behind one redundancy drive: from drive rates alone not longer than the 14 h 34 min of practice', () => {
    expect(hours(driveLine(3, 150, 75))).toBeLessThan(14 + 34 / 60)
  })

  it.each([
    // 24 drives behind an x8 card in an x4 slot of generation 2: 83 MB/s each, below the inner track: 66.7 h.
    [20, 2000 / 24, 66.7],
    // Five drives of 20 TB behind one 3 Gb/s multiplier: 60 MB/s each: 92.6 h.
    [20, 300 / 5, 92.6],
  ])('%s TB held to %s MB/s throughout take %s h', (capacity_TB, share_MBps, expected) => {
    expect(hours(driveLine(capacity_TB, 280, 140), capLine(share_MBps, capacity_TB))).toBeCloseTo(expected, 1)
  })

  it('12 x 20 TB behind an x4 6 Gb/s link: capped at 200 MB/s outside, their own rate inside', () => {
    // By hand: rate(u)^2 = 280^2 (1 - 0.75 u) meets 200^2 at u = (1 - (200/280)^2) / 0.75 = 0.6530612; up to there 200 MB/s,
    // from there on the mean of 200 and 140. The table's 27.8 h (whole drive at 200 MB/s) is its lower bound.
    const meeting = (1 - (200 / 280) ** 2) / 0.75
    const expected = ((20 * meeting) / 200 + (20 * (1 - meeting)) / 170) * (1e6 / 3600)
    const found = hours(driveLine(20, 280, 140), capLine(2400 / 12, 20))
    expect(found).toBeCloseTo(expected, 9)
    expect(found).toBeGreaterThan(27.77)
  })
})

describe('drives in step', () => {
  it('smaller drives drop out, the larger ones go on at their own rate', () => {
    // 1 TB at 100 MB/s paces the first terabyte, then 2 TB at 200 MB/s finishes alone.
    expect(hours(driveLine(1, 100, 100), driveLine(2, 200, 200))).toBeCloseTo((1e6 / 100 + 1e6 / 200) / 3600, 9)
  })

  it('counts for each pacer the hours it was the slowest', () => {
    const found = lockStep([
      { ...driveLine(1, 100, 100), owner: 'slow' },
      { ...driveLine(2, 200, 200), owner: 'fast' },
    ])
    expect(found?.paced.get('slow')).toBeCloseTo(1e6 / 100 / 3600, 9)
    expect(found?.paced.get('fast')).toBeCloseTo(1e6 / 200 / 3600, 9)
  })

  it('knows no time without drives, without a rate or at a rate of zero', () => {
    expect(hours()).toBeNull()
    expect(hours(driveLine(1, 0, 0))).toBeNull()
    expect(hours(driveLine(0, 100, 100))).toBeNull()
  })

  it('agrees with a sum over small steps', () => {
    const line = fc
      .record({ outer: fc.integer({ min: 50, max: 500 }), k: fc.double({ min: 0.3, max: 1, noNaN: true }) })
      .map(({ outer, k }) => driveLine(4, outer, outer * k))
    fc.assert(
      fc.property(fc.array(line, { minLength: 1, maxLength: 6 }), (lines) => {
        const steps = 20_000
        let sum = 0
        for (let i = 0; i < steps; i++) {
          const position = ((i + 0.5) / steps) * 4
          sum += 4e6 / steps / Math.sqrt(Math.min(...lines.map((one) => squareAt(one, position)))) / 3600
        }
        expect(hours(...lines)!).toBeCloseTo(sum, 3)
      }),
      { numRuns: 50 },
    )
  })
})
