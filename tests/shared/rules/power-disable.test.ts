import { powerDisable } from '#shared/rules/power-disable/index.ts'
import {
  connector,
  model,
  motorDrive,
  planes,
  powerCatalog as catalog,
  powerDocument,
} from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const obeying = (powerDisable_: 'yes' | 'no' | 'unknown') =>
  motorDrive('own', { drive: { powerDisable: powerDisable_ } })
const open = model('open', {
  kind: 'lead',
  connectors: [connector('in', 'bare-plug'), connector('out-1', 'sata-power-receptacle', { contact3: 'open' })],
  wiring: planes([['in', 'out-1', 1]]),
})
const noThree = model('no-three', {
  kind: 'lead',
  connectors: [connector('in', 'bare-plug'), connector('out-1', 'sata-power-receptacle')],
  wiring: planes([['in', 'out-1', 1]], ['12V', '5V', 'return']),
})
const on = (lead: string, obeys: 'yes' | 'no' | 'unknown') =>
  powerDocument(
    { T1: 'supply', W1: lead, C1: 'own' },
    [lead === 'lead' ? 'T1.s1 W1.supply' : 'T1.s1 W1.in', 'W1.out-1 C1.plug'],
    {
      models: [obeying(obeys), open, noThree],
    },
  )

testRule(powerDisable, {
  catalog,
  accept: [
    { what: 'a drive that does not obey contact 3', document: on('lead', 'no') },
    { what: 'an outlet with contact 3 open', document: on('open', 'yes') },
    { what: 'a lead without 3.3 V', document: on('no-three', 'yes') },
  ],
  reject: [
    {
      what: 'a drive that obeys on an outlet that feeds contact 3',
      document: on('lead', 'yes'),
      findings: [{ severity: 'fault', refs: ['C1', 'W1'], words: ['stays off', 'W1 out-1'] }],
    },
    {
      what: 'a drive of which nobody knows',
      document: on('lead', 'unknown'),
      findings: [{ severity: 'note', refs: ['C1'], words: ['not known'] }],
    },
    {
      what: 'two such drives',
      document: powerDocument(
        { T1: 'supply', W1: 'lead', C1: 'own', C2: 'own' },
        ['T1.s1 W1.supply', 'W1.out-1 C1.plug', 'W1.out-2 C2.plug'],
        {
          models: [obeying('yes')],
        },
      ),
      findings: [
        { severity: 'fault', refs: ['C1'] },
        { severity: 'fault', refs: ['C2'] },
      ],
    },
  ],
})
