import { describe, expect, it } from 'vitest'
import { controllerMode } from '#shared/rules/controller-mode/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

/** `count` drives on the breakouts of one controller. */
const direct = (count: number, hba: string, drive: string, breakout = 'breakout-sas'): Input => {
  const cables = Math.ceil(count / 4)
  return [
    {
      K1: hba,
      ...merged(times(cables, (i) => [`W${i}`, breakout] as const)),
      ...merged(times(count, (i) => [`C${i}`, drive] as const)),
    },
    [
      ...times(cables, (i) => `K1.port-${'abcd'[i - 1]} W${i}.host`),
      ...times(count, (i) => `W${Math.ceil(i / 4)}.leg-${((i - 1) % 4) + 1} C${i}.plug`),
    ],
  ]
}

describe('controller-mode', () => {
  const withMode = (hba: string, mode?: 'pass-through' | 'combined'): Input => {
    const [parts, joints] = direct(1, hba, 'sas-4tb')
    return [{ ...parts, K1: mode ? { model: hba, mode } : hba }, joints]
  }
  const check = (input: Input, needsPassThrough = true) =>
    gist(findingsOf(controllerMode, documentOf(input[0], input[1], { settings: { array: { needsPassThrough } } })))

  it.each([
    ['hba-8i', undefined, []],
    ['raid-8i', 'pass-through', []],
    ['raid-8i', 'combined', ['fault K1']],
    ['raid-8i', undefined, ['note K1']],
    ['raid-only', undefined, ['fault K1']],
    ['raid-only', 'pass-through', ['fault K1']],
  ] as const)('%s set to %s', (hba, mode, expected) => {
    expect(check(withMode(hba, mode))).toEqual(expected)
    expect(check(withMode(hba, mode), false)).toEqual([])
  })

  it('is quiet on a controller without drives of the array', () => {
    expect(check([{ K1: 'raid-only' }, []])).toEqual([])
  })
})
