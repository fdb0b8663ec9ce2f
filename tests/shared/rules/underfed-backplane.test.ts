import { underfedBackplane } from '#shared/rules/underfed-backplane/index.ts'
import { connector, model, planes, powerCatalog as catalog, powerDocument } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

const backplane = model('backplane', {
  kind: 'backplane',
  connectors: [
    connector('power-1', 'bare-plug'),
    connector('power-2', 'bare-plug'),
    connector('bay-1', 'sata-power-receptacle', { bay: 1 }),
    connector('bay-2', 'sata-power-receptacle', { bay: 2 }),
  ],
  wiring: planes([
    ['power-1', 'power-2', 1],
    ['power-1', 'bay-1', 1],
    ['power-2', 'bay-2', 1],
  ]),
})
const placed = (joints: readonly string[], parts: object = {}) =>
  powerDocument({ T1: 'supply', U1: 'backplane', C1: 'drive', ...parts }, joints, { models: [backplane] })

testRule(underfedBackplane, {
  catalog,
  accept: [
    { what: 'both inlets fed', document: placed(['T1.s1 U1.power-1', 'T1.s2 U1.power-2', 'U1.bay-1 C1.plug']) },
    { what: 'a backplane without drives', document: placed(['T1.s1 U1.power-1']) },
  ],
  reject: [
    {
      what: 'one inlet open, though a plane inside reaches it',
      document: placed(['T1.s1 U1.power-1', 'U1.bay-1 C1.plug']),
      findings: [{ severity: 'caution', refs: ['U1'], words: ['power-2 is open', '1 inlet carries'] }],
    },
    {
      what: 'an inlet on a lead that nothing feeds',
      document: powerDocument(
        { T1: 'supply', W1: 'stub', U1: 'backplane', C1: 'drive' },
        ['T1.s1 U1.power-1', 'W1.out-1 U1.power-2', 'U1.bay-1 C1.plug'],
        {
          models: [
            backplane,
            model('stub', {
              kind: 'lead',
              connectors: [connector('in', 'sata-power-plug'), connector('out-1', 'bare-receptacle')],
              wiring: planes([['in', 'out-1', 1]]),
            }),
          ],
        },
      ),
      findings: [{ severity: 'caution', refs: ['U1'], words: ['power-2 is joined to nothing that a supply feeds'] }],
    },
    {
      what: 'no inlet fed, on two backplanes',
      document: powerDocument(
        { T1: 'supply', U1: 'backplane', U2: 'backplane', C1: 'drive', C2: 'drive' },
        ['U1.bay-1 C1.plug', 'U2.bay-1 C2.plug'],
        { models: [backplane] },
      ),
      findings: [
        { severity: 'fault', refs: ['U1'], words: ['None of its inlets is fed'] },
        { severity: 'fault', refs: ['U2'] },
      ],
    },
  ],
})
