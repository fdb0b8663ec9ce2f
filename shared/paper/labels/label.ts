import type { Weight } from '../text/notoSans.ts'

/** What a label is stuck on. */
export const labelGroups = ['power', 'data', 'tray', 'spare'] as const
export type LabelGroup = (typeof labelGroups)[number]

/** One statement of a label; it may run on over several rows. */
export interface LabelLine {
  text: string
  weight: Weight
  /** Size against the smallest type of the label. */
  scale: number
}

/** One label as words: where it is stuck and what it says, before any sheet is chosen. */
export interface Label {
  /** Stays the same while the thing that is labelled stays: "w8#leg-1", "tray:c3". */
  id: string
  group: LabelGroup
  /** Name of the end or thing, as "W8 leg 1". */
  name: string
  lines: readonly LabelLine[]
  /** False for the end of a cable that nothing is plugged into. */
  isJoined: boolean
}

/** What the label says, to be compared between two revisions. */
export const contentKey = (label: Label): string => label.lines.map(({ text }) => text).join('\n')

/** What became of the labels of a build between two revisions. */
export interface LabelChanges {
  /** Labels that are new or say something else: print these. */
  changed: readonly Label[]
  /** Labels of things that are no longer there: take these off. */
  gone: readonly Label[]
}

/** Compares what the labels say; those that say the same are on the cables already. */
export function compareLabels(before: readonly Label[], after: readonly Label[]): LabelChanges {
  const old = new Map(before.map((label) => [label.id, contentKey(label)]))
  const now = new Set(after.map(({ id }) => id))
  return {
    changed: after.filter((label) => old.get(label.id) !== contentKey(label)),
    gone: before.filter(({ id }) => !now.has(id)),
  }
}
