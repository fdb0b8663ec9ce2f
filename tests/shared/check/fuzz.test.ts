import fc from 'fast-check'
import { describe, it } from 'vitest'
import { fuzzProperties, shippedCatalog } from '../../fuzz/properties.ts'

const catalog = shippedCatalog()
const cases = 60

describe('whatever comes (a small share of `npm run fuzz`)', () => {
  it.each(fuzzProperties)('$name', async ({ property, weight }) => {
    await fc.assert(property(catalog), { numRuns: cases * weight })
  })
})
