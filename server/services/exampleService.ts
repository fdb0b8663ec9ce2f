import { readBuild } from '#shared/build/read.ts'
import type { Example } from '#shared/contract/catalog.ts'
import { readExamples } from '../files/exampleFiles.ts'
import type { Context } from './context.ts'

/** The examples that a build can be started from. One that the catalog cannot follow is left out. */
export async function listExamples(context: Context): Promise<Example[]> {
  const { index } = await context.catalog.current()
  const examples = await readExamples(context.config.examplesDir)
  return examples.flatMap(({ id, name, summary, document }) => {
    const read = readBuild(document, index)
    if (!read.ok) return []
    const models = new Map(read.document.models.map((model) => [model.id, model]))
    const kind = (model: string) => (models.get(model) ?? index.models.get(model))?.kind
    const drives = read.document.parts.filter((part) => kind(part.model) === 'drive').length
    return [{ id, name, summary, drives }]
  })
}
