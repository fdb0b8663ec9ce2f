import { readFileSync } from 'node:fs'
import { readBuildText } from '#shared/build/read.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { diagramChoices } from '#shared/paper/lid/pages.ts'
import { lidPdf } from '../../server/files/lidPdf.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'
import type { Row } from './measure.ts'

const runs = 7

/** The lid sheet as a PDF, from the document to the last byte: checked, arranged, composed and drawn each time. */
export async function paperRows(): Promise<Row[]> {
  const catalog = indexCatalog(loadCatalogFiles())
  const rows: Row[] = []
  for (const [example, words] of [
    ['north-room', '11 drives'],
    ['stress-60', '67 drives'],
  ] as const)
    for (const diagram of diagramChoices) {
      const read = readBuildText(readFileSync(`examples/${example}/build.json`, 'utf8'), catalog)
      if (!read.ok) throw new Error(`examples/${example} cannot be read`)
      const request = { paper: 'a4', colour: false, diagram, contact: '', address: '', date: '2026-12-01' } as const
      const input = { document: read.document, revision: 1, review: { approval: null, open: null }, request }
      const times: number[] = []
      let size_B = 0
      for (let i = 0; i < runs; i++) {
        const start = performance.now()
        size_B = (await lidPdf(input, catalog)).length
        times.push(performance.now() - start)
      }
      const own_ms = times.sort((a, b) => a - b)[runs >> 1]!
      const beside = `${Math.round(size_B / 1000)} kB; to reach 500 ms`
      rows.push({ what: `PDF lid sheet, ${words}, diagram: ${diagram}`, own_ms, beside })
    }
  return rows
}
