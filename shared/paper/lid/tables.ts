import type { LidBudget, LidContent, LidLoad } from './content.ts'

/** A table to take elsewhere: names of its columns, then its rows. */
export type Table = (string | number | null)[][]

/** The tables of a lid sheet, by the name that a file of each gets. */
export const tableNames = ['drives', 'budgets', 'findings'] as const
export type TableName = (typeof tableNames)[number]

export function tableOf(name: TableName, content: LidContent): Table {
  switch (name) {
    case 'drives':
      return driveTable(content)
    case 'budgets':
      return budgetTable(content)
    case 'findings':
      return findingTable(content)
  }
}

const driveTable = ({ drives }: LidContent): Table => [
  ['Bay', 'Drive', 'Serial', 'Capacity', 'Role', 'Model', 'Power', 'Data'],
  ...drives.map(({ bay, ref, serial, capacity, role, model, power, data }) => [
    bay,
    ref,
    serial,
    capacity,
    role,
    model,
    power,
    data,
  ]),
]

const budgetTable = ({ budgets }: LidContent): Table => [
  [
    'Rail or lead',
    'Unit',
    'At start',
    'Limit at start',
    'Left at start',
    'Moment of start',
    'Running',
    'Limit running',
    'Left running',
    'Moment running',
    'Rests on a guess',
  ],
  ...budgets.map((budget) => [
    budget.name,
    budget.unit,
    ...loadCells(budget, budget.start),
    ...loadCells(budget, budget.running),
    budget.about ? 'yes' : 'no',
  ]),
]

function loadCells({ unit }: LidBudget, load: LidLoad | null): (string | number | null)[] {
  if (!load) return [null, null, null, null]
  const round = (value: number | null) => (value === null ? null : Number(value.toFixed(unit === 'W' ? 0 : 2)))
  const left = load.limit === null ? null : load.limit - load.load
  return [round(load.load), round(load.limit), round(left), load.moment]
}

const findingTable = ({ open, accepted }: LidContent): Table => [
  ['Severity', 'Finding', 'Accepted'],
  ...[...open, ...accepted].map((finding) => [finding.severity, finding.message, finding.accepted]),
]
