import type { Rule } from './rule.ts'
import { bayConflict } from './bay-conflict/index.ts'
import { baySize } from './bay-size/index.ts'
import { breakoutReversed } from './breakout-reversed/index.ts'
import { capacityCeiling } from './capacity-ceiling/index.ts'
import { contactOverRating } from './contact-over-rating/index.ts'
import { controllerMode } from './controller-mode/index.ts'
import { deepBranching } from './deep-branching/index.ts'
import { doubledDataPath } from './doubled-data-path/index.ts'
import { foreignLead } from './foreign-lead/index.ts'
import { groupOverLimit } from './group-over-limit/index.ts'
import { hungrySsd } from './hungry-ssd/index.ts'
import { identity } from './identity/index.ts'
import { leadTooShort } from './lead-too-short/index.ts'
import { linkTooLong } from './link-too-long/index.ts'
import { mouldedAdapter } from './moulded-adapter/index.ts'
import { narrowSlot } from './narrow-slot/index.ts'
import { noDataPath } from './no-data-path/index.ts'
import { parityTooSmall } from './parity-too-small/index.ts'
import { powerDisable } from './power-disable/index.ts'
import { protocolMismatch } from './protocol-mismatch/index.ts'
import { railMissing } from './rail-missing/index.ts'
import { railOverLimit } from './rail-over-limit/index.ts'
import { sectorFormat } from './sector-format/index.ts'
import { sharedFate } from './shared-fate/index.ts'
import { sharedUplink } from './shared-uplink/index.ts'
import { startControlIdle } from './start-control-idle/index.ts'
import { suppliesJoined } from './supplies-joined/index.ts'
import { tooManyDevices } from './too-many-devices/index.ts'
import { twoSupplies } from './two-supplies/index.ts'
import { underfedBackplane } from './underfed-backplane/index.ts'
import { unpowered } from './unpowered/index.ts'
import { unproven } from './unproven/index.ts'
import { voltageOutOfTolerance } from './voltage-out-of-tolerance/index.ts'
import { wireOverAmpacity } from './wire-over-ampacity/index.ts'
import { wrongMating } from './wrong-mating/index.ts'

/** Every rule, listed by hand. A test holds this list against the folders. */
export const rules: readonly Rule[] = [
  foreignLead,
  suppliesJoined,
  unpowered,
  railMissing,
  underfedBackplane,
  railOverLimit,
  groupOverLimit,
  contactOverRating,
  wireOverAmpacity,
  voltageOutOfTolerance,
  hungrySsd,
  startControlIdle,
  powerDisable,
  mouldedAdapter,
  deepBranching,
  twoSupplies,
  leadTooShort,
  unproven,
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
