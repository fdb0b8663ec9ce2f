import { describe, expect, it } from 'vitest'
import { protocolMismatch } from '#shared/rules/protocol-mismatch/index.ts'
import { documentOf } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

type Input = Parameters<typeof documentOf>

/** A SAS controller with a SATA forward breakout: sound. */
const sound: Input = [{ K1: 'hba-4i', W1: 'breakout-sata', C1: 'sata-4tb' }, ['K1.port-a W1.host', 'W1.leg-1 C1.plug']]

describe('protocol-mismatch', () => {
  const check = (...input: Input) => findingsOf(protocolMismatch, documentOf(...input))

  it('is quiet on SATA drives behind SAS', () => expect(check(...sound)).toEqual([]))

  it('names the controller and all its drives once', () => {
    const findings = check({ K1: 'sata-8i', W1: 'breakout-sas', C1: 'sas-4tb', C2: 'sas-4tb' }, [
      'K1.port-a W1.host',
      'W1.leg-1 C1.plug',
      'W1.leg-2 C2.plug',
    ])
    expect(gist(findings)).toEqual(['fault K1'])
    expect(findings[0]?.message).toBe('K1 does not speak SAS, which C1 and C2 need.')
  })

  it('is quiet on a drive that has another way that works', () => {
    const joints = ['K1.port-a W1.host', 'W1.leg-1 C1.plug', 'K2.port-a W2.host', 'W2.leg-1 C1.plug']
    expect(
      check({ K1: 'sata-8i', K2: 'hba-4i', W1: 'breakout-sas', W2: 'breakout-sas', C1: 'sas-4tb' }, joints),
    ).toEqual([])
  })

  it('two controllers give two findings', () => {
    const joints = ['K1.port-a W1.host', 'W1.leg-1 C1.plug', 'K2.port-a W2.host', 'W2.leg-1 C2.plug']
    expect(
      check(
        { K1: 'sata-8i', K2: 'sata-8i', W1: 'breakout-sas', W2: 'breakout-sas', C1: 'sas-4tb', C2: 'sas-4tb' },
        joints,
      ),
    ).toHaveLength(2)
  })
})
