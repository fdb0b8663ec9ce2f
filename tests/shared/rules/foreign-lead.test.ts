import { foreignLead } from '#shared/rules/foreign-lead/index.ts'
import type { Model } from '#shared/catalog/model.ts'
import { chain, connector, model, powerCatalog as catalog, powerDocument, supply } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const leadOf = (id: string, family?: string): Model =>
  model(id, {
    kind: 'lead',
    ...(family === undefined ? {} : { pinoutFamily: family }),
    connectors: [connector('supply', 'modular-6-plug'), connector('out-1', 'sata-power-receptacle')],
    wiring: chain(['supply', 'out-1']),
  })
const models = [
  leadOf('lead-b', 'family-b'),
  leadOf('lead-unknown'),
  supply('supply-unknown', { type: 'modular-6-socket' }),
]
const tested = (supplyId: string, supplyModel: string) => ({
  model: 'lead-b',
  pinTest: { supply: supplyId, supplyModel, by: 'keeper', on: '2026-11-20' },
})

testRule(foreignLead, {
  catalog,
  accept: [
    {
      what: 'a lead of the same family',
      document: powerDocument({ T1: 'supply-a', W1: 'lead-a' }, ['T1.s1 W1.supply']),
    },
    {
      what: 'a foreign lead with its pin test on this supply on record',
      document: powerDocument({ T1: 'supply-a', W1: tested('T1', 'supply-a') }, ['T1.s1 W1.supply'], { models }),
    },
    {
      what: 'a lead on an outlet that a standard covers',
      document: powerDocument({ T1: 'supply', W1: 'lead' }, ['T1.s1 W1.supply']),
    },
  ],
  reject: [
    {
      what: 'leads of another family, whichever way round the joints are drawn',
      document: powerDocument({ T1: 'supply-a', W1: 'lead-b', W2: 'lead-b' }, ['T1.s1 W1.supply', 'W2.supply T1.s2'], {
        models,
      }),
      findings: [
        { severity: 'danger', refs: ['W1', 'T1'], words: ['"family-b"', '"family-a"', 'measure every pin'] },
        { severity: 'danger', refs: ['W2', 'T1'] },
      ],
    },
    {
      what: 'a lead of unknown family, and a supply of unknown family',
      document: powerDocument(
        { T1: 'supply-a', T2: 'supply-unknown', W1: 'lead-unknown', W2: 'lead-b' },
        ['T1.s1 W1.supply', 'T2.s1 W2.supply'],
        { models },
      ),
      findings: [
        { severity: 'caution', refs: ['W1'], words: ['Nobody has stated'] },
        { severity: 'caution', refs: ['W2'] },
      ],
    },
    {
      what: 'a pin test made on another supply, or on the one that stood here before',
      document: powerDocument(
        { T1: 'supply-a', T2: 'supply', W1: tested('T2', 'supply-a'), W2: tested('T1', 'supply-old') },
        ['T1.s1 W1.supply', 'T1.s2 W2.supply'],
        { models },
      ),
      findings: [
        { severity: 'danger', refs: ['W1'], words: ['pin test'] },
        { severity: 'danger', refs: ['W2'], words: ['pin test'] },
      ],
    },
  ],
})
