import type { ResolvedBuild } from '../../build/resolve.ts'
import type { CheckResult, MomentId } from '../../check/result.ts'
import { severityRank, type Severity } from '../../check/severity.ts'
import type { Rail } from '../../quantity/rails.ts'

/** The strongest rail of a joint at the chosen moment. */
export interface Flow {
  rail: Rail
  current_A: number
}

/** A check result looked up the way a drawing asks: by part, by joint, by drive. */
export interface Reading {
  flow(joint: string | undefined): Flow | undefined
  /** Worst open finding on a part, or on one of its connectors. */
  partSeverity(part: string): Severity | undefined
  /** Worst open finding on a joint or on one of its connectors that holds at the chosen moment. */
  jointSeverity(joint: string | undefined): Severity | undefined
  hasDataPath(drive: string): boolean
  /** Rails that the device needs and that do not arrive. */
  missingRails(part: string): readonly Rail[]
}

/** Flows below this are not worth a number. */
const least_A = 0.005

export function readResult(build: ResolvedBuild, result: CheckResult, moment: MomentId): Reading {
  const chosen = result.moments.find((one) => one.moment === moment)
  const flows = new Map<string, Flow>()
  for (const { joint, current_A } of chosen?.joints ?? [])
    for (const rail of ['12V', '5V', '3.3V'] as const) {
      const current = Math.abs(current_A[rail] ?? 0)
      if (current >= least_A && current > (flows.get(joint)?.current_A ?? 0))
        flows.set(joint, { rail, current_A: current })
    }

  const parts = new Map<string, Severity>()
  const joints = new Map<string, Severity>()
  const worsen = (map: Map<string, Severity>, key: string | undefined, severity: Severity) => {
    if (key === undefined) return
    const before = map.get(key)
    if (before === undefined || severityRank[severity] < severityRank[before]) map.set(key, severity)
  }
  for (const { severity, subjects, accepted, moment: at } of result.findings) {
    if (accepted) continue
    const isNow = at === undefined || at === moment
    for (const { kind, part, connector, joint } of subjects) {
      if (kind === 'part' || kind === 'connector' || kind === 'conductor') worsen(parts, part, severity)
      if (!isNow) continue
      if (kind === 'joint') worsen(joints, joint, severity)
      if (kind === 'connector' && part !== undefined && connector !== undefined)
        for (const { joint: held } of build.partById.get(part)?.connectorById.get(connector)?.joints ?? [])
          worsen(joints, held.id, severity)
    }
  }

  const reached = new Set(result.dataPaths.filter((path) => path.works).map((path) => path.drive))
  const missing = new Map<string, Rail[]>()
  for (const { part, rail, voltage_V } of chosen?.devices ?? [])
    if (voltage_V === null) missing.set(part, [...(missing.get(part) ?? []), rail])

  return {
    flow: (joint) => (joint === undefined ? undefined : flows.get(joint)),
    partSeverity: (part) => parts.get(part),
    jointSeverity: (joint) => (joint === undefined ? undefined : joints.get(joint)),
    hasDataPath: (drive) => reached.has(drive),
    missingRails: (part) => missing.get(part) ?? [],
  }
}

/** "2.0 A", or "1.2 A 5 V" where it is not the 12 V rail that is meant. */
export function flowWords({ rail, current_A }: Flow): string {
  const amperes = `${current_A < 0.095 ? current_A.toFixed(2) : current_A.toFixed(1)} A`
  return rail === '12V' ? amperes : `${amperes} ${rail.replace('V', ' V')}`
}
