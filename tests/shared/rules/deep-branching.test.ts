import { deepBranching } from '#shared/rules/deep-branching/index.ts'
import { powerCatalog as catalog, powerDocument } from '../../helpers/powerCatalog.ts'
import { testRule } from '../../helpers/testRule.ts'

testRule(deepBranching, {
  catalog,
  accept: [
    {
      what: 'splitters side by side on one lead',
      document: powerDocument({ T1: 'supply', W1: 'lead', W2: 'splitter-2', W3: 'splitter-2' }, [
        'T1.s1 W1.supply',
        'W1.out-1 W2.in',
        'W1.out-2 W3.in',
      ]),
    },
    {
      what: 'splitters joined to each other but fed by nothing',
      document: powerDocument({ W2: 'splitter-2', W3: 'splitter-2' }, ['W2.out-1 W3.in']),
    },
  ],
  reject: [
    {
      what: 'a splitter behind a splitter',
      document: powerDocument({ T1: 'supply', W1: 'lead', W2: 'splitter-2', W3: 'splitter-2' }, [
        'T1.s1 W1.supply',
        'W1.out-1 W2.in',
        'W2.out-1 W3.in',
      ]),
      findings: [{ severity: 'caution', refs: ['W3', 'W2'], words: ['W3 is fed through the splitter W2'] }],
    },
    {
      what: 'three in a row: the second and the third',
      document: powerDocument({ T1: 'supply', W1: 'lead', W2: 'splitter-2', W3: 'splitter-4', W4: 'splitter-2' }, [
        'T1.s1 W1.supply',
        'W1.out-1 W2.in',
        'W2.out-1 W3.in',
        'W3.out-4 W4.in',
      ]),
      findings: [
        { severity: 'caution', refs: ['W3'] },
        { severity: 'caution', refs: ['W4'], words: ['W2 and W3'] },
      ],
    },
  ],
})
