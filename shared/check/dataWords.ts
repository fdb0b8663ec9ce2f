import type { Bottleneck, SharedLink } from '../datapath/result.ts'
import { amount, counted, placeOf } from './words.ts'

/** A shared link as a sentence names it. */
export function linkWords(link: SharedLink): string {
  const { part, lanes, drives } = link
  const shared = `${amount(link.capacity_MBps, 'MB/s')} for ${counted(drives.length, 'drive')}`
  if (link.kind === 'uplink') return `the ${lanes}-lane link to ${part.part.ref} (${shared})`
  const width = `x${lanes}, generation ${link.generation ?? 1}`
  return link.slot
    ? `the slot of ${part.part.ref} (${placeOf(link.slot)}: ${width}, ${shared})`
    : `the way from ${part.part.ref} to the processor (${width}, ${shared})`
}

export function bottleneckWords(bottleneck: Bottleneck): string {
  if (bottleneck.kind === 'shared') return linkWords(bottleneck.link)
  const { path } = bottleneck
  const rate = path.rate_Gbps === null ? '' : ` at ${amount(path.rate_Gbps, 'Gb/s')}`
  const by = path.limitedBy ? `, set by ${path.limitedBy.part.ref}` : ''
  return `the link of ${path.drive.part.ref}${rate}${by}`
}
