import { twoSupplies } from '#shared/rules/two-supplies/index.ts'
import { connector, model, planes, powerCatalog as catalog, powerDocument } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const both = model('both', {
  kind: 'adapter',
  connectors: [
    connector('in-12', 'bare-plug'),
    connector('in-5', 'bare-plug'),
    connector('out-1', 'sata-power-receptacle'),
  ],
  wiring: [...planes([['in-12', 'out-1', 1]], ['12V', 'return']), ...planes([['in-5', 'out-1', 1]], ['5V', 'return'])],
})

testRule(twoSupplies, {
  catalog,
  accept: [
    {
      what: 'one supply',
      document: powerDocument({ T1: 'supply', W1: 'lead', C1: 'drive' }, ['T1.s1 W1.supply', 'W1.out-1 C1.plug']),
    },
  ],
  reject: [
    {
      what: 'two, each with its own drives',
      document: powerDocument(
        { T1: 'supply', T2: 'supply', W1: 'lead', W2: 'lead', C1: 'drive', C2: 'drive', C3: 'drive' },
        ['T1.s1 W1.supply', 'T2.s1 W2.supply', 'W1.out-1 C1.plug', 'W1.out-2 C2.plug', 'W2.out-1 C3.plug'],
      ),
      findings: [
        {
          severity: 'note',
          refs: ['T1', 'T2'],
          words: ['T1 feeds C1 and C2 (2 drives lost with it); T2 feeds C3', 'join their returns'],
        },
      ],
    },
    {
      what: 'a drive that lives on both',
      document: powerDocument(
        { T1: 'supply', T2: 'supply', W1: 'both', C1: 'drive' },
        ['T1.s1 W1.in-12', 'T2.s1 W1.in-5', 'W1.out-1 C1.plug'],
        {
          models: [both],
        },
      ),
      findings: [{ severity: 'caution', refs: ['T1', 'T2', 'C1'], words: ['C1 needs both at once'] }],
    },
    {
      what: 'a second one that feeds nothing',
      document: powerDocument({ T1: 'supply', T2: 'supply' }),
      findings: [{ severity: 'note', words: ['T1 feeds no drive; T2 feeds no drive'] }],
    },
  ],
})
