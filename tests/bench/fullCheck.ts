import { readFileSync } from 'node:fs'
import type { BuildDocument } from '#shared/build/document.ts'
import { readBuildText } from '#shared/build/read.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'
import { median_ms, type Row } from './measure.ts'

const catalog = indexCatalog(loadCatalogFiles())

function readExample(id: string): BuildDocument {
  const read = readBuildText(readFileSync(new URL(`../../examples/${id}/build.json`, import.meta.url), 'utf8'), catalog)
  if (!read.ok) throw new Error(JSON.stringify(read.problems))
  return read.document
}

/** The same machine so many times in one document, every copy with ids and designations of its own. */
function copies({ parts, joints, ...rest }: BuildDocument, count: number): BuildDocument {
  const each = Array.from({ length: count }, (_, copy) => copy)
  const id = (copy: number, own: string) => `${own}-${copy}`
  return {
    ...rest,
    parts: each.flatMap((copy) =>
      parts.map((part) => ({
        ...part,
        id: id(copy, part.id),
        ref: part.ref.replace(/\d+/, (number) => String(Number(number) + copy * 1000)),
        ...(part.bay ? { bay: { ...part.bay, case: id(copy, part.bay.case) } } : {}),
      })),
    ),
    joints: each.flatMap((copy) =>
      joints.map((joint) => ({
        id: id(copy, joint.id),
        a: { ...joint.a, part: id(copy, joint.a.part) },
        b: { ...joint.b, part: id(copy, joint.b.part) },
      })),
    ),
  }
}

/** Full check of a build, all rules and all moments: growth with size. */
export function fullCheckRows(): Row[] {
  const vault = readExample('stress-60')
  const sizes: [BuildDocument, number][] = [
    [vault, 61],
    [copies(vault, 4), 31],
    [copies(vault, 35), 7],
  ]
  let before: { parts: number; own_ms: number } | null = null
  return sizes.map(([document, runs]) => {
    const parts = document.parts.length
    const drives = parts === vault.parts.length ? ', 67 drives' : ''
    const own_ms = median_ms(() => check(document, catalog), runs)
    const growth = before
      ? `${(own_ms / before.own_ms).toFixed(1)} times the time for ${(parts / before.parts).toFixed(1)} times the parts`
      : ''
    before = { parts, own_ms }
    return { what: `full check, ${parts} parts${drives}`, own_ms, beside: growth }
  })
}
