import { QueryTypes, type Sequelize } from 'sequelize'
import type { z } from 'zod'
import type { BuildDocument } from '#shared/build/document.ts'
import type { BuildList, BuildRole, BuildSummary, listBuildsQuerySchema } from '#shared/contract/build.ts'
import type { Guest } from '#shared/contract/guest.ts'
import type { ReviewState } from '#shared/contract/reviewState.ts'
import type { Severity } from '#shared/check/severity.ts'
import type { KnownGuest } from './guestService.ts'

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
  approval: ReviewState['approval']
  round: ReviewState['open']
}

/** Columns of a summary, where `b` is the build and `p.role` the reader's role. */
const summaryColumns = `
  b.id, b.name, b.machine, b.revision, b.drives, b.parts, b.worst, b.dangers, b.faults, b.cautions, b.notes,
  b.checked_revision = b.revision AS checked, b.changed_at, b.archived_at IS NOT NULL AS archived, p.role,
  (SELECT u.name FROM users u WHERE u.id = b.changed_by) AS changed_by,
  (SELECT json_agg(json_build_object('name', u.name, 'role', o.role)
                   ORDER BY array_position(ARRAY['owner', 'editor', 'reviewer', 'reader'], o.role), u.name)
   FROM (SELECT user_id, role FROM build_members WHERE build_id = b.id LIMIT 50) o
   JOIN users u ON u.id = o.user_id) AS people,
  (SELECT json_build_object(
     'round', r.number, 'revision', r.revision, 'at', to_json(r.approved_at), 'lapsedRevision', r.lapsed_revision,
     'by', (SELECT coalesce(json_agg(json_build_object('name', coalesce(u.name, g.name, 'former member'),
                                                       'guest', v.guest_id IS NOT NULL) ORDER BY v.given_at), '[]')
            FROM verdicts v LEFT JOIN users u ON u.id = v.user_id LEFT JOIN guests g ON g.id = v.guest_id
            WHERE v.round_id = r.id AND v.verdict = 'approve'))
   FROM rounds r WHERE r.build_id = b.id AND r.approved_at IS NOT NULL AND r.state <> 'withdrawn'
   ORDER BY r.number DESC LIMIT 1) AS approval,
  (SELECT json_build_object(
     'round', r.number, 'revision', r.revision,
     'changesAsked', EXISTS (SELECT FROM verdicts v WHERE v.round_id = r.id AND v.verdict = 'ask-for-changes'))
   FROM rounds r WHERE r.build_id = b.id AND r.state = 'open' AND r.approved_at IS NULL) AS round`

const orders: Readonly<Record<BuildListQuery['sort'], string>> = {
  changed: 'changed_at DESC, build_id',
  name: 'name_key, build_id',
  worst: 'worst_rank, changed_at DESC, build_id',
  drives: 'drives DESC, changed_at DESC, build_id',
}

/** A build and its newest document, for who looks at it. */
export type OpenBuild = Omit<BuildSummary, 'role'> & {
  role: BuildRole | null
  guest: Guest | null
  document: BuildDocument
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

/** The newest state of a build, as somebody in it sees it; a guest has no role. */
export async function findOpenBuild(
  database: Sequelize,
  buildId: string,
  reader: { userId: string } | { guest: KnownGuest },
): Promise<OpenBuild | null> {
  const isGuest = 'guest' in reader
  const seat = isGuest
    ? 'builds b CROSS JOIN (SELECT NULL AS role) p'
    : 'build_members p JOIN builds b ON b.id = p.build_id'
  const rows = await database.query<SummaryRow & { document: BuildDocument }>(
    `SELECT ${summaryColumns}, r.document
     FROM ${seat}
     JOIN build_revisions r ON r.build_id = b.id AND r.revision = b.revision
     WHERE b.id = $1 ${isGuest ? '' : 'AND p.user_id = $2'}`,
    { bind: isGuest ? [buildId] : [buildId, reader.userId], type: QueryTypes.SELECT },
  )
  if (!rows[0]) return null
  const guest = isGuest ? { id: reader.guest.id, name: reader.guest.name, right: reader.guest.right } : null
  return { ...toSummary(rows[0]), role: isGuest ? null : rows[0].role, guest, document: rows[0].document }
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
  review: {
    approval: row.approval && { ...row.approval, at: new Date(row.approval.at).toISOString() },
    open: row.round,
  },
})

/** A pattern that finds the text anywhere, with the pattern signs in it taken as they are. */
const likePattern = (text: string): string => `%${text.toLowerCase().replace(/[\\%_]/g, '\\$&')}%`
