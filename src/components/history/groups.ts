import type { changeGroups, ToldChange } from '#shared/build/compareTold.ts'

type Group = (typeof changeGroups)[number]

const titles: readonly [Group, string][] = [
  ['parts', 'Parts'],
  ['bays', 'Bays'],
  ['wiring', 'Wiring'],
  ['details', 'Figures and details'],
  ['settings', 'Build settings'],
  ['models', 'Own models'],
  ['accepted', 'Accepted findings'],
]

export interface ChangeGroup {
  id: Group
  title: string
  changes: ToldChange[]
}

/** Changes under their headings, in the order in which a builder asks; empty headings are left out. */
export function groupChanges(changes: readonly ToldChange[]): ChangeGroup[] {
  const byGroup = new Map<Group, ToldChange[]>()
  for (const change of changes) {
    const list = byGroup.get(change.group)
    if (list) list.push(change)
    else byGroup.set(change.group, [change])
  }
  return titles.flatMap(([id, title]) => {
    const found = byGroup.get(id)
    return found ? [{ id, title, changes: found }] : []
  })
}
