import { QueryTypes, type Sequelize, type Transaction } from 'sequelize'
import type { Change, Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { mostFoundDrives, type FoundDrive, type FoundDrives } from '#shared/contract/drives.ts'
import type { Context } from './context.ts'

/**
 * Writes down which drives a new revision has, in its transaction. `edits`: what led to it; where none of them touches
 * a drive's name or place nothing is written. Empty: the whole document is new.
 */
export async function keepDrives(
  database: Sequelize,
  { buildId, document, edits }: { buildId: string; document: BuildDocument; edits: readonly Edit[] },
  transaction: Transaction,
): Promise<void> {
  if (edits.length > 0 && !edits.some(({ changes }) => changes.some(concernsDrives))) return
  const rows = document.parts
    .filter(({ serial, wwn }) => serial !== undefined || wwn !== undefined)
    .map((part) => ({
      part_id: part.id,
      ref: part.ref,
      bay: part.bay?.slot ?? null,
      serial: part.serial ?? '',
      wwn: part.wwn ?? '',
      maker_model: part.makerModel ?? '',
    }))
  await database.query('DELETE FROM build_drives WHERE build_id = $1', { bind: [buildId], transaction })
  if (rows.length === 0) return
  await database.query(
    `INSERT INTO build_drives (build_id, part_id, ref, bay, serial, wwn, maker_model)
     SELECT $1::uuid, * FROM json_to_recordset($2::json)
       AS d(part_id text, ref text, bay integer, serial text, wwn text, maker_model text)`,
    { bind: [buildId, JSON.stringify(rows)], transaction },
  )
}

const fields: readonly string[] = ['serial', 'wwn', 'makerModel', 'ref', 'bay']

function concernsDrives(change: Change): boolean {
  if (change.op === 'addPart') return change.part.serial !== undefined || change.part.wwn !== undefined
  if (change.op === 'updatePart') return Object.keys(change.patch).some((field) => fields.includes(field))
  return change.op === 'removePart'
}

/** Drives of all builds of one's own that are not archived, by any part of serial or WWN. Blanks and case do not count. */
export async function findDrives(
  { database }: Pick<Context, 'database'>,
  userId: string,
  search: string,
): Promise<FoundDrives> {
  const part = search
    .toLowerCase()
    .replace(/\s+|^0x/g, '')
    .replace(/[\\%_]/g, '\\$&')
  const rows = await database.query<FoundDrive>(
    `SELECT b.id AS "buildId", b.name AS "buildName", b.machine, d.part_id AS "partId", d.ref, d.bay, d.serial, d.wwn,
       d.maker_model AS "makerModel"
     FROM build_members m
     JOIN build_drives d ON d.build_id = m.build_id
     JOIN builds b ON b.id = m.build_id
     WHERE m.user_id = $1 AND NOT m.archived
       AND (lower(replace(d.serial, ' ', '')) LIKE $2 OR d.wwn LIKE $2)
     ORDER BY b.name, d.bay NULLS LAST, d.ref LIMIT $3`,
    { bind: [userId, `%${part}%`, mostFoundDrives + 1], type: QueryTypes.SELECT },
  )
  return { items: rows.slice(0, mostFoundDrives), more: rows.length > mostFoundDrives }
}
