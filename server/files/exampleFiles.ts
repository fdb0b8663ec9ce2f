import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'

/** An example build as it lies on the disk; the document is not read yet. */
export interface ExampleFile {
  id: string
  name: string
  /** First line of its README. */
  summary: string
  document: unknown
}

const idPattern = /^[a-z0-9][a-z0-9-]{0,59}$/

/** Every example in the folder, by id. Folders without a readable `build.json` are passed over. */
export async function readExamples(folder: string): Promise<ExampleFile[]> {
  const names = await readdir(folder).catch(() => [])
  const examples = await Promise.all(names.sort().map((name) => readExample(folder, name)))
  return examples.filter((example) => example !== null)
}

/** One example; null where there is none of that id. */
export async function readExample(folder: string, id: string): Promise<ExampleFile | null> {
  if (!idPattern.test(id)) return null
  try {
    const [text, readme] = await Promise.all([
      readFile(join(folder, id, 'build.json'), 'utf8'),
      readFile(join(folder, id, 'README.md'), 'utf8').catch(() => ''),
    ])
    const document: unknown = JSON.parse(text)
    return { id, name: nameOf(document) ?? id, summary: firstLine(readme), document }
  } catch {
    return null
  }
}

const nameOf = (document: unknown): string | null =>
  typeof document === 'object' && document !== null && 'name' in document && typeof document.name === 'string'
    ? document.name
    : null

/** The first line that says something, without the marks of a heading. */
function firstLine(readme: string): string {
  const line = readme.split('\n').find((text) => text.trim() !== '') ?? ''
  return line.replace(/^#+\s*/, '').trim()
}
