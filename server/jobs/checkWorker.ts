import { parentPort } from 'node:worker_threads'
import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import type { CheckAnswer, CheckTask } from '../services/checkService.ts'

let index: CatalogIndex | undefined

parentPort?.on('message', ({ id, document, catalog }: CheckTask) => {
  if (catalog) index = indexCatalog(catalog)
  let answer: CheckAnswer
  try {
    if (!index) throw new Error('no catalog was given')
    answer = { id, result: check(document, index) }
  } catch (error) {
    answer = { id, error: error instanceof Error ? (error.stack ?? error.message) : String(error) }
  }
  parentPort?.postMessage(answer)
})
