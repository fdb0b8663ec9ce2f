import { unproven } from '#shared/rules/unproven/index.ts'
import type { Quantity } from '#shared/quantity/quantity.ts'
import { motorDrive, powerCatalog as catalog, powerDocument, steadyLoad, supply } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const ranged = (value: number, low: number, high: number): Quantity => ({ value, low, high, origin: 'class default' })

/** Two drives behind a 1-to-2 splitter: 4.5 A, and 5.625 A for the seconds of a start. */
const two = (start_A: Quantity) =>
  powerDocument(
    { T1: 'supply', W1: 'lead', W2: 'splitter-2', C1: 'own', C2: 'own' },
    ['T1.s1 W1.supply', 'W1.out-1 W2.in', 'W2.out-1 C1.plug', 'W2.out-2 C2.plug'],
    { models: [motorDrive('own', { start_A })] },
  )
const steady = (amperes: Quantity | number, limit: Quantity | number) =>
  powerDocument({ T1: 'own', E1: 'load' }, ['T1.s1 E1.power'], {
    models: [supply('own', { limits: { '12V': limit } }), steadyLoad('load', { '12V': amperes })],
  })

testRule(unproven, {
  catalog,
  accept: [
    { what: 'a range that ends just on what the seconds of a start may take', document: two(ranged(2, 1.9, 2.8125)) },
    { what: 'figures without a range', document: two({ value: 2.2, origin: 'maker' }) },
    { what: 'a fault at either end of the range', document: two(ranged(3, 2.9, 3.5)) },
  ],
  reject: [
    {
      what: 'a start that could be too much, with the measurement that settles it',
      document: two(ranged(2, 1.9, 2.9)),
      findings: [
        {
          severity: 'note',
          refs: ['W1'],
          words: [
            'start current on 12 V of "own" (2 A, 1.9 to 2.9 A; class default)',
            'would turn bad: W2 in, 12 V',
            'clamp meter',
          ],
        },
      ],
    },
    {
      what: 'a fault that a better figure could lift',
      document: two(ranged(3, 2.5, 3.1)),
      findings: [{ severity: 'note', words: ['would turn good: W2 in, 12 V'] }],
    },
    {
      what: 'a limit that may be lower than stated',
      document: steady(19, ranged(20, 18, 22)),
      findings: [
        { severity: 'note', refs: ['T1'], words: ['limit of T1 12 V (20 A, 18 to 22 A', 'label of the supply'] },
      ],
    },
    {
      what: 'two figures, each with a verdict of its own',
      document: powerDocument({ T1: 'own', E1: 'one', E2: 'other' }, ['T1.s1 E1.power', 'T1.s2 E2.power'], {
        models: [
          supply('own', { limits: { '12V': 5, '5V': 5 } }),
          steadyLoad('one', { '12V': ranged(4, 3, 6) }),
          steadyLoad('other', { '5V': ranged(4, 3, 6) }),
        ],
      }),
      findings: [
        { severity: 'note', words: ['"one"', 'T1 12 V'] },
        { severity: 'note', words: ['"other"', 'T1 5 V'] },
      ],
    },
  ],
})
