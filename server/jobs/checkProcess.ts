import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import type { CheckAnswer, CheckTask } from '../services/checkService.ts'

/** The program that the check service runs beside the server: checks what it is sent, ends with its parent. */
let index: CatalogIndex | undefined

process.on('message', ({ id, document, catalog }: CheckTask) => {
  if (catalog) index = indexCatalog(catalog)
  let answer: CheckAnswer
  try {
    if (!index) throw new Error('no catalog was given')
    answer = { id, result: check(document, index) }
  } catch (error) {
    answer = { id, error: error instanceof Error ? (error.stack ?? error.message) : String(error) }
  }
  process.send?.(answer)
})
process.on('disconnect', () => process.exit())
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => {})
