import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { nameOf } from '../../check/words.ts'
import { defineRule, type RawFinding } from '../rule.ts'

interface Facts {
  part: ResolvedPart
  known: boolean
}

export const mouldedAdapter = defineRule<Facts>({
  meta: {
    id: 'moulded-adapter',
    title: 'A moulded adapter to SATA power',
    severities: ['caution', 'note'],
    finds:
      'Adapters and splitters from 4-pin to SATA power whose plug is moulded in one piece, or made nobody knows how.',
    why: 'In a moulded plug bare terminals sit close together in soft plastic: a path grows between 12 V and return, draws too little for the supply to notice, and has set plugs on fire after years.',
    needs: ['how the plugs of the adapter are made'],
    sources: ['S66', 'S67', 'S67b'],
    disputed:
      'Field reports and one maker speak against the moulded form; nobody has published a failure rate. Many serve for years.',
  },
  check({ build }) {
    return build.parts.flatMap((part): RawFinding<Facts>[] => {
      const { construction, kind } = part.model
      if ((kind !== 'adapter' && kind !== 'splitter') || !leadsToSata(part)) return []
      if (construction === 'moulded')
        return [{ severity: 'caution', subjects: [partSubject(part)], facts: { part, known: true } }]
      const unknown = construction === undefined || construction === 'unknown'
      return unknown ? [{ severity: 'note', subjects: [partSubject(part)], facts: { part, known: false } }] : []
    })
  },
  words({ facts: { part, known } }) {
    return known
      ? {
          message: `${nameOf(part)} is a moulded adapter from 4-pin to SATA power.`,
          remedy: 'Use a native SATA lead, or an adapter with crimped or pressed-on wires whose cap can be opened.',
        }
      : {
          message: `How the plugs of ${nameOf(part)} are made is not stated.`,
          remedy:
            'Look at the SATA plug: a cap over separate wires is crimped or pressed on, one smooth block is moulded. Then state it on the part.',
        }
  },
})

const leadsToSata = ({ connectors }: ResolvedPart): boolean =>
  connectors.some(({ type }) => type.id.startsWith('peripheral-')) &&
  connectors.some(({ type }) => type.id === 'sata-power-receptacle')
