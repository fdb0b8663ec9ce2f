const width = 10

/** @param {number} from milliseconds of `performance.now()` */
const seconds = (from) => `${((performance.now() - from) / 1000).toFixed(1)} s`

/** One plain line of progress. @param {string} name @param {string} text */
export const tell = (name, text) => console.log(`  ${name.padEnd(width)} ${text}`)

/**
 * Runs one step: lines while it works, then its outcome and how long it took.
 * @template T
 * @param {string} name
 * @param {(say: (text: string) => void) => Promise<{ outcome: string, value?: T }>} work
 */
export const step = async (name, work) => {
  const from = performance.now()
  const { outcome, value } = await work((text) => tell(name, text))
  tell(name, `${outcome} (${seconds(from)})`)
  return /** @type {T} */ (value)
}
