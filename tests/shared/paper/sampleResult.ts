import type { ResolvedBuild, ResolvedConnector } from '#shared/build/resolve.ts'
import { checkResultSchema, type CheckResult } from '#shared/check/result.ts'
import { outletsOf } from '#shared/layout/carries.ts'

/*
 * A check result to draw, not to believe: two amperes for every drive, summed up the tree by walking from the drives
 * towards the supply. What the checker itself says is tested where it lives.
 */

const perDrive_A = 2

export function sampleResult(build: ResolvedBuild): CheckResult {
  const currents = new Map<string, number>()
  const fed = new Set<string>()
  for (const drive of build.parts.filter((part) => part.model.kind === 'drive'))
    for (const plug of drive.connectors) if (climb(plug, currents)) fed.add(drive.part.id)
  const drives = build.parts.filter((part) => part.model.kind === 'drive')
  const joined = (drive: (typeof drives)[number]) =>
    drive.connectors.some(({ joints }) => joints.some(({ mating }) => mating.lanes > 0))
  return checkResultSchema.parse({
    build: { name: build.document.name, parts: build.parts.length, joints: build.joints.length, drives: drives.length },
    worst: 'fault',
    counts: { danger: 0, fault: 1, caution: 1, note: 0, accepted: 1 },
    weakestHop:
      'Weakest hop: inlet of splitter W6 at cold start carries 6.0 A on contacts rated 4.5 A in all. Move one drive to W2, outlet 3, or start in pairs.',
    findings: [
      finding('fault', 'W6', 'in', 'W6, inlet: 6.0 A at cold start, 4.5 A allowed on three contacts of 1.5 A.'),
      finding('caution', 'W2', 'supply', 'W2, supply end: 10.0 A at cold start, 92 % of the 11 A of its socket.'),
    ].filter(({ subjects }) => subjects.every(({ part }) => build.partById.has(part))),
    ledger: [],
    moments: [
      {
        moment: 'cold-start',
        label: 'Cold start',
        applies: true,
        joints: [...currents].map(([joint, current]) => ({ joint, current_A: { '12V': current }, share: null })),
        devices: drives.map(({ part }) => ({
          part: part.id,
          connector: 'plug',
          rail: '12V',
          current_A: perDrive_A,
          voltage_V: fed.has(part.id) ? 11.8 : null,
          drop_V: null,
        })),
        dc_W: 300,
        wall_W: null,
        wall_VA: null,
      },
    ],
    timeline: [],
    dataPaths: drives.filter(joined).map(({ part }) => ({
      drive: part.id,
      driveConnector: 'plug',
      drivePort: 0,
      controllerPart: 'K1',
      controller: 'c',
      port: 'port-a',
      lane: 0,
      joints: [],
      expanders: [],
      rate_Gbps: 6,
      share_MBps: null,
      works: true,
    })),
    scan: { hours: null, drivesAlone_hours: null, about: false },
    energy_kWhPerYear: null,
    ups_VA: null,
  })
}

const finding = (severity: 'fault' | 'caution', part: string, connector: string, message: string) => ({
  key: `contact-over-rating:${part}`,
  rule: 'contact-over-rating',
  severity,
  subjects: [{ kind: 'connector' as const, part, ref: part, connector }],
  message,
  why: 'Contacts age by heat.',
  remedy: 'Move one drive to another outlet.',
  source: [],
  decidedBy: [],
  about: false,
})

/** Adds one drive's current to every joint between it and a supply; false where it reaches none. */
function climb(plug: ResolvedConnector, currents: Map<string, number>): boolean {
  const passed: string[] = []
  let connector: ResolvedConnector | undefined = plug
  for (let step = 0; connector && step < 50; step++) {
    const inlet: ResolvedConnector = connector
    const joint = inlet.joints.find(({ mating }) => mating.power)
    if (!joint) return false
    passed.push(joint.joint.id)
    const outlet: ResolvedConnector = joint.a === inlet ? joint.b : joint.a
    if (outlet.part.model.kind === 'supply') {
      for (const id of passed) currents.set(id, (currents.get(id) ?? 0) + perDrive_A)
      return true
    }
    connector = inletBehind(outlet)
  }
  return false
}

function inletBehind(outlet: ResolvedConnector): ResolvedConnector | undefined {
  const { part, connector } = outlet
  const outlets = outletsOf(part)
  let id = connector.id
  for (let step = 0; step < 20 && outlets.has(id); step++)
    id = part.model.wiring.find(({ to, line }) => to === id && line === '12V')?.from ?? ''
  return part.connectorById.get(id)
}
