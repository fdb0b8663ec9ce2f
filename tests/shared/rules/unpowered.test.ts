import { unpowered } from '#shared/rules/unpowered/index.ts'
import {
  connector,
  figure,
  model,
  planes,
  powerCatalog as catalog,
  powerDocument,
  steadyLoad,
} from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const card = model('card', {
  kind: 'controller',
  connectors: [connector('edge', 'pcie-edge-x8')],
  load: { '12V': { rest_A: figure(0.5), scan_A: figure(0.5) } },
})
const fan = model('fan', {
  kind: 'fan',
  connectors: [connector('power', 'bare-plug')],
  load: { '12V': { rest_A: figure(0.3), scan_A: figure(0.3) } },
})
const board = model('board', {
  kind: 'board',
  connectors: [connector('main', 'bare-plug'), connector('slot-1', 'pcie-slot-x8')],
  wiring: planes([['main', 'slot-1', 1]]),
})

testRule(unpowered, {
  catalog,
  accept: [
    {
      what: 'a fed drive',
      document: powerDocument({ T1: 'supply', W1: 'lead', C1: 'drive' }, ['T1.s1 W1.supply', 'W1.out-1 C1.plug']),
    },
    { what: 'a supply and leads alone', document: powerDocument({ T1: 'supply', W1: 'lead' }, ['T1.s1 W1.supply']) },
    {
      what: 'a card in a slot of a fed board',
      document: powerDocument({ T1: 'supply', K1: 'board', K2: 'card' }, ['T1.s1 K1.main', 'K1.slot-1 K2.edge'], {
        models: [board, card],
      }),
    },
  ],
  reject: [
    {
      what: 'a drive joined to nothing, and one on a lead that nothing feeds',
      document: powerDocument({ T1: 'supply', W1: 'lead', C1: 'drive', C2: 'drive' }, ['W1.out-1 C2.plug']),
      findings: [
        { severity: 'fault', refs: ['C1'], words: ['none of its power connectors is joined'] },
        { severity: 'fault', refs: ['C2'], words: ['joined to W1, but no rail of a supply arrives'] },
      ],
    },
    {
      what: 'a lead without a return',
      document: powerDocument({ T1: 'supply', W1: 'cut', E1: 'load' }, ['T1.s1 W1.in', 'W1.out-1 E1.power'], {
        models: [
          steadyLoad('load', { '12V': 1 }),
          model('cut', {
            kind: 'lead',
            connectors: [connector('in', 'bare-plug'), connector('out-1', 'bare-receptacle')],
            wiring: planes([['in', 'out-1', 1]], ['12V', '5V']),
          }),
        ],
      }),
      findings: [{ severity: 'fault', refs: ['E1'], words: ['no return leads back'] }],
    },
    {
      what: 'a fan as a caution, a card without any board as a note',
      document: powerDocument({ T1: 'supply', G1: 'fan', K2: 'card' }, [], { models: [fan, card] }),
      findings: [
        { severity: 'caution', refs: ['G1'] },
        { severity: 'note', refs: ['K2'], words: ['No board is on the plan'] },
      ],
    },
    {
      what: 'a card beside its slot',
      document: powerDocument({ T1: 'supply', K1: 'board', K2: 'card' }, ['T1.s1 K1.main'], { models: [board, card] }),
      findings: [{ severity: 'fault', refs: ['K2'] }],
    },
  ],
})
