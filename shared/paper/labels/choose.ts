import { compareLabels, type Label, type LabelGroup } from './label.ts'

/** Which labels of a build are wanted. */
export interface LabelChoice {
  groups: readonly LabelGroup[]
  /** Ends that nothing is plugged into, too. */
  freeEnds: boolean
}

/** What is to be printed, and what is to be taken off because it names something that is gone. */
export interface ChosenLabels {
  print: readonly Label[]
  gone: readonly Label[]
}

/** The wanted labels; with those of an earlier revision, only the ones that say something new. */
export function chooseLabels(labels: readonly Label[], choice: LabelChoice, before?: readonly Label[]): ChosenLabels {
  const isWanted = (label: Label) =>
    choice.groups.includes(label.group) &&
    (choice.freeEnds || label.isJoined || label.group === 'tray' || label.group === 'spare')
  if (!before) return { print: labels.filter(isWanted), gone: [] }
  const { changed, gone } = compareLabels(before.filter(isWanted), labels.filter(isWanted))
  return { print: changed, gone }
}
