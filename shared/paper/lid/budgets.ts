import { compareRefs } from '../../build/refOrder.ts'
import type { ResolvedBuild } from '../../build/resolve.ts'
import type { CheckResult, LedgerRow, MomentId } from '../../check/result.ts'
import { momentName } from '../../electrical/names.ts'
import { isStart } from '../../electrical/tolerance.ts'
import { refRanges } from '../diagram/partsBlock.ts'
import type { LidBudget, LidLoad } from './content.ts'

/** A row of the ledger at all its moments. */
interface Series {
  name: string
  rows: LedgerRow[]
}

/** Parts whose most loaded hop stands on the sheet. */
const carriers = new Set(['lead', 'splitter', 'adapter', 'breakout', 'cable'])

/** Rails and supplies first, then each lead and splitter by its weakest hop. Parts that carry alike share one line. */
export function budgetsOf(build: ResolvedBuild, result: CheckResult): LidBudget[] {
  const applying = new Set(result.moments.filter(({ applies }) => applies).map(({ moment }) => moment))
  const rows = result.ledger.filter(({ moment, unit }) => applying.has(moment) && unit !== 'V')
  const supplies = seriesOf(rows.filter(({ kind }) => kind === 'rail' || kind === 'group' || kind === 'supply'))
  return [...supplies.map((series) => budgetOf(supplyName(series), series)), ...leadBudgets(build, rows)]
}

const supplyName = ({ name, rows }: Series): string => (rows[0]?.kind === 'supply' ? `${name}, all rails` : name)

function seriesOf(rows: readonly LedgerRow[]): Series[] {
  const all = new Map<string, Series>()
  for (const row of rows) {
    const { subject } = row
    const key = [row.kind, subject.part, subject.joint, subject.conductor, subject.rail, row.rail, row.name].join('|')
    const known = all.get(key)
    if (known) known.rows.push(row)
    else all.set(key, { name: row.name, rows: [row] })
  }
  return [...all.values()]
}

const shareOf = ({ share }: LedgerRow): number => share ?? -1

/** The row nearest its limit; of those without a limit the most loaded. */
function worstOf(rows: readonly LedgerRow[]): LedgerRow | undefined {
  let worst: LedgerRow | undefined
  for (const row of rows)
    if (!worst || shareOf(row) > shareOf(worst) || (shareOf(row) === shareOf(worst) && row.load > worst.load))
      worst = row
  return worst
}

const loadOf = (row: LedgerRow | undefined): LidLoad | null =>
  row ? { load: row.load, limit: row.limit, moment: momentName[row.moment] } : null

function budgetOf(name: string, { rows }: Series): LidBudget {
  return {
    name,
    start: loadOf(worstOf(rows.filter(({ moment }) => isStart(moment)))),
    running: loadOf(worstOf(rows.filter(({ moment }) => !isStart(moment)))),
    unit: rows[0]?.unit === 'W' ? 'W' : 'A',
    about: rows.some(({ about }) => about),
  }
}

function leadBudgets(build: ResolvedBuild, rows: readonly LedgerRow[]): LidBudget[] {
  const byPart = new Map<string, LedgerRow[]>()
  const put = (id: string | undefined, row: LedgerRow) => {
    const part = id === undefined ? undefined : build.partById.get(id)
    if (!part || !carriers.has(part.model.kind)) return
    const list = byPart.get(part.part.id)
    if (list) list.push(row)
    else byPart.set(part.part.id, [row])
  }
  for (const row of rows) {
    if (row.rail === 'return') continue
    if (row.kind === 'wire') put(row.subject.part, row)
    const joint = row.kind === 'contact' ? build.jointById.get(row.subject.joint ?? '') : undefined
    if (joint) for (const end of [joint.a, joint.b]) put(end.part.part.id, row)
  }

  const lines = new Map<string, { budget: LidBudget; refs: string[]; hop: string }>()
  const parts = [...byPart.keys()].flatMap((id) => build.partById.get(id) ?? [])
  for (const { part, model } of parts.sort((a, b) => compareRefs(a.part.ref, b.part.ref))) {
    const series = seriesOf(byPart.get(part.id) ?? [])
    const chosen = strongest(series)
    if (!chosen || chosen.rows.every(({ load }) => load < 0.05)) continue
    const budget = budgetOf(part.ref, chosen)
    const hop = hopWords(chosen, part.ref)
    const key = [model.id, hop, ...numbersOf(budget)].join('|')
    const known = lines.get(key)
    if (known) known.refs.push(part.ref)
    else lines.set(key, { budget, refs: [part.ref], hop })
  }
  return [...lines.values()].map(({ budget, refs, hop }) => ({ ...budget, name: `${shortRanges(refs)}${hop}` }))
}

/** Many that are not in a row are named by the first and the last. */
function shortRanges(refs: readonly string[]): string {
  const words = refRanges(refs)
  return words.split(', ').length <= 6 ? words : `${refs[0]} to ${refs.at(-1)} (${refs.length} of them)`
}

/** The hop that comes nearest its limit at any moment. */
function strongest(series: readonly Series[]): Series | undefined {
  const worst = worstOf(series.flatMap(({ rows }) => worstOf(rows) ?? []))
  return series.find(({ rows }) => worst !== undefined && rows.includes(worst))
}

/** " in, 12 V" of "W1 in, 12 V"; of a hop that another part's plug limits, its rail. */
function hopWords({ name, rows }: Series, ref: string): string {
  if (name.startsWith(`${ref} `)) return name.slice(ref.length)
  const rail = rows[0]?.rail?.replace('V', ' V')
  return rail ? `, ${rail}` : ''
}

const rounded = (load: LidLoad | null): string => (load ? `${load.load.toFixed(1)}/${load.limit?.toFixed(1)}` : '')
const numbersOf = ({ start, running }: LidBudget): string[] => [rounded(start), rounded(running)]

/** "worst of cold start and wake" */
export function startMomentWords(result: CheckResult): string {
  const names = result.moments.filter(({ applies, moment }) => applies && isStart(moment as MomentId))
  if (names.length === 0) return 'no motor starts'
  const words = names.map(({ label }) => label.toLowerCase())
  return words.length === 1 ? words.join('') : `worst of ${words.join(' and ')}`
}
