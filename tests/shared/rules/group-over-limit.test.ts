import { groupOverLimit } from '#shared/rules/group-over-limit/index.ts'
import type { SupplyOptions } from '../../helpers/powerCatalog.ts'
import {
  figure,
  motorDrive,
  powerCatalog as catalog,
  powerDocument,
  steadyLoad,
  supply,
} from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const low = (limit_W: number): NonNullable<SupplyOptions['groups']> => [
  { id: 'low', name: '5 V and 3.3 V together', rails: ['5V', '3.3V'], limit_W: figure(limit_W) },
]
const steady = (options: SupplyOptions, amperes: object) =>
  powerDocument({ T1: 'own', E1: 'load' }, ['T1.s1 E1.power'], {
    models: [supply('own', options), steadyLoad('load', amperes)],
  })

testRule(groupOverLimit, {
  catalog,
  accept: [
    {
      what: 'a group just at the derating share: 16 x 5 + 10 x 1.6 is not counted twice',
      document: steady({ groups: low(100) }, { '5V': 16 }),
    },
    { what: 'a supply without groups within its watts', document: steady({ total_W: 650 }, { '12V': 40 }) },
  ],
  reject: [
    {
      // 28 A and 30 A would each pass, and be 239 W against a chart ceiling of 140 W [S2].
      what: 'rails that are fine alone and too much together',
      document: steady({ limits: { '5V': 28, '3.3V': 30 }, groups: low(140) }, { '5V': 20, '3.3V': 20 }),
      findings: [
        {
          severity: 'danger',
          refs: ['T1'],
          words: ['5 V and 3.3 V together', '166 W of 140 W'],
          load: 166,
          limit: 140,
        },
      ],
    },
    {
      what: 'a whole supply over its watts at the start, and its group short of room',
      document: powerDocument(
        { T1: 'own', W1: 'lead', C1: 'drives', C2: 'drives', C3: 'drives', C4: 'drives' },
        ['T1.s1 W1.supply', ...[1, 2, 3, 4].map((i) => `W1.out-${i} C${i}.plug`)],
        { models: [supply('own', { total_W: 100, groups: low(11) }), motorDrive('drives')] },
      ),
      findings: [
        { severity: 'fault', words: ['All rails of T1', '106 W of 100 W'], moment: 'cold-start', load: 106 },
        { severity: 'caution', words: ['10 W of 11 W'], load: 10 },
      ],
    },
    {
      what: 'rails behind one converter, in amperes',
      document: steady(
        { groups: [{ id: 'g', name: '12 V together', rails: ['12V'], limit_A: figure(20) }] },
        { '12V': 25 },
      ),
      findings: [{ severity: 'danger', words: ['12 V together', '25.0 A of 20.0 A'] }],
    },
    {
      what: 'a group at its limit as short of room',
      document: steady({ groups: low(100) }, { '5V': 20 }),
      findings: [{ severity: 'caution', load: 100, limit: 100 }],
    },
  ],
})
