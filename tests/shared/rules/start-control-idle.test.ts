import { startControlIdle } from '#shared/rules/start-control-idle/index.ts'
import type { SpinUpMeans } from '#shared/catalog/model.ts'
import {
  connector,
  model,
  motorDrive,
  planes,
  powerCatalog as catalog,
  powerDocument,
} from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const leadWith = (id: string, contact11?: 'grounded' | 'floating') =>
  model(id, {
    kind: 'lead',
    connectors: [
      connector('in', 'bare-plug'),
      ...['out-1', 'out-2'].map((out) => connector(out, 'sata-power-receptacle', contact11 ? { contact11 } : {})),
    ],
    wiring: planes([
      ['in', 'out-1', 1],
      ['in', 'out-2', 1],
    ]),
  })
const models = (means: SpinUpMeans[]) => [
  motorDrive('own', { drive: { startControl: means } }),
  motorDrive('deaf', { drive: { startControl: [] } }),
  leadWith('floating', 'floating'),
  leadWith('grounded', 'grounded'),
  leadWith('unstated'),
]
const planned = (by: SpinUpMeans, lead: string, drives: readonly string[], means: SpinUpMeans[] = [by]) =>
  powerDocument(
    { T1: 'supply', W1: lead, ...Object.fromEntries(drives.map((drive, i) => [`C${i + 1}`, drive])) },
    ['T1.s1 W1.in', ...drives.map((_, i) => `W1.out-${i + 1} C${i + 1}.plug`)],
    { models: models(means), settings: { spinUp: { mode: 'staged', by, groupSize: 1, interval_s: 12 } } },
  )

testRule(startControlIdle, {
  catalog,
  accept: [
    { what: 'drives that wait for a command', document: planned('standby-command', 'grounded', ['own', 'own']) },
    { what: 'contact 11 that floats', document: planned('device-pin', 'floating', ['own']) },
    { what: 'no staging planned', document: powerDocument({ T1: 'supply', C1: 'deaf' }, [], { models: models([]) }) },
  ],
  reject: [
    {
      what: 'drives that do not understand, as one finding for the model',
      document: planned('standby-command', 'grounded', ['deaf', 'deaf']),
      findings: [
        {
          severity: 'fault',
          refs: ['C1', 'C2'],
          words: ['C1 and C2 start with the power', 'do not wait for a command'],
        },
      ],
    },
    {
      what: 'contact 11 grounded by the lead',
      document: planned('device-pin', 'grounded', ['own', 'own']),
      findings: [{ severity: 'fault', refs: ['W1', 'C1', 'C2'], words: ['W1 grounds contact 11'] }],
    },
    {
      what: 'contact 11 of which nobody knows, and a drive that does not wait at all',
      document: planned('device-pin', 'unstated', ['own', 'deaf']),
      findings: [
        { severity: 'fault', refs: ['W1', 'C1'], words: ['not stated'] },
        { severity: 'fault', refs: ['C2'] },
      ],
    },
  ],
})
