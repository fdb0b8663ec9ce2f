import { contactOverRating } from '#shared/rules/contact-over-rating/index.ts'
import {
  chain,
  connector,
  model,
  motorDrive,
  powerCatalog as catalog,
  powerDocument,
  steadyLoad,
  supply,
} from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

/** `count` drives behind a splitter on the first outlet of a lead. */
const behindSplitter = (splitter: string, count: number, start_A: number, more: object = {}) =>
  powerDocument(
    {
      T1: 'supply',
      W1: 'lead',
      W2: splitter,
      ...Object.fromEntries(Array.from({ length: count }, (_, i) => [`C${i + 1}`, 'own'])),
    },
    ['T1.s1 W1.supply', 'W1.out-1 W2.in', ...Array.from({ length: count }, (_, i) => `W2.out-${i + 1} C${i + 1}.plug`)],
    { models: [motorDrive('own', { start_A })], ...more },
  )

const steady = (amperes: number, settings: object = {}) =>
  powerDocument({ T1: 'supply', W1: 'lead', E1: 'own' }, ['T1.s1 W1.supply', 'W1.out-1 E1.power'], {
    models: [steadyLoad('own', { '12V': amperes }, 'sata-power-plug')],
    settings,
  })

// Three contacts of 1.5 A: 4.5 A for a rail of a SATA power connector [S31].
testRule(contactOverRating, {
  catalog,
  accept: [
    { what: 'one drive on an outlet', document: behindSplitter('splitter-2', 1, 2) },
    { what: 'two drives of 1.8 A: just the derating share of 4.5 A', document: behindSplitter('splitter-2', 2, 1.8) },
    { what: 'a sustained load just at the derating share', document: steady(3.6) },
    {
      what: 'a sustained load just at the limit where no derating is asked for',
      document: steady(4.5, { derating: 1 }),
    },
    { what: 'an empty build', document: powerDocument({}) },
  ],
  reject: [
    {
      what: 'a 1-to-4 splitter that starts four drives of 2.0 A: about 8 A of 4.5 A, overloaded',
      document: behindSplitter('splitter-4', 4, 2),
      findings: [
        {
          severity: 'fault',
          refs: ['W2', 'W1'],
          words: [
            'W2 in carries 8.0 A of 4.5 A (178 %) on 12 V at cold start',
            'It feeds C1 to C4',
            'short of room on return',
          ],
          moment: 'cold-start',
          load: 8,
          limit: 4.5,
        },
      ],
    },
    {
      what: 'a 1-to-2 splitter that starts two drives of 2.0 A: 4.0 A of 4.5 A, thin',
      document: behindSplitter('splitter-2', 2, 2),
      findings: [{ severity: 'caution', refs: ['W2'], words: ['4.0 A of 4.5 A (89 %)', 'little left'], load: 4 }],
    },
    {
      what: 'the same with drives of 2.2 A: 4.4 A of 4.5 A, thin',
      document: behindSplitter('splitter-2', 2, 2.2),
      findings: [{ severity: 'caution', refs: ['W2'], load: 4.4 }],
    },
    {
      what: 'a start over the limit but within the short-time allowance, just on it',
      document: behindSplitter('splitter-2', 2, 2.8125),
      findings: [{ severity: 'caution', words: ['within the 1.25 times'], load: 5.625 }],
    },
    {
      what: 'a start just past the allowance',
      document: behindSplitter('splitter-2', 2, 2.82),
      findings: [{ severity: 'fault', words: ['past the 1.25 times'], load: 5.64 }],
    },
    {
      what: 'a sustained load over the limit, on both ends of a lead',
      document: powerDocument(
        { T1: 'supply', W1: 'lead', W2: 'splitter-2', E1: 'own', E2: 'own' },
        ['T1.s1 W1.supply', 'W1.out-1 W2.in', 'W2.out-1 E1.power', 'W1.out-2 E2.power'],
        { models: [steadyLoad('own', { '12V': 4.6 }, 'sata-power-plug')] },
      ),
      findings: [
        { severity: 'danger', refs: ['W2', 'W1'], words: ['for as long as this lasts'], load: 4.6, limit: 4.5 },
        { severity: 'danger', refs: ['E1'], load: 4.6 },
        { severity: 'danger', refs: ['E2'], load: 4.6 },
      ],
    },
    {
      what: 'a move that would help, named with what its outlet has left',
      document: powerDocument(
        { T1: 'supply', W1: 'lead', W2: 'splitter-4', W3: 'lead', C1: 'drive', C2: 'drive', C3: 'drive' },
        [
          'T1.s1 W1.supply',
          'T1.s2 W3.supply',
          'W1.out-1 W2.in',
          'W2.out-1 C1.plug',
          'W2.out-2 C2.plug',
          'W2.out-3 C3.plug',
        ],
      ),
      findings: [
        {
          severity: 'fault',
          refs: ['W2'],
          words: [/Move C\d from W2 out-\d to W3 out-1, which has \d+\.\d A left/],
          load: 6,
        },
      ],
    },
    {
      what: 'thin wire in a contact: 8 A on 20 AWG may carry 7 A, where 18 AWG may carry 9 A [S25]',
      document: fourPin(20),
      findings: [
        { severity: 'danger', refs: ['W1'], words: ['8.0 A of 7.0 A'], limit: 7 },
        { severity: 'danger', refs: ['E1'], limit: 7 },
      ],
    },
    {
      what: 'the same on 18 AWG: within its 9 A, with little left',
      document: fourPin(18),
      findings: [
        { severity: 'caution', refs: ['W1'], limit: 9 },
        { severity: 'caution', refs: ['E1'], limit: 9 },
      ],
    },
  ],
})

/** Four drives of 2 A as one load behind a 4-pin lead of the given gauge. */
function fourPin(awg: number) {
  return powerDocument({ T1: 'supply-4pin', W1: 'lead-4pin', E1: 'four' }, ['T1.s1 W1.in', 'W1.out-1 E1.power'], {
    models: [
      supply('supply-4pin', { type: 'peripheral-receptacle' }),
      model('lead-4pin', {
        kind: 'lead',
        connectors: [connector('in', 'peripheral-plug'), connector('out-1', 'peripheral-receptacle')],
        wiring: chain(['in', 'out-1'], { awg, lines: ['12V', '5V', 'return'] }),
      }),
      steadyLoad('four', { '12V': 8 }, 'peripheral-plug'),
    ],
  })
}
