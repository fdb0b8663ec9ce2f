import { describe, expect, it } from 'vitest'
import { breakoutReversed } from '#shared/rules/breakout-reversed/index.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

/** A SAS controller with a SATA forward breakout: sound. */
const sound: Input = [{ K1: 'hba-4i', W1: 'breakout-sata', C1: 'sata-4tb' }, ['K1.port-a W1.host', 'W1.leg-1 C1.plug']]
const reversedAtController: Input = [
  { K1: 'hba-4i', W1: 'breakout-reverse', C1: 'sata-4tb', C2: 'sata-4tb' },
  ['K1.port-a W1.device', 'W1.leg-1 C1.plug', 'W1.leg-2 C2.plug'],
]
const forwardAtBoard: Input = [
  { K1: 'board', W1: 'breakout-sata', U1: 'backplane', C1: 'sata-4tb' },
  ['K1.sata-1 W1.leg-1', 'K1.sata-2 W1.leg-2', 'W1.host U1.data-1', 'U1.bay-1 C1.plug'],
]

describe('breakout-reversed', () => {
  const check = (input: Input) => findingsOf(breakoutReversed, documentOf(...input))

  it('is quiet on a forward breakout at a controller', () => expect(check(sound)).toEqual([]))

  it('finds a reverse breakout at a controller, once for all its drives', () => {
    const findings = check(reversedAtController)
    expect(gist(findings)).toEqual(['fault W1'])
    expect(findings[0]?.subjects.map((subject) => subject.ref)).toEqual(['W1', 'C1', 'C2', 'W1'])
    expect(findings[0]?.remedy).toContain('forward breakout')
  })

  it('finds a forward breakout between board ports and a backplane', () => {
    const findings = check(forwardAtBoard)
    expect(gist(findings)).toEqual(['fault W1'])
    expect(findings[0]?.remedy).toContain('reverse breakout')
  })

  it('finds it before any drive is there', () => {
    expect(gist(check([{ K1: 'hba-4i', W1: 'breakout-reverse' }, ['K1.port-a W1.device']]))).toEqual(['fault W1'])
  })
})
