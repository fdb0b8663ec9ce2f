import { QueryTypes, type Sequelize } from 'sequelize'
import type { z } from 'zod'
import type { BuildDocument } from '#shared/build/document.ts'
import type { BuildList, BuildRole, BuildSummary, listBuildsQuerySchema } from '#shared/contract/build.ts'
import type { Severity } from '#shared/check/severity.ts'

interface SummaryRow {
  id: string
  name: string
  machine: string | null
  revision: number
  drives: number
  parts: number
  worst: Severity | null
  dangers: number
  faults: number
  cautions: number
  notes: number
  checked: boolean
  changed_at: Date
  changed_by: string | null
  archived: boolean
  role: BuildRole
  people: { name: string; role: BuildRole }[]
}

/** Columns of a summary, where `b` is the build and `p.role` the reader's role. */
const summaryColumns = `
  b.id, b.name, b.machine, b.revision, b.drives, b.parts, b.worst, b.dangers, b.faults, b.cautions, b.notes,
  b.checked_revision = b.revision AS checked, b.changed_at, b.archived_at IS NOT NULL AS archived, p.role,
  (SELECT u.name FROM users u WHERE u.id = b.changed_by) AS changed_by,
  (SELECT json_agg(json_build_object('name', u.name, 'role', o.role)
                   ORDER BY array_position(ARRAY['owner', 'editor', 'reviewer', 'reader'], o.role), u.name)
   FROM (SELECT user_id, role FROM build_members WHERE build_id = b.id LIMIT 50) o
   JOIN users u ON u.id = o.user_id) AS people`

const orders: Readonly<Record<BuildListQuery['sort'], string>> = {
  changed: 'changed_at DESC, build_id',
  name: 'name_key, build_id',
  worst: 'worst_rank, changed_at DESC, build_id',
  drives: 'drives DESC, changed_at DESC, build_id',
}

export type BuildListQuery = z.output<typeof listBuildsQuerySchema>

/** One person's builds: a page in the order asked for, and how many there are, in one query. */
export async function listBuilds(database: Sequelize, userId: string, query: BuildListQuery): Promise<BuildList> {
  const { page, pageSize, search } = query
  const wanted = `user_id = $1 AND archived = $2 ${search ? 'AND search_text LIKE $5' : ''}`
  const rows = await database.query<SummaryRow & { total: number; id: string | null }>(
    `SELECT t.total, s.*
     FROM (SELECT count(*)::int AS total FROM build_members WHERE ${wanted}) t
     LEFT JOIN (
       SELECT p.place, ${summaryColumns}
       FROM (
         SELECT build_id, role, row_number() OVER (ORDER BY ${orders[query.sort]}) AS place
         FROM build_members WHERE ${wanted} ORDER BY ${orders[query.sort]} LIMIT $3 OFFSET $4
       ) p JOIN builds b ON b.id = p.build_id
     ) s ON true
     ORDER BY s.place`,
    {
      bind: [
        userId,
        query.archived === 'yes',
        pageSize,
        (page - 1) * pageSize,
        ...(search ? [likePattern(search)] : []),
      ],
      type: QueryTypes.SELECT,
    },
  )
  const items = rows.filter((row) => row.id !== null).map(toSummary)
  return { items, total: rows[0]?.total ?? 0, page, pageSize }
}

/** One build as its member sees it; null where they are none. */
export async function findSummary(database: Sequelize, buildId: string, userId: string): Promise<BuildSummary | null> {
  const rows = await database.query<SummaryRow>(
    `SELECT ${summaryColumns}
     FROM build_members p JOIN builds b ON b.id = p.build_id WHERE p.build_id = $1 AND p.user_id = $2`,
    { bind: [buildId, userId], type: QueryTypes.SELECT },
  )
  return rows[0] ? toSummary(rows[0]) : null
}

/** As `findSummary`, with the newest document, both of one moment. */
export async function findOpenBuild(
  database: Sequelize,
  buildId: string,
  userId: string,
): Promise<(BuildSummary & { document: BuildDocument }) | null> {
  const rows = await database.query<SummaryRow & { document: BuildDocument }>(
    `SELECT ${summaryColumns}, r.document
     FROM build_members p JOIN builds b ON b.id = p.build_id
     JOIN build_revisions r ON r.build_id = b.id AND r.revision = b.revision
     WHERE p.build_id = $1 AND p.user_id = $2`,
    { bind: [buildId, userId], type: QueryTypes.SELECT },
  )
  return rows[0] ? { ...toSummary(rows[0]), document: rows[0].document } : null
}

const toSummary = (row: SummaryRow): BuildSummary => ({
  id: row.id,
  name: row.name,
  machine: row.machine,
  revision: row.revision,
  drives: row.drives,
  parts: row.parts,
  worst: row.worst,
  counts: { danger: row.dangers, fault: row.faults, caution: row.cautions, note: row.notes },
  checked: row.checked,
  changedAt: row.changed_at.toISOString(),
  changedBy: row.changed_by,
  archived: row.archived,
  role: row.role,
  people: row.people,
})

/** A pattern that finds the text anywhere, with the pattern signs in it taken as they are. */
const likePattern = (text: string): string => `%${text.toLowerCase().replace(/[\\%_]/g, '\\$&')}%`
