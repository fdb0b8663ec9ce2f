import { indexCatalog, type CatalogIndex } from '#shared/catalog/catalog.ts'
import { lidPdf } from '../files/lidPdf.ts'
import type { PaperAnswer, PaperTask } from '../services/paperService.ts'

/** The program that the paper service runs beside the server: makes one PDF after the other, ends with its parent. */
let index: CatalogIndex | undefined
let last: Promise<void> = Promise.resolve()
const dropped = new Set<number>()

process.on('message', (task: PaperTask) => {
  if ('drop' in task) {
    dropped.add(task.drop)
    return
  }
  if (task.catalog) index = indexCatalog(task.catalog)
  const catalog = index
  last = last.then(() => new Promise((next) => setImmediate(next))).then(() => make(task, catalog))
})

async function make(task: Exclude<PaperTask, { drop: number }>, catalog: CatalogIndex | undefined): Promise<void> {
  if (dropped.delete(task.id)) return
  let answer: PaperAnswer
  try {
    if (!catalog) throw new Error('no catalog was given')
    answer = { id: task.id, pdf: await lidPdf(task.input, catalog) }
  } catch (error) {
    answer = { id: task.id, error: error instanceof Error ? (error.stack ?? error.message) : String(error) }
  }
  process.send?.(answer)
}

process.on('disconnect', () => process.exit())
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => {})
