import { wireOverAmpacity } from '#shared/rules/wire-over-ampacity/index.ts'
import { powerCatalog as catalog, powerDocument, steadyLoad } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const loadOf = (amperes: number, lead = 'lead', settings: object = {}) =>
  powerDocument({ T1: 'supply', W1: lead, E1: 'own' }, ['T1.s1 W1.supply', 'W1.out-1 E1.power'], {
    models: [steadyLoad('own', { '12V': amperes }, 'sata-power-plug')],
    settings,
  })

// 18 AWG: 16 A as a single wire [S57], 0.7 of it in a bundle (common practice): 11.2 A. 22 AWG: 7 A, 4.9 A.
testRule(wireOverAmpacity, {
  catalog,
  accept: [
    { what: 'a load just at the derating share of 11.2 A', document: loadOf(11.2 * 0.8) },
    { what: 'thin wire with little on it', document: loadOf(3.9, 'lead-thin') },
    { what: 'planes without a figure', document: powerDocument({ T1: 'supply' }) },
  ],
  reject: [
    {
      what: 'a load just at the limit as short of room, on rail and return alike, as one finding',
      document: loadOf(11.2),
      findings: [
        {
          severity: 'caution',
          refs: ['W1'],
          words: ['18 AWG', '11.2 A of 11.2 A (100 %)', 'One more conductor'],
          limit: 11.2,
        },
      ],
    },
    {
      what: 'a sustained load over thin wire',
      document: loadOf(5, 'lead-thin'),
      findings: [
        { severity: 'danger', refs: ['W1'], words: ['22 AWG', 'feeds E1', 'thicker wire'], load: 5, limit: 4.9 },
      ],
    },
    {
      what: 'a single wire in free air, where a setting says so',
      document: loadOf(13, 'lead', { bundleFactor: 1 }),
      findings: [{ severity: 'caution', refs: ['W1'], limit: 16 }],
    },
    {
      what: 'two thin leads, each on its own',
      document: powerDocument(
        { T1: 'supply', W1: 'lead-thin', W2: 'lead-thin', E1: 'own', E2: 'own' },
        ['T1.s1 W1.supply', 'W1.out-1 E1.power', 'T1.s2 W2.supply', 'W2.out-1 E2.power'],
        { models: [steadyLoad('own', { '12V': 6 }, 'sata-power-plug')] },
      ),
      findings: [
        { severity: 'danger', refs: ['W1'], load: 6 },
        { severity: 'danger', refs: ['W2'], load: 6 },
      ],
    },
    {
      what: 'four drives that start on a thin lead: 8 A of 4.9 A, past what seconds may take',
      document: powerDocument({ T1: 'supply', W1: 'lead-thin', C1: 'drive', C2: 'drive', C3: 'drive', C4: 'drive' }, [
        'T1.s1 W1.supply',
        ...[1, 2, 3, 4].map((i) => `W1.out-${i} C${i}.plug`),
      ]),
      findings: [
        { severity: 'fault', refs: ['W1'], words: ['supply to out-1', '10.0 A of 4.9 A'], moment: 'cold-start' },
      ],
    },
  ],
})
