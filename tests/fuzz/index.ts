import fc from 'fast-check'
import { fuzzProperties, shippedCatalog } from './properties.ts'

const defaultCases = 1_000_000
/** Cases between two lines of progress. */
const slice = 2_000

/** `npm run fuzz -- [CASES] [SEED]`: spreads the cases over all properties by their weights. */
async function main(): Promise<number> {
  const [cases = defaultCases, seed = Date.now() % 2 ** 31] = process.argv.slice(2).map(Number)
  if (![cases, seed].every((number) => Number.isInteger(number) && number >= 0)) {
    console.error('npm run fuzz -- [CASES] [SEED]: two whole numbers')
    return 2
  }
  const catalog = shippedCatalog()
  const weights = fuzzProperties.reduce((sum, { weight }) => sum + weight, 0)
  let failed = 0
  console.log(`${cases} cases, seed ${seed}`)
  for (const { name, weight, property } of fuzzProperties) {
    const share = Math.max(1, Math.round((cases * weight) / weights))
    const start = performance.now()
    let done = 0
    let slowest_ms = 0
    let failure: string | undefined
    while (done < share && failure === undefined) {
      const count = Math.min(slice, share - done)
      const from = performance.now()
      const outcome = await fc.check(property(catalog), { numRuns: count, seed: (seed + done) | 0 })
      slowest_ms = Math.max(slowest_ms, (performance.now() - from) / count)
      done += count
      if (outcome.failed) failure = `${fc.defaultReportMessage(outcome)}\n${String(outcome.errorInstance)}`
    }
    const seconds = ((performance.now() - start) / 1000).toFixed(0)
    console.log(
      `${failure ? 'FAILED' : 'ok    '} ${name}: ${done} cases in ${seconds} s, slowest mean ${slowest_ms.toFixed(2)} ms`,
    )
    if (failure) {
      failed++
      console.error(failure)
    }
  }
  return failed > 0 ? 1 : 0
}

process.exitCode = await main()
