import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { nameOf, refsOf } from '../../check/words.ts'
import { isFedFromOutside, partsAbove } from '../../electrical/feeding.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  splitter: ResolvedPart
  above: ResolvedPart[]
}

export const deepBranching = defineRule<Facts>({
  meta: {
    id: 'deep-branching',
    title: 'A splitter behind a splitter',
    severities: ['caution'],
    finds: 'Splitters that are fed by another splitter.',
    why: 'Every splitter adds two contacts and a short wire to the way of the current, and the first one carries the drives of all that follow.',
    needs: ['joints'],
    sources: [],
    commonPractice: true,
    disputed:
      'Some builders stack splitters for years: it is the load that decides, and the ledger shows it. This is a caution for order, not a verdict on heat.',
  },
  check({ build, power }) {
    return build.parts.flatMap((splitter) => {
      if (splitter.model.kind !== 'splitter') return []
      const inlet = splitter.connectors.find((connector) => isFedFromOutside(power, connector))
      const above = inlet ? partsAbove(power, inlet).filter(({ model }) => model.kind === 'splitter') : []
      return above.length > 0
        ? [
            {
              severity: 'caution' as const,
              subjects: [splitter, ...above].map(partSubject),
              facts: { splitter, above },
            },
          ]
        : []
    })
  },
  words({ facts: { splitter, above } }) {
    return {
      message: `${nameOf(splitter)} is fed through ${above.length === 1 ? 'the splitter' : 'the splitters'} ${refsOf(above)}.`,
      remedy: `Feed ${splitter.part.ref} from an outlet of a lead, or use one lead with more outlets instead of both.`,
    }
  },
})
