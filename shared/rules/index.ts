import type { Rule } from './rule.ts'
import { bayConflict } from './bay-conflict/index.ts'
import { baySize } from './bay-size/index.ts'
import { breakoutReversed } from './breakout-reversed/index.ts'
import { capacityCeiling } from './capacity-ceiling/index.ts'
import { contactOverRating } from './contact-over-rating/index.ts'
import { controllerMode } from './controller-mode/index.ts'
import { doubledDataPath } from './doubled-data-path/index.ts'
import { groupOverLimit } from './group-over-limit/index.ts'
import { identity } from './identity/index.ts'
import { linkTooLong } from './link-too-long/index.ts'
import { narrowSlot } from './narrow-slot/index.ts'
import { noDataPath } from './no-data-path/index.ts'
import { parityTooSmall } from './parity-too-small/index.ts'
import { protocolMismatch } from './protocol-mismatch/index.ts'
import { railOverLimit } from './rail-over-limit/index.ts'
import { sectorFormat } from './sector-format/index.ts'
import { sharedFate } from './shared-fate/index.ts'
import { sharedUplink } from './shared-uplink/index.ts'
import { tooManyDevices } from './too-many-devices/index.ts'
import { voltageOutOfTolerance } from './voltage-out-of-tolerance/index.ts'
import { wireOverAmpacity } from './wire-over-ampacity/index.ts'
import { wrongMating } from './wrong-mating/index.ts'

/** Every rule, listed by hand. A test holds this list against the folders. */
export const rules: readonly Rule[] = [
  railOverLimit,
  groupOverLimit,
  contactOverRating,
  wireOverAmpacity,
  voltageOutOfTolerance,
  wrongMating,
  breakoutReversed,
  protocolMismatch,
  noDataPath,
  doubledDataPath,
  tooManyDevices,
  linkTooLong,
  narrowSlot,
  sharedUplink,
  capacityCeiling,
  controllerMode,
  sectorFormat,
  bayConflict,
  baySize,
  parityTooSmall,
  sharedFate,
  identity,
]
