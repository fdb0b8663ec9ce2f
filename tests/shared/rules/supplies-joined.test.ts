import { suppliesJoined } from '#shared/rules/supplies-joined/index.ts'
import { connector, figure, model, planes, powerCatalog as catalog, powerDocument } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const tie = model('tie', {
  kind: 'backplane',
  connectors: [
    connector('in-1', 'bare-plug'),
    connector('in-2', 'bare-plug'),
    connector('bay-1', 'bare-receptacle', { bay: 1 }),
  ],
  wiring: planes(
    [
      ['in-1', 'bay-1', 10],
      ['in-2', 'bay-1', 10],
    ],
    ['12V', 'return'],
  ),
})
const split = model('split', {
  kind: 'supply',
  connectors: [
    connector('s1', 'bare-receptacle', { feeds: { '12V': '12V1' } }),
    connector('s2', 'bare-receptacle', { feeds: { '12V': '12V2' } }),
    connector('s3', 'bare-receptacle', { feeds: { '12V': '12V1' } }),
  ],
  supply: {
    rails: ['12V1', '12V2'].map((id) => ({ id, rail: '12V' as const, setPoint_V: figure(12), limit_A: figure(18) })),
    total_W: figure(500),
    toleranceAt: 'socket',
  },
})
const models = [tie, split]

testRule(suppliesJoined, {
  catalog,
  accept: [
    {
      what: 'one rail that feeds a backplane twice',
      document: powerDocument({ T1: 'split', U1: 'tie' }, ['T1.s1 U1.in-1', 'T1.s3 U1.in-2'], { models }),
    },
    {
      what: 'two supplies that share nothing but the return',
      document: powerDocument(
        { T1: 'supply', T2: 'supply', U1: 'tie', U2: 'tie' },
        ['T1.s1 U1.in-1', 'T2.s1 U2.in-1'],
        { models },
      ),
    },
  ],
  reject: [
    {
      what: 'two supplies on one backplane',
      document: powerDocument({ T1: 'supply', T2: 'supply', U1: 'tie' }, ['T1.s1 U1.in-1', 'T2.s1 U1.in-2'], {
        models,
      }),
      findings: [
        {
          severity: 'danger',
          refs: ['T1', 'T2', 'U1'],
          words: ['T1 12 V and T2 12 V are tied together on 12 V through U1'],
        },
      ],
    },
    {
      what: 'two limited rails of one supply',
      document: powerDocument({ T1: 'split', U1: 'tie' }, ['T1.s1 U1.in-1', 'T1.s2 U1.in-2'], { models }),
      findings: [{ severity: 'fault', refs: ['T1', 'U1'], words: ['T1 12V1 and T1 12V2'] }],
    },
    {
      what: 'two backplanes, each tied on its own',
      document: powerDocument(
        { T1: 'supply', T2: 'supply', T3: 'supply', T4: 'supply', U1: 'tie', U2: 'tie' },
        ['T1.s1 U1.in-1', 'T2.s1 U1.in-2', 'T3.s1 U2.in-1', 'T4.s1 U2.in-2'],
        { models },
      ),
      findings: [
        { severity: 'danger', refs: ['T1', 'T2'] },
        { severity: 'danger', refs: ['T3', 'T4'] },
      ],
    },
  ],
})
