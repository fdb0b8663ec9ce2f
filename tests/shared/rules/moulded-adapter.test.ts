import { mouldedAdapter } from '#shared/rules/moulded-adapter/index.ts'
import type { Model } from '#shared/catalog/model.ts'
import { chain, connector, model, powerCatalog as catalog, powerDocument } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const adapter = (id: string, construction?: NonNullable<Model['construction']>, inlet = 'peripheral-plug') =>
  model(id, {
    kind: 'adapter',
    ...(construction ? { construction } : {}),
    connectors: [connector('in', inlet), connector('out-1', 'sata-power-receptacle')],
    wiring: chain(['in', 'out-1'], { lines: ['12V', '5V', 'return'] }),
  })
const models = [
  adapter('crimped', 'crimped'),
  adapter('moulded', 'moulded'),
  adapter('unstated'),
  adapter('sata', 'moulded', 'sata-power-plug'),
]

testRule(mouldedAdapter, {
  catalog,
  accept: [
    { what: 'a crimped adapter', document: powerDocument({ W1: 'crimped' }, [], { models }) },
    { what: 'a moulded splitter that is SATA on both ends', document: powerDocument({ W1: 'sata' }, [], { models }) },
    { what: 'leads and splitters of SATA alone', document: powerDocument({ W1: 'lead', W2: 'splitter-2' }) },
  ],
  reject: [
    {
      what: 'a moulded adapter, and one made nobody knows how',
      document: powerDocument({ W1: 'moulded', W2: 'unstated' }, [], { models }),
      findings: [
        { severity: 'caution', refs: ['W1'], words: ['moulded adapter from 4-pin to SATA power'] },
        { severity: 'note', refs: ['W2'], words: ['not stated', 'Look at the SATA plug'] },
      ],
    },
  ],
})
