import { leadTooShort } from '#shared/rules/lead-too-short/index.ts'
import { figure, model, powerCatalog as catalog, powerDocument } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const cable = model('cable', {
  kind: 'cable',
  connectors: [
    { id: 'a', label: 'a', type: 'bare-plug' },
    { id: 'b', label: 'b', type: 'bare-plug' },
  ],
  cable: { length_mm: figure(500) },
})
const routed = (routes_mm: Record<string, number>, modelId = 'lead') =>
  powerDocument({ W1: { model: modelId, routes_mm } }, [], { models: [cable] })

// The lead has four stretches of 50 mm each.
testRule(leadTooShort, {
  catalog,
  accept: [
    { what: 'a route just as long as the lead reaches', document: routed({ 'out-1': 50, 'out-4': 200 }) },
    { what: 'a lead without measured routes', document: powerDocument({ W1: 'lead' }) },
    { what: 'a cable by its stated length', document: routed({ b: 500 }, 'cable') },
  ],
  reject: [
    {
      what: 'a route one millimetre longer',
      document: routed({ 'out-2': 101 }),
      findings: [
        {
          severity: 'fault',
          refs: ['W1'],
          words: ['101 mm', 'reaches 100 mm', '1 mm are missing'],
          load: 101,
          limit: 100,
        },
      ],
    },
    {
      what: 'two outlets that do not reach',
      document: routed({ 'out-1': 60, 'out-4': 1500 }),
      findings: [
        { severity: 'fault', words: ['W1 out-1'] },
        { severity: 'fault', words: ['W1 out-4', '1.5 m'] },
      ],
    },
    { what: 'a data cable', document: routed({ b: 501 }, 'cable'), findings: [{ severity: 'fault', limit: 500 }] },
  ],
})
