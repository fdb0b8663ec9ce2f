import { hungrySsd } from '#shared/rules/hungry-ssd/index.ts'
import { figure, powerCatalog as catalog, powerDocument, solidState, supply } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

/** `count` solid-state drives on a lead, behind a splitter where there are more than a lead's outlets. */
const flash = (count: number, write_A: number, supplyModel = supply('own')) =>
  powerDocument(
    {
      T1: 'own',
      W1: 'lead',
      W2: 'splitter-4',
      ...Object.fromEntries(Array.from({ length: count }, (_, i) => [`C${i + 1}`, 'ssd'])),
    },
    ['T1.s1 W1.supply', 'W1.out-1 W2.in', ...Array.from({ length: count }, (_, i) => `W2.out-${i + 1} C${i + 1}.plug`)],
    { models: [supplyModel, solidState('ssd', { scan_A: 0.5, write_A })] },
  )

testRule(hungrySsd, {
  catalog,
  accept: [
    { what: 'four that write at 0.9 A: just the derating share of 4.5 A', document: flash(4, 0.9) },
    {
      what: 'motors only',
      document: powerDocument({ T1: 'supply', W1: 'lead', C1: 'drive' }, ['T1.s1 W1.supply', 'W1.out-1 C1.plug']),
    },
  ],
  reject: [
    {
      what: 'four that read at 0.5 A and write at 1.1 A through one plug',
      document: flash(4, 1.1),
      findings: [
        {
          severity: 'caution',
          refs: ['W1', 'C1', 'C4'],
          words: ['W2 in, 5 V carries 4.4 A of 4.5 A', 'C1 to C4 write at their peak', '2.0 A of 4.5 A'],
          moment: 'write-burst',
        },
      ],
    },
    {
      what: 'a joint 5 V + 3.3 V limit as the weakest hop',
      document: flash(
        4,
        0.9,
        supply('own', {
          groups: [{ id: 'low', name: '5 V and 3.3 V together', rails: ['5V', '3.3V'], limit_W: figure(20) }],
        }),
      ),
      findings: [{ severity: 'caution', refs: ['T1'], words: ['5 V and 3.3 V together carries 18 W of 20 W'] }],
    },
    {
      what: 'one on each of two supplies',
      document: powerDocument(
        {
          T1: 'small',
          T2: 'small',
          W1: 'lead',
          W2: 'lead',
          C1: 'ssd',
          C2: 'ssd',
        },
        ['T1.s1 W1.supply', 'T2.s1 W2.supply', 'W1.out-1 C1.plug', 'W2.out-1 C2.plug'],
        { models: [supply('small', { limits: { '5V': 1 } }), solidState('ssd', { scan_A: 0.5, write_A: 0.9 })] },
      ),
      findings: [
        { severity: 'caution', refs: ['T1'], words: ['T1 5 V'] },
        { severity: 'caution', refs: ['T2'], words: ['T2 5 V'] },
      ],
    },
  ],
})
