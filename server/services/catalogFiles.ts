import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { z } from 'zod'
import { problemsOf } from '#shared/build/problems.ts'
import type { Catalog } from '#shared/catalog/catalog.ts'
import { connectorTypeSchema } from '#shared/catalog/connectorType.ts'
import { modelClassSchema, modelKinds, modelSchema, type Model } from '#shared/catalog/model.ts'
import { catalogProblems } from '#shared/catalog/problems.ts'
import { sourceSchema } from '#shared/catalog/source.ts'

/** Where the shipped catalog lies. */
export const catalogFolder = fileURLToPath(new URL('../../catalog', import.meta.url))

/** Thrown where the catalog folder does not hold a sound catalog. `problems` are lines of "file: path: what". */
export class CatalogFilesError extends Error {
  readonly problems: readonly string[]
  constructor(problems: readonly string[]) {
    super(`The catalog has ${problems.length} problem(s):\n${problems.slice(0, 20).join('\n')}`)
    this.name = 'CatalogFilesError'
    this.problems = problems
  }
}

const cache = new Map<string, Catalog>()

/**
 * Reads, parses and checks the catalog folder, once a process.
 * @throws CatalogFilesError naming each file and the path in it.
 */
export function loadCatalogFiles(folder: string = catalogFolder): Catalog {
  const known = cache.get(folder)
  if (known) return known
  const problems: string[] = []
  const catalog: Catalog = {
    connectorTypes: readFolder(join(folder, 'connectors'), 'connectors', connectorTypeSchema, problems),
    classes: readFile(join(folder, 'classes.json'), 'classes.json', z.array(modelClassSchema), problems) ?? [],
    models: readModels(join(folder, 'models'), problems),
    sources: readFile(join(folder, 'sources.json'), 'sources.json', z.array(sourceSchema), problems) ?? [],
  }
  if (problems.length === 0)
    for (const problem of catalogProblems(catalog)) problems.push(`${problem.path}: ${problem.message}`)
  if (problems.length > 0) throw new CatalogFilesError(problems)
  cache.set(folder, catalog)
  return catalog
}

function readModels(folder: string, problems: string[]): Model[] {
  return modelKinds.flatMap((kind) => {
    const models = readFolder(join(folder, kind), `models/${kind}`, modelSchema, problems)
    for (const model of models)
      if (model.kind !== kind)
        problems.push(`models/${kind}/${model.id}.json: kind: a ${model.kind} belongs in models/${model.kind}`)
    return models
  })
}

/** All JSON files of a folder in the order of their names; each file is named after the id that it holds. */
function readFolder<T extends { id: string }>(
  folder: string,
  shown: string,
  schema: z.ZodType<T>,
  problems: string[],
): T[] {
  const names = readNames(folder, shown, problems)
  return names.flatMap((name) => {
    const item = readFile(join(folder, name), `${shown}/${name}`, schema, problems)
    if (item && `${item.id}.json` !== name) problems.push(`${shown}/${name}: id: the file should be ${item.id}.json`)
    return item ? [item] : []
  })
}

function readNames(folder: string, shown: string, problems: string[]): string[] {
  try {
    return readdirSync(folder)
      .filter((name) => name.endsWith('.json'))
      .sort()
  } catch {
    problems.push(`${shown}: this folder is missing`)
    return []
  }
}

function readFile<T>(path: string, shown: string, schema: z.ZodType<T>, problems: string[]): T | undefined {
  let input: unknown
  try {
    input = JSON.parse(readFileSync(path, 'utf8'))
  } catch (error) {
    problems.push(`${shown}: ${error instanceof Error ? error.message : 'unreadable'}`)
    return undefined
  }
  const parsed = schema.safeParse(input)
  if (parsed.success) return parsed.data
  for (const problem of problemsOf(parsed.error)) problems.push(`${shown}: ${problem.path}: ${problem.message}`)
  return undefined
}
