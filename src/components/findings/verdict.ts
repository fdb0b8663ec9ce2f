import type { CheckResult } from '#shared/check/result.ts'

const some = (count: number, one: string, many: string): string[] =>
  count === 0 ? [] : [count === 1 ? `1 ${one}` : `${count} ${many}`]

/** "yes", "yes, 2 cautions", "no: 1 danger, 3 faults". */
export function verdictWords(counts: CheckResult['counts']): string {
  const bad = [...some(counts.danger, 'danger', 'dangers'), ...some(counts.fault, 'fault', 'faults')]
  if (bad.length > 0) return `no: ${bad.join(', ')}`
  const thin = some(counts.caution, 'caution', 'cautions')
  return thin.length > 0 ? `yes, with ${thin.join('')}` : 'yes'
}
