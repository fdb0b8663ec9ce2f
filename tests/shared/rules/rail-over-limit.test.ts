import { railOverLimit } from '#shared/rules/rail-over-limit/index.ts'
import type { SupplyOptions } from '../../helpers/powerCatalog.ts'
import { motorDrive, powerCatalog as catalog, powerDocument, steadyLoad, supply } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const steady = (options: SupplyOptions, amperes: object) =>
  powerDocument({ T1: 'own', E1: 'load' }, ['T1.s1 E1.power'], {
    models: [supply('own', options), steadyLoad('load', amperes)],
  })

/** Four drives of 2 A that start for `start_s`, on a lead of their own. */
const starting = (options: SupplyOptions, start_s = 10, settings: object = {}) =>
  powerDocument(
    { T1: 'own', W1: 'lead', C1: 'drives', C2: 'drives', C3: 'drives', C4: 'drives' },
    ['T1.s1 W1.supply', ...[1, 2, 3, 4].map((i) => `W1.out-${i} C${i}.plug`)],
    { models: [supply('own', options), motorDrive('drives', { start_s })], settings },
  )

const staged = { spinUp: { mode: 'staged', by: 'standby-command', groupSize: 1, interval_s: 12 } }

testRule(railOverLimit, {
  catalog,
  accept: [
    { what: 'a load just at the derating share', document: steady({ limits: { '12V': 10 } }, { '12V': 8 }) },
    {
      what: 'a start within the derating share of a stated peak',
      document: starting({ limits: { '12V': 8 }, peak: { peak_A: 10, peak_s: 17 } }),
    },
    {
      what: 'a staged start that keeps the rail low',
      document: starting({ limits: { '12V': 5 } }, 10, staged),
    },
    {
      what: 'a rail whose limit nobody knows',
      document: steady({ limits: { '12V': { value: null, origin: 'guess' } } }, { '12V': 50 }),
    },
  ],
  reject: [
    {
      what: 'a sustained load over the limit',
      document: steady({ limits: { '12V': 10 } }, { '12V': 10.1 }),
      findings: [
        { severity: 'danger', refs: ['T1'], words: ['T1 12 V delivers 10.1 A of 10.0 A'], load: 10.1, limit: 10 },
      ],
    },
    {
      what: 'a load at the limit as short of room',
      document: steady({ limits: { '12V': 10 } }, { '12V': 10 }),
      findings: [{ severity: 'caution', refs: ['T1'], words: ['more than 80 %'], load: 10 }],
    },
    {
      what: 'two rails at once',
      document: steady({ limits: { '12V': 10, '5V': 4 } }, { '12V': 11, '5V': 5 }),
      findings: [
        { severity: 'danger', words: ['T1 12 V'] },
        { severity: 'danger', words: ['T1 5 V'] },
      ],
    },
    {
      what: 'a start over the limit without a stated peak',
      document: starting({ limits: { '12V': 7 } }),
      findings: [{ severity: 'fault', moment: 'cold-start', words: ['Start the drives in groups'], load: 8, limit: 7 }],
    },
    {
      what: 'a start that the stated peak covers, in amperes and seconds: at 16 A for 17 s on 14 A [S2]',
      document: starting({ limits: { '12V': 7 }, peak: { peak_A: 8, peak_s: 17 } }),
      findings: [{ severity: 'caution', words: ['within the 8.0 A that its maker states'], load: 8 }],
    },
    {
      what: 'a start that outlasts the stated peak',
      document: starting({ limits: { '12V': 7 }, peak: { peak_A: 8, peak_s: 17 } }, 18),
      findings: [{ severity: 'fault', load: 8 }],
    },
    {
      what: 'a staged start that stays above for longer than the peak, though each drive starts briefly',
      document: starting({ limits: { '12V': 3 }, peak: { peak_A: 4.5, peak_s: 17 } }, 20, {
        spinUp: { mode: 'staged', by: 'standby-command', groupSize: 1, interval_s: 12 },
      }),
      findings: [{ severity: 'fault', moment: 'staged-start' }],
    },
  ],
})
