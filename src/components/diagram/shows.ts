/** The faces of an opened build. */
export type Show = 'wiring' | 'ledger' | 'joints' | 'findings' | 'bays'

const words: Readonly<Record<Show, string>> = {
  wiring: 'Wiring',
  ledger: 'Ledger',
  joints: 'Joints',
  findings: 'Findings',
  bays: 'Bays',
}

const wide: readonly Show[] = ['wiring', 'ledger', 'joints', 'findings', 'bays']
/** On a phone the lists come first: the sheet is there to look at. */
const narrow: readonly Show[] = ['findings', 'joints', 'bays', 'ledger', 'wiring']

export const showsOf = (isNarrow: boolean): { id: Show; label: string }[] =>
  (isNarrow ? narrow : wide).map((id) => ({ id, label: words[id] }))
