import { railMissing } from '#shared/rules/rail-missing/index.ts'
import { connector, figure, model, planes, powerCatalog as catalog, powerDocument } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const only = (id: string, lines: readonly ('12V' | '5V' | 'return')[]) =>
  model(id, {
    kind: 'lead',
    connectors: [connector('in', 'bare-plug'), connector('out-1', 'sata-power-receptacle')],
    wiring: planes([['in', 'out-1', 1]], lines),
  })
const board = model('board', {
  kind: 'board',
  connectors: [connector('main', 'bare-plug'), connector('eps-1', 'bare-plug')],
  load: {
    '12V': { rest_A: figure(3), scan_A: figure(5) },
    '5V': { rest_A: figure(1), scan_A: figure(1) },
  },
  loadAt: { '12V': 'eps-1', '5V': 'main' },
})
const on = (lead: string) =>
  powerDocument({ T1: 'supply', W1: lead, C1: 'drive' }, ['T1.s1 W1.in', 'W1.out-1 C1.plug'], {
    models: [only(lead, linesOf[lead]!)],
  })
const linesOf: Record<string, readonly ('12V' | '5V' | 'return')[]> = {
  all: ['12V', '5V', 'return'],
  'no-12': ['5V', 'return'],
  'no-5': ['12V', 'return'],
}

testRule(railMissing, {
  catalog,
  accept: [
    { what: 'a drive with both rails and no 3.3 V, which it does not use', document: on('all') },
    { what: 'a drive without any rail: another rule', document: powerDocument({ C1: 'drive' }) },
    {
      what: 'a board with both its leads',
      document: powerDocument({ T1: 'supply', K1: 'board' }, ['T1.s1 K1.main', 'T1.s2 K1.eps-1'], { models: [board] }),
    },
  ],
  reject: [
    {
      what: 'a drive without 12 V',
      document: on('no-12'),
      findings: [{ severity: 'fault', refs: ['C1'], words: ['gets 5 V, but not 12 V', 'does not carry it'] }],
    },
    {
      what: 'a drive without 5 V',
      document: on('no-5'),
      findings: [{ severity: 'fault', refs: ['C1'], words: ['gets 12 V, but not 5 V'] }],
    },
    {
      what: 'a board without its processor lead',
      document: powerDocument({ T1: 'supply', K1: 'board' }, ['T1.s1 K1.main'], { models: [board] }),
      findings: [{ severity: 'fault', refs: ['K1'], words: ['K1 eps-1', 'nothing is joined there'] }],
    },
    {
      what: 'two drives on one such lead and its twin',
      document: powerDocument(
        { T1: 'supply', W1: 'no-12', W2: 'no-12', C1: 'drive', C2: 'drive' },
        ['T1.s1 W1.in', 'T1.s2 W2.in', 'W1.out-1 C1.plug', 'W2.out-1 C2.plug'],
        { models: [only('no-12', ['5V', 'return'])] },
      ),
      findings: [
        { severity: 'fault', refs: ['C1'] },
        { severity: 'fault', refs: ['C2'] },
      ],
    },
  ],
})
