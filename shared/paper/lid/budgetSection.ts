import type { PageMark } from '../page.ts'
import type { LidBudget, LidContent, LidLoad } from './content.ts'
import type { Section } from './strips.ts'
import type { Look } from './style.ts'
import { tableHead, tableRow, wish, type Column } from './table.ts'

/** Load, limit and what is left of every rail and lead, at its worst start and its worst running moment. */
export function budgetSection(look: Look, { budgets, startMoments }: LidContent, width: number): Section[] {
  if (budgets.length === 0) return []
  const { body_pt } = look.density
  const wishes = [
    wish([...budgets.map((budget) => loadWords(budget, budget.start)), 'at start'], body_pt, 700),
    wish(
      budgets.map((budget) => leftWords(budget, budget.start)),
      body_pt,
    ),
    wish([...budgets.map(runningWords), 'running'], body_pt),
    wish(
      budgets.map((budget) => leftWords(budget, budget.running)),
      body_pt,
    ),
  ] as const
  const numbers = wishes.reduce((sum, one) => sum + one, 0)
  const bar = width - numbers > 41 ? 13 : 0
  const withBar = bar > 0
  const name = Math.max(width * 0.24, width - numbers - bar)
  const shrink = Math.min(1, (width - bar - name) / numbers)
  const [atStart, leftAtStart, running, leftRunning] = wishes
  const columns: Column[] = [
    { title: 'Rail or lead', width: name, weight: 600 },
    { title: 'at start', width: atStart * shrink, isRight: true },
    { title: 'left', width: leftAtStart * shrink, isRight: true },
    ...(withBar ? [{ title: 'share', width: bar }] : []),
    { title: 'running', width: running * shrink, isRight: true },
    { title: 'left', width: leftRunning * shrink, isRight: true },
  ]
  return [
    {
      title: `Budgets (start: ${startMoments})`,
      head: tableHead(look, columns),
      strips: budgets.flatMap((budget) => {
        const worst = budget.start ?? budget.running
        const isOver = overOf(budget.start) || overOf(budget.running)
        return tableRow(look, columns, [
          { words: budget.name, isStrong: isOver },
          { words: loadWords(budget, budget.start), isStrong: overOf(budget.start) },
          { words: leftWords(budget, budget.start), isStrong: overOf(budget.start) },
          ...(withBar ? [{ words: '', draw: barOf(look, worst) }] : []),
          { words: runningWords(budget), isStrong: overOf(budget.running) },
          { words: leftWords(budget, budget.running), isStrong: overOf(budget.running) },
        ])
      }),
    },
  ]
}

const number = (value: number, unit: LidBudget['unit']): string => value.toFixed(unit === 'W' ? 0 : 1)

export const overOf = (load: LidLoad | null): boolean => load !== null && load.limit !== null && load.load > load.limit

/** "about 8.0 of 4.5 A" */
export function loadWords({ unit, about }: LidBudget, load: LidLoad | null): string {
  if (!load) return '-'
  const limit = load.limit === null ? '?' : number(load.limit, unit)
  return `${about ? 'about\u00a0' : ''}${number(load.load, unit)} of\u00a0${limit}\u00a0${unit}`
}

/** The limit is said again only where it is another one, as a peak allowed at start. */
function runningWords(budget: LidBudget): string {
  const { start, running, unit, about } = budget
  if (!start || !running || running.limit === null || running.limit !== start.limit) return loadWords(budget, running)
  return `${about ? 'about\u00a0' : ''}${number(running.load, unit)}\u00a0${unit}`
}

/** "3.5 A", "over by 0.5 A", "limit unknown" */
export function leftWords({ unit }: LidBudget, load: LidLoad | null): string {
  if (!load) return ''
  if (load.limit === null) return 'unknown'
  const left = load.limit - load.load
  return left < 0 ? `over\u00a0${number(-left, unit)}\u00a0${unit}` : `${number(left, unit)}\u00a0${unit}`
}

/** How much of the limit is used; what is over it runs out of the frame, hatched. */
function barOf(look: Look, load: LidLoad | null) {
  return (x: number, y: number, width: number, height: number): PageMark[] => {
    if (!load || load.limit === null || load.limit === 0) return []
    const room = width * 0.8
    const share = load.load / load.limit
    const isOver = share > 1
    const bar = { y: y + height * 0.22, height: height * 0.5 }
    return [
      {
        kind: 'box',
        x,
        ...bar,
        width: Math.min(width, room * Math.min(share, 1.25)),
        fill: isOver ? look.inks.danger : look.inks.ink,
      },
      { kind: 'box', x, ...bar, width: room, stroke: look.inks.ink, stroke_mm: 0.2 },
      ...(isOver
        ? [
            {
              kind: 'line' as const,
              x1: x + room,
              y1: bar.y - 0.5,
              x2: x + room,
              y2: bar.y + bar.height + 0.5,
              width_mm: 0.5,
              colour: look.inks.ink,
            },
          ]
        : []),
    ]
  }
}
