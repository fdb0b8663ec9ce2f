import type { Protocol } from '../catalog/model.ts'

/** Where a drive hangs, as far as a listing tells. */
export type ObservedPlace =
  /** Phy of a host adapter, counted over all its ports; behind an expander, phy of that expander. */
  | { kind: 'phy'; phy: number; expander: string | null }
  /** Port of an AHCI controller, from 1. */
  | { kind: 'ata'; port: number }

/** One drive as a listing shows it. What the listing does not say is absent, never guessed. */
export interface ObservedDrive {
  /** Where in the listing it stands, in words: "line 12", "object 3". */
  from: string
  /** Name in the operating system, as "sdc". */
  device?: string
  serial?: string
  /** Hex digits in lower case, without "0x". */
  wwn?: string
  makerModel?: string
  firmware?: string
  capacity_B?: number
  /** The capacity was rounded by the tool that printed it. */
  isRounded?: true
  logical_B?: number
  physical_B?: number
  protocol?: Protocol
  /** 0: solid-state. */
  rotation_rpm?: number
  /** Line rate that the link runs at, and the most that the drive can, Gb/s. */
  rate_Gbps?: number
  mostRate_Gbps?: number
  place?: ObservedPlace
  bay?: number
  /** Other devices under which the same drive was seen: over its second path, or because a listing was pasted twice. */
  alsoAs?: string[]
}

/** Something of a listing that could not be read, with its place. */
export interface InventoryTrouble {
  from: string
  message: string
}

/** A listing, read. `leftOut` counts what is no drive: partitions, loops, optical drives, enclosures. */
export interface Inventory {
  drives: ObservedDrive[]
  troubles: InventoryTrouble[]
  leftOut: number
}
