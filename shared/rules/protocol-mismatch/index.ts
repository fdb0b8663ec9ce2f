import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { nameOf, refsOf } from '../../check/words.ts'
import type { Protocol } from '../../catalog/model.ts'
import type { DataResult } from '../../datapath/result.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  /** Part that does not speak what is needed. */
  part: ResolvedPart
  needs: Protocol
  protocol: Protocol
  drives: ResolvedPart[]
}

const protocolNames: Readonly<Record<Protocol, string>> = { sata: 'SATA', sas: 'SAS', nvme: 'NVMe' }

export const protocolMismatch = defineRule<Facts>({
  meta: {
    id: 'protocol-mismatch',
    title: 'A part that does not speak the drive’s protocol',
    severities: ['fault'],
    finds: 'A drive whose protocol some part of its path does not speak, such as a SAS drive behind a SATA port.',
    why: 'Adapters and cables only change the shape of the plug: a SAS controller takes SATA drives too, but a SATA port never takes a SAS drive, and only NVMe ports take NVMe drives.',
    needs: ['lanes from every controller', 'protocols of controllers, expanders and drives'],
    sources: ['R29', 'R2', 'R63'],
  },
  check({ data }) {
    return [...groups(data).values()].map((facts) => ({
      severity: 'fault',
      subjects: [partSubject(facts.part), ...facts.drives.map(partSubject)],
      detail: `${facts.protocol}>${facts.needs}`,
      facts,
    }))
  },
  words({ facts: { part, needs, protocol, drives } }) {
    const drive = protocolNames[protocol]
    if (needs !== protocol)
      return {
        message: `${refsOf(drives)} are reached through an expander, which ${nameOf(part)} cannot drive: it speaks no ${protocolNames[needs]}.`,
        remedy: `Put a ${protocolNames[needs]} controller before the expander, or connect each drive to a port of its own.`,
      }
    return {
      message: `${nameOf(part)} does not speak ${drive}, which ${refsOf(drives)} ${drives.length === 1 ? 'needs' : 'need'}.`,
      remedy: `Connect ${drives.length === 1 ? 'it' : 'them'} to a controller that speaks ${drive}, or choose drives that ${nameOf(part)} can talk to.`,
    }
  },
})

/** Drives without any working path, by the part that stands in the way. */
function groups(data: DataResult): Map<string, Facts> {
  const found = new Map<string, Facts>()
  for (const path of data.paths) {
    const { fault, drive } = path
    const protocol = drive.model.drive?.protocol
    if (fault?.kind !== 'protocol' || !protocol) continue
    if (data.pathsOf(drive).some((other) => other.fault?.kind !== 'protocol')) continue
    const key = `${fault.part.index}.${fault.needs}.${protocol}`
    const facts = found.get(key) ?? { part: fault.part, needs: fault.needs, protocol, drives: [] }
    if (!facts.drives.includes(drive)) facts.drives.push(drive)
    found.set(key, facts)
  }
  return found
}
