import { defineAsyncComponent, type Component } from 'vue'

/**
 * A face of an opened build. Its component is loaded when it is first shown, gets what it needs from `useOpenBuild` and
 * the stores, and may emit `show` to lead back to the sheet. Wiring and findings have none: the view draws them.
 */
interface Face {
  id: string
  label: string
  /** Stands in the menu of this name instead of in the row. */
  menu?: 'Papers'
  /** Only on a phone: elsewhere it is a panel beside the sheet. */
  isForPhone?: true
  component?: Component
}

/** Adding a face is one line here. */
const faces = [
  { id: 'wiring', label: 'Wiring' },
  { id: 'ledger', label: 'Ledger', component: defineAsyncComponent(() => import('../ledger/PowerLedger.vue')) },
  { id: 'joints', label: 'Joints', component: defineAsyncComponent(() => import('./JointsTable.vue')) },
  { id: 'findings', label: 'Findings' },
  { id: 'bays', label: 'Bays', component: defineAsyncComponent(() => import('../drives/BayList.vue')) },
  {
    id: 'comments',
    label: 'Comments',
    isForPhone: true,
    component: defineAsyncComponent(() => import('../comments/CommentsFace.vue')),
  },
  { id: 'history', label: 'History', component: defineAsyncComponent(() => import('../history/BuildHistory.vue')) },
  { id: 'review', label: 'Review', component: defineAsyncComponent(() => import('../review/ReviewFace.vue')) },
  {
    id: 'lid',
    label: 'Lid sheet',
    menu: 'Papers',
    component: defineAsyncComponent(() => import('../lid/LidFace.vue')),
  },
  {
    id: 'drives',
    label: 'Drives',
    menu: 'Papers',
    component: defineAsyncComponent(() => import('../drives/DrivesFace.vue')),
  },
  {
    id: 'labels',
    label: 'Labels',
    menu: 'Papers',
    component: defineAsyncComponent(() => import('../labels/LabelsFace.vue')),
  },
  {
    id: 'parts',
    label: 'Parts list',
    menu: 'Papers',
    component: defineAsyncComponent(() => import('../parts/PartsFace.vue')),
  },
] as const satisfies readonly Face[]

export type Show = (typeof faces)[number]['id']
export type ShownFace = Face & { id: Show }

/** On a phone the lists come first: the sheet is there to look at. */
const firstOnPhone: readonly Show[] = ['findings', 'joints', 'bays', 'comments', 'review', 'ledger', 'wiring']

/** The faces in their order, for a wide window or for a phone. */
export function showsOf(isNarrow: boolean): readonly ShownFace[] {
  const all: readonly ShownFace[] = faces
  if (!isNarrow) return all.filter((face) => !face.isForPhone)
  const first = firstOnPhone.flatMap((id) => all.find((face) => face.id === id) ?? [])
  return [...first, ...all.filter((face) => !first.includes(face))]
}
