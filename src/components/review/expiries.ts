import { longestLink_days } from '#shared/contract/buildLinks.ts'

/** How long a link may work, to choose from; `own` stands for a date of one's own. */
export const expiries = [
  { value: '1', words: 'one day' },
  { value: '7', words: 'one week' },
  { value: '14', words: 'two weeks' },
  { value: '30', words: 'one month' },
  { value: '90', words: 'three months' },
  { value: String(longestLink_days), words: 'one year' },
  { value: 'own', words: 'until a date' },
] as const
export type Expiry = (typeof expiries)[number]['value']
