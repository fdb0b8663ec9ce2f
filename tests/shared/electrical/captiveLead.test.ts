import { describe, expect, it } from 'vitest'
import { modelSchema } from '#shared/catalog/model.ts'
import { explain } from '#shared/electrical/explain.ts'
import { wireOverAmpacity } from '#shared/rules/wire-over-ampacity/index.ts'
import { findingsOf } from '../../helpers/findingsOf.ts'
import {
  chain,
  connector,
  planes,
  powerCatalog,
  powerDocument,
  steadyLoad,
  supply,
} from '../../helpers/powerCatalog.ts'
import { powerOf } from '../../helpers/powerOf.ts'

/** Two outlets on a captive lead: 100 mohm from the inside to the first, 50 mohm on to the second. */
const captive = (toleranceAt: 'lead-end' | 'socket', wiring = stretches()) => {
  const made = supply('captive', {
    extra: {
      connectors: [
        connector('l1-1', 'bare-receptacle', { feeds: { '12V': '12V', '5V': '5V', '3.3V': '3.3V' } }),
        connector('l1-2', 'bare-receptacle'),
      ],
      wiring,
    },
  })
  return { ...made, supply: { ...made.supply!, toleranceAt } }
}
const stretches = () =>
  planes(
    [
      ['inside', 'l1-1', 100],
      ['l1-1', 'l1-2', 50],
    ],
    ['12V', 'return'],
  )
const built = (supplyModel: ReturnType<typeof captive>, amperes = 1) =>
  powerDocument({ T1: 'captive', E1: 'own', E2: 'own' }, ['T1.l1-1 E1.power', 'T1.l1-2 E2.power'], {
    models: [supplyModel, steadyLoad('own', { '12V': amperes })],
  })

describe('the first stretch of a captive lead', () => {
  it('carries what both outlets take', () => {
    const { conductor } = powerOf(built(captive('socket')))
    expect(conductor('T1', 'inside', 'l1-1', '12V').current_A[5]).toBeCloseTo(2, 12)
    // Signed along the conductor: the return flows back to the inside.
    expect(conductor('T1', 'inside', 'l1-1', 'return').current_A[5]).toBeCloseTo(-2, 12)
    expect(conductor('T1', 'l1-1', 'l1-2', '12V').current_A[5]).toBeCloseTo(1, 12)
  })

  it('drops voltage where the lead is entered with wire: 12 - 2 (2 x 0.1) - 2 (1 x 0.05) V at the far outlet', () => {
    const { voltage, drop } = powerOf(built(captive('socket')))
    expect(voltage('E1', '12V', 'at-rest')).toBeCloseTo(12 - 0.4, 12)
    expect(voltage('E2', '12V', 'at-rest')).toBeCloseTo(12 - 0.4 - 0.1, 12)
    expect(drop('E2', '12V', 'at-rest').wire).toBeCloseTo(0.25, 12)
    expect(drop('E2', '12V', 'at-rest').return).toBeCloseTo(0.25, 12)
  })

  it('drops none where the tolerance holds at its end, and still carries the current', () => {
    const { voltage, conductor } = powerOf(built(captive('lead-end')))
    expect(voltage('E2', '12V', 'at-rest')).toBe(12)
    expect(conductor('T1', 'inside', 'l1-1', '12V').current_A[5]).toBeCloseTo(2, 12)
  })

  it('is held to its ampacity: 22 AWG carries 4.9 A in a bundle', () => {
    const thin = captive('lead-end', chain(['inside', 'l1-1'], { awg: 22, lines: ['12V', 'return'] }))
    const onlyFirst = (amperes: number) =>
      powerDocument({ T1: 'captive', E1: 'own' }, ['T1.l1-1 E1.power'], {
        models: [thin, steadyLoad('own', { '12V': amperes })],
      })
    expect(findingsOf(wireOverAmpacity, onlyFirst(3.9), powerCatalog)).toEqual([])
    const [found] = findingsOf(wireOverAmpacity, onlyFirst(5), powerCatalog)
    expect(found).toMatchObject({ severity: 'danger', load: 5, limit: expect.closeTo(4.9, 12) })
    expect(found!.message).toContain('T1 inside to l1-1, 12 V (22 AWG)')
  })

  it('adds up to the rail, and is a hop of the explanation', () => {
    const { rail, power, build } = powerOf(built(captive('socket')))
    expect(rail('12V', 'at-rest')).toBeCloseTo(2, 12)
    const made = explain({ power, build }, { kind: 'device', part: 'E2', connector: 'power', rail: '12V' }, 'at-rest')!
    expect(made.hops.map(({ kind }) => kind)).toEqual(['source', 'wire', 'wire', 'contact', 'device'])
    expect(made.hops[0]).toMatchObject({ current_A: 2, voltage_V: 12 })
    expect(made.hops[1]!.voltage_V).toBeCloseTo(11.8, 12)
  })

  it('takes two wires given apart as parallel ways', () => {
    const double = captive(
      'socket',
      planes(
        [
          ['inside', 'l1-1', 100],
          ['inside', 'l1-1', 100],
          ['l1-1', 'l1-2', 50],
        ],
        ['12V', 'return'],
      ),
    )
    const { rail, power } = powerOf(built(double))
    expect(rail('12V', 'at-rest')).toBeCloseTo(2, 9)
    expect(
      power.conductors.filter(({ conductor }) => conductor.from === 'inside').map(({ current_A }) => current_A[5]),
    ).toEqual([1, 1, -1, -1].map((ampere) => expect.closeTo(ampere, 9)))
  })

  it('belongs to supplies only, and their connectors leave the name free', () => {
    const lead = {
      id: 'x',
      name: 'x',
      kind: 'lead',
      connectors: [connector('out-1', 'bare-plug')],
      wiring: chain(['inside', 'out-1']),
    }
    expect(modelSchema.safeParse(lead).success).toBe(false)
    const taken = {
      ...captive('socket'),
      connectors: [connector('inside', 'bare-receptacle', { feeds: { '12V': '12V' } })],
      wiring: [],
    }
    expect(modelSchema.safeParse(taken).success).toBe(false)
  })
})
