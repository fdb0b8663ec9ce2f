import { documentVersion } from './document.ts'

type Raw = Record<string, unknown>

/** Step by step from each older version to the next; `steps[1]` takes version 1 to 2. Empty while there is one version. */
const steps: Readonly<Record<number, (document: Raw) => Raw>> = {}

/** Brings an older document to the current version. The input is not touched. */
export function migrate(document: Raw, from: number): Raw {
  let current = document
  for (let version = from; version < documentVersion; version++) {
    const step = steps[version]
    if (!step) throw new Error(`no migration from document version ${version}`)
    current = { ...step(current), version: version + 1 }
  }
  return current
}
