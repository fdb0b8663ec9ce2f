import { describe, expect, it } from 'vitest'
import { explain } from '#shared/electrical/explain.ts'
import { spareOutlets } from '#shared/electrical/spareOutlets.ts'
import { powerDocument } from '../../helpers/powerCatalog.ts'
import { powerOf } from '../../helpers/powerOf.ts'

const context = powerOf(
  powerDocument({ T1: 'supply', W1: 'lead', W2: 'splitter-2', C1: 'drive', C2: 'drive', C3: 'drive' }, [
    'T1.s1 W1.supply',
    'W1.out-1 W2.in',
    'W2.out-1 C1.plug',
    'W2.out-2 C2.plug',
    'W1.out-2 C3.plug',
  ]),
)
const explained = (target: Parameters<typeof explain>[1]) => explain(context, target, 'cold-start')!

describe('an explanation', () => {
  it('follows the current from the supply to a contact, hop by hop', () => {
    const { title, hops, steps, figures } = explained({ kind: 'joint', joint: 'j2', line: '12V' })
    expect(title).toBe('W2 in, 12 V at cold start')
    expect(hops.map(({ kind, name }) => `${kind} ${name}`)).toEqual([
      'source T1 12 V',
      'contact W1 supply, 12 V',
      'wire W1 supply to out-1, 12 V',
      'contact W2 in, 12 V',
    ])
    expect(hops.map(({ current_A }) => current_A)).toEqual([6, 6, 6, 4])
    expect(steps).toMatchObject([
      { formula: '2 x 2 A', value: 4, unit: 'A' },
      { formula: '3 contacts x 1.5 A', value: 4.5, unit: 'A' },
      { formula: '4.0 A / 4.5 A', value: 4 / 4.5 },
    ])
    expect(figures.map(({ what }) => what)).toEqual([
      'rating of one contact, sata-power-receptacle',
      'start current on 12 V of C1 and C2',
    ])
  })

  it('adds up to the voltage that the device sees', () => {
    const { hops, steps } = explained({ kind: 'device', part: 'C1', connector: 'plug', rail: '12V' })
    const onTheWay = hops.reduce((sum, { drop_V }) => sum + drop_V, 0)
    const back = context.drop('C1', '12V', 'cold-start').return
    expect(12 - onTheWay - back).toBeCloseTo(context.voltage('C1', '12V', 'cold-start'), 12)
    expect(hops.at(-1)).toMatchObject({ kind: 'device', name: 'C1' })
    expect(hops.at(-2)!.voltage_V).toBeCloseTo(12 - onTheWay, 12)
    expect(steps[0]!.value).toBeCloseTo(context.voltage('C1', '12V', 'cold-start'), 12)
    expect(steps[1]).toMatchObject({ formula: 'lowest 12 V, ATX12V 2.0', value: 10.8 })
  })

  it('shows how a wire was worked out', () => {
    const index = context.conductor('W1', 'supply', 'out-1', '12V').index
    const { steps } = explained({ kind: 'conductor', part: 'W1', conductor: index })
    expect(steps.map(({ formula }) => formula)).toEqual([
      '3 x 2 A',
      'rho(40 degC) x 50 mm / (18 AWG x 1)',
      '1 x 16 A x 0.7 in a bundle',
      '6.0 A / 11.2 A',
    ])
  })

  it('sums a rail, and follows the return the other way', () => {
    expect(explained({ kind: 'rail', part: 'T1', rail: '12V' }).steps[0]).toMatchObject({
      formula: '3 x 2 A',
      value: 6,
    })
    const back = explained({ kind: 'joint', joint: 'j2', line: 'return' })
    expect(back.hops[0]).toMatchObject({ kind: 'source', name: 'T1 return', voltage_V: 0 })
    expect(back.hops.at(-1)!.voltage_V).toBeGreaterThan(0)
  })

  it('has nothing to say of what is not there', () => {
    expect(explain(context, { kind: 'joint', joint: 'j9', line: '12V' }, 'at-rest')).toBeNull()
    expect(explain(context, { kind: 'rail', part: 'T1', rail: '12V9' }, 'at-rest')).toBeNull()
  })
})

describe('spare outlets', () => {
  it('are the open ones, with what the weakest hop leaves', () => {
    const spare = spareOutlets(context.power, 'sata-power-receptacle', '12V', 'cold-start')
    expect(spare.map(({ connector }) => `${connector.part.part.ref} ${connector.connector.id}`).sort()).toEqual([
      'W1 out-3',
      'W1 out-4',
    ])
    // The single return wire at the supply end carries 3 x 2.5 A of its 11.2 A: less room than the 12 V wire has.
    expect(spare[0]!.left_A).toBeCloseTo(11.2 - 7.5, 9)
  })
})
