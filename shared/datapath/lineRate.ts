/**
 * Line rate to payload, decimal MB/s in each direction, after line coding only. Frames and packets take roughly
 * another tenth (common practice) and are not counted here.
 */

/** SATA and SAS: 8b/10b up to 12 Gb/s, 128b/150b (with forward error correction) at 22.5 Gb/s. */
export function payload_MBps(rate_Gbps: number): number {
  const coding = rate_Gbps > 12 ? 128 / 150 : 8 / 10
  return (rate_Gbps * 1000 * coding) / 8
}

const pcieRate_GTps = [2.5, 5, 8, 16, 32, 64] as const

/** Transfer rate of one PCI Express lane by generation, GT/s. */
export function pcieLineRate_GTps(generation: number): number {
  return pcieRate_GTps[generation - 1] ?? 2.5
}

/** PCI Express: 8b/10b to generation 2, 128b/130b to generation 5, 242 of 256 bytes of a flit in generation 6. */
export function pciePayload_MBps(lanes: number, generation: number): number {
  const coding = generation <= 2 ? 8 / 10 : generation <= 5 ? 128 / 130 : 242 / 256
  return (lanes * pcieLineRate_GTps(generation) * 1000 * coding) / 8
}
