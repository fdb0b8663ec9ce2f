import { describe, expect, it } from 'vitest'
import { payload_MBps, pciePayload_MBps } from '#shared/datapath/lineRate.ts'

describe('payload of SATA and SAS links', () => {
  it.each([
    // Serial ATA and Serial Attached SCSI (encyclopedia articles): 8b/10b up to 12 Gb/s.
    [1.5, 150],
    [3, 300],
    [6, 600],
    [12, 1200],
    // 24G SAS: 22.5 Gb/s with 128b/150b, forward error correction included (SNIA; Synopsys).
    [22.5, 2400],
  ])('%s Gb/s carries %s MB/s', (rate_Gbps, expected) => {
    expect(payload_MBps(rate_Gbps)).toBeCloseTo(expected, 9)
  })
})

describe('payload of PCI Express links', () => {
  it.each([
    // PCI Express rates (reference table): lanes 1, 4, 8 and 16 by generation, rounded to whole MB/s.
    [1, [250, 1000, 2000, 4000]],
    [2, [500, 2000, 4000, 8000]],
    [3, [985, 3938, 7877, 15754]],
    [4, [1969, 7877, 15754, 31508]],
    [5, [3938, 15754, 31508, 63015]],
  ])('generation %s', (generation, expected) => {
    expect([1, 4, 8, 16].map((lanes) => Math.round(pciePayload_MBps(lanes, generation)))).toEqual(expected)
  })
})
