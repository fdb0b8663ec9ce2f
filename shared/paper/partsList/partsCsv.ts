import type { ResolvedBuild } from '../../build/resolve.ts'
import type { Finding } from '../../check/result.ts'
import { csvOf } from '../csv.ts'
import { lineCautions } from './cautions.ts'
import { connectorWords } from './connectorCounts.ts'
import type { PartsList } from './partsList.ts'

const head = [
  'kind',
  'name',
  'model',
  'length mm',
  'connectors',
  'designations',
  'needed',
  'owned',
  'ordered',
  'to buy',
  'price for one',
  'currency',
  'supplier note',
  'cautions',
]

/** The parts list as a table for a spreadsheet. */
export function partsCsv(list: PartsList, build: ResolvedBuild, findings: readonly Finding[]): string {
  return csvOf([
    head,
    ...list.lines.map((line) => [
      line.kind,
      line.name,
      line.model,
      line.length_mm,
      connectorWords(line.connectors),
      line.refs.join(' '),
      line.needed,
      line.purchase?.owned ?? null,
      line.purchase?.ordered ?? null,
      line.toBuy,
      line.purchase?.price ?? null,
      line.purchase?.currency ?? null,
      line.purchase?.note ?? null,
      lineCautions(line, build, findings).join(' '),
    ]),
  ])
}
