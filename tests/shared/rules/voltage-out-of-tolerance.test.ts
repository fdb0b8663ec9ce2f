import { voltageOutOfTolerance } from '#shared/rules/voltage-out-of-tolerance/index.ts'
import type { DriveOptions } from '../../helpers/powerCatalog.ts'
import {
  connector,
  figure,
  model,
  motorDrive,
  planes,
  powerCatalog as catalog,
  powerDocument,
  steadyLoad,
  supply,
} from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const stub = (mohm: number) =>
  model('stub', {
    kind: 'lead',
    connectors: [connector('in', 'bare-plug'), connector('out-1', 'bare-receptacle')],
    wiring: planes([['in', 'out-1', mohm]]),
  })

/** 400 mohm on 12 V, next to nothing on the other lines. */
const thin12V = model('stub', {
  kind: 'lead',
  connectors: [connector('in', 'bare-plug'), connector('out-1', 'bare-receptacle')],
  wiring: [...planes([['in', 'out-1', 400]], ['12V']), ...planes([['in', 'out-1', 0]], ['5V', 'return'])],
})

/** One steady load behind a lead of so many milliohm each way. */
const behind = (mohm: number, amperes: object, settings: object = {}) =>
  powerDocument({ T1: 'supply', W1: 'stub', E1: 'load' }, ['T1.s1 W1.in', 'W1.out-1 E1.power'], {
    models: [stub(mohm), steadyLoad('load', amperes)],
    settings,
  })

/** One drive of 2 A at start behind such a lead. */
const driveBehind = (mohm: number, options: DriveOptions = {}, lead = stub(mohm)) =>
  powerDocument({ T1: 'supply', W1: 'stub', C1: 'own' }, ['T1.s1 W1.in', 'W1.out-1 C1.plug'], {
    models: [lead, motorDrive('own', { plug: 'bare-plug', ...options })],
  })

testRule(voltageOutOfTolerance, {
  catalog,
  accept: [
    { what: 'a load at just 11.40 V', document: behind(100, { '12V': 3 }) },
    // 12 V may fall to 10.8 V at peak load by the older guides [S1]: 2 A over 400 mohm leave 11.2 V.
    {
      what: 'a start between 10.8 and 11.4 V by the older guide',
      document: driveBehind(400, {}, thin12V),
    },
    { what: 'a rail that does not arrive: another rule', document: powerDocument({ T1: 'supply', C1: 'drive' }) },
    { what: '11.3 V where the build follows ATX 3', document: behind(100, { '12V': 3.5 }, { tolerance: 'atx3' }) },
  ],
  reject: [
    {
      what: 'a load just below 11.40 V, with the drop split',
      document: behind(100, { '12V': 3.1 }),
      findings: [
        {
          severity: 'fault',
          refs: ['E1'],
          words: [
            '11.38 V on 12 V',
            '11.40 V that it needs',
            '0.31 V in wire',
            '0.00 V in contacts',
            '0.31 V in the return',
          ],
          load: 11.38,
          limit: 11.4,
        },
      ],
    },
    {
      what: 'a 12 V start that pulls 5 V down over the shared return: 2.5 A back and 0.5 A out over 90 mohm',
      document: driveBehind(90),
      findings: [
        {
          severity: 'fault',
          refs: ['C1'],
          words: ['4.73 V on 5 V at cold start', 'return loses most'],
          load: 4.73,
          limit: 4.75,
        },
      ],
    },
    {
      what: 'a drive that keeps its own five per cent while starting [S40]',
      document: driveBehind(400, { drive: { tolerance: { '12V': { below_pct: figure(5) } } } }, thin12V),
      findings: [{ severity: 'fault', words: ['tolerance of C1 on 12 V'], limit: 11.4 }],
    },
    {
      what: '11.48 V where the build follows the server table [S19]',
      document: behind(100, { '12V': 2.6 }, { tolerance: 'server' }),
      findings: [{ severity: 'fault', load: 11.48, limit: 11.52 }],
    },
    {
      what: 'contacts that bring it there only once they have aged',
      document: powerDocument({ T1: 'supply', W1: 'lead', E1: 'load' }, ['T1.s1 W1.supply', 'W1.out-1 E1.power'], {
        models: [steadyLoad('load', { '5V': 10.5 }, 'sata-power-plug')],
      }),
      findings: [{ severity: 'caution', refs: ['E1'], words: ['once the contacts on the way have aged'] }],
    },
    {
      what: 'a set point that is too high, on two devices',
      document: powerDocument({ T1: 'hot', E1: 'load', E2: 'load' }, ['T1.s1 E1.power', 'T1.s2 E2.power'], {
        models: [supply('hot', { setPoints: { '12V': 12.7 } }), steadyLoad('load', { '12V': 1 })],
      }),
      findings: [
        { severity: 'fault', refs: ['E1'], words: ['more than the 12.60 V', 'set point'] },
        { severity: 'fault', refs: ['E2'] },
      ],
    },
  ],
})
