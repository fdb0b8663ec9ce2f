import { describe, expect, it } from 'vitest'
import type { BuildDocument } from '#shared/build/document.ts'
import { explain } from '#shared/electrical/explain.ts'
import { railOverLimit } from '#shared/rules/rail-over-limit/index.ts'
import { sharedFate } from '#shared/rules/shared-fate/index.ts'
import { twoSupplies } from '#shared/rules/two-supplies/index.ts'
import { suppliesJoined } from '#shared/rules/supplies-joined/index.ts'
import { findingsOf } from '../../helpers/findingsOf.ts'
import {
  connector,
  figure,
  model,
  motorDrive,
  planes,
  powerCatalog,
  powerDocument,
  solidState,
  steadyLoad,
  supply,
} from '../../helpers/powerCatalog.ts'
import { allNumbers, powerOf } from '../../helpers/powerOf.ts'

/** A board that takes 12 V at `main` and makes 5 V for its outlet `out-1` with 80 per cent. */
const board = (more: object = {}) =>
  model('board', {
    kind: 'board',
    connectors: [connector('main', 'bare-plug'), connector('out-1', 'bare-receptacle')],
    wiring: planes([['main', 'out-1', 10]], ['12V', 'return']),
    converters: [
      {
        id: '5V',
        from: { rail: '12V', connector: 'main' },
        rail: '5V',
        feeds: ['out-1'],
        setPoint_V: figure(5),
        limit_A: figure(4),
        efficiency: figure(0.8),
        ...more,
      },
    ],
  })

/** A supply of 12 V alone. */
const only12 = supply('only-12', {
  extra: {
    connectors: [connector('s1', 'bare-receptacle', { feeds: { '12V': '12V' } })],
    supply: {
      rails: [{ id: '12V', rail: '12V', setPoint_V: figure(12), limit_A: figure(100) }],
      total_W: figure(500),
      toleranceAt: 'socket',
    },
  },
})

const build = (amperes: { '12V'?: number; '5V': number }, more: object = {}): BuildDocument =>
  powerDocument({ T1: 'only-12', K1: 'board', E1: 'own' }, ['T1.s1 K1.main', 'K1.out-1 E1.power'], {
    models: [only12, board(more), steadyLoad('own', amperes)],
  })

describe('a rail made on a board', () => {
  it('draws its power from the rail it is made of: 3 A at 5 V is 15 W, 18.75 W at 80 per cent, 1.5625 A at 12 V', () => {
    const { current, rail, power } = powerOf(build({ '5V': 3 }))
    expect(rail('5V', 'at-rest')).toBeCloseTo(3, 12)
    expect(current(1, '12V', 'at-rest')).toBeCloseTo(1.5625, 12)
    expect(rail('12V', 'at-rest')).toBeCloseTo(1.5625, 12)
    // The supply delivers the converter's losses too; what the converter gives is not counted twice.
    expect(power.totals[0]!.load_W[5]).toBeCloseTo(18.75, 12)
  })

  it('adds to what the device takes from the supply itself', () => {
    const { current } = powerOf(build({ '12V': 2, '5V': 3 }))
    expect(current(1, '12V', 'at-rest')).toBeCloseTo(3.5625, 12)
    expect(current(2, '12V', 'at-rest')).toBeCloseTo(2, 12)
  })

  it('returns on the device side what the device took, on the supply side what the supply gave', () => {
    const { current } = powerOf(build({ '12V': 2, '5V': 3 }))
    expect(Math.abs(current(2, 'return', 'at-rest'))).toBeCloseTo(5, 12)
    expect(Math.abs(current(1, 'return', 'at-rest'))).toBeCloseTo(3.5625, 12)
  })

  it('holds its own voltage at its outlet, less the rise of the return', () => {
    // 5 V at the outlet; the return plane of 10 mohm carries 3 A from the outlet to the main plug.
    const { voltage, device } = powerOf(build({ '5V': 3 }))
    expect(voltage('E1', '5V', 'at-rest')).toBeCloseTo(5 - 0.03, 12)
    expect(device('E1', '5V').fedBy.map(({ part, rail }) => `${part.part.ref} ${rail.id}`)).toEqual(['K1 5V'])
  })

  it('is dead where nothing arrives at its input', () => {
    const dead = powerDocument({ T1: 'only-12', K1: 'board', E1: 'own' }, ['K1.out-1 E1.power'], {
      models: [only12, board(), steadyLoad('own', { '5V': 3 })],
    })
    const { device, power } = powerOf(dead)
    expect(device('E1', '5V').fedBy).toEqual([])
    expect(power.rails.map(({ rail }) => rail.id)).toEqual(['12V'])
  })

  it('passes on through a second converter: 2 A at 3.3 V from 5 V from 12 V', () => {
    const twice = model('twice', {
      kind: 'board',
      connectors: [connector('main', 'bare-plug'), connector('out-1', 'bare-receptacle'), connector('x', 'bare-plug')],
      wiring: [...planes([['main', 'out-1', 10]], ['12V', 'return']), ...planes([['out-1', 'x', 0]], ['5V'])],
      converters: [
        {
          id: '5V',
          from: { rail: '12V', connector: 'main' },
          rail: '5V',
          feeds: ['out-1'],
          setPoint_V: figure(5),
          limit_A: figure(9),
          efficiency: figure(0.8),
        },
        {
          id: '3.3V',
          from: { rail: '5V', connector: 'x' },
          rail: '3.3V',
          feeds: ['out-1'],
          setPoint_V: figure(3.3),
          limit_A: figure(9),
          efficiency: figure(0.9),
        },
      ],
    })
    const { rail } = powerOf(
      powerDocument({ T1: 'only-12', K1: 'twice', E1: 'own' }, ['T1.s1 K1.main', 'K1.out-1 E1.power'], {
        models: [only12, twice, steadyLoad('own', { '3.3V': 2 })],
      }),
    )
    expect(rail('5V', 'at-rest')).toBeCloseTo(6.6 / 0.9 / 5, 12)
    expect(rail('12V', 'at-rest')).toBeCloseTo(6.6 / 0.9 / 0.8 / 12, 12)
  })

  it('takes an efficiency that is unknown or absurd at its worst', () => {
    for (const efficiency of [{ value: null, origin: 'guess' as const }, figure(0), figure(7)]) {
      const { current, power } = powerOf(build({ '5V': 3 }, { efficiency }))
      expect(current(1, '12V', 'at-rest')).toBeCloseTo(1.5625, 12)
      expect(allNumbers(power).every(Number.isFinite)).toBe(true)
    }
  })

  it('feeds what it feeds: the branch above it knows the device behind', () => {
    const { power } = powerOf(build({ '5V': 3 }))
    const contact = power.contacts.find(({ line, joint }) => line === '12V' && joint.joint.id === 'j1')!
    expect(power.behind('12V', contact.branch).map(({ part }) => part.part.ref)).toEqual(['E1'])
  })

  it('is explained as a rail of the board', () => {
    const { power, build: resolved } = powerOf(build({ '5V': 3 }))
    const made = explain({ power, build: resolved }, { kind: 'rail', part: 'K1', rail: '5V' }, 'at-rest')
    expect(made?.title).toBe('K1 5 V at rest')
    expect(made?.steps[0]).toMatchObject({ formula: '3 A', value: 3 })
    const device = explain(
      { power, build: resolved },
      { kind: 'device', part: 'E1', connector: 'power', rail: '5V' },
      'at-rest',
    )
    expect(device?.hops.map(({ name }) => name)).toEqual(['K1 5 V', 'E1 power, 5 V', 'E1'])
  })
})

describe('rules on a rail made on a board', () => {
  const drives = (count: number, refs = Array.from({ length: count }, (_, i) => `C${i + 1}`)): BuildDocument =>
    powerDocument(
      { T1: 'only-12', K1: 'board', W1: 'lead', ...Object.fromEntries(refs.map((ref) => [ref, 'own'])) },
      ['T1.s1 K1.main', 'K1.out-1 W1.supply', ...refs.map((ref, i) => `W1.out-${i + 1} ${ref}.plug`)],
      { models: [only12, board(), solidState('own', { write_A: 1.5 })], settings: { array: { parityDrives: 1 } } },
    )

  it('holds the converter to its limit: three drives of 1.5 A are 4.5 of 4 A, two are not', () => {
    const [found] = findingsOf(railOverLimit, drives(3), powerCatalog)
    expect(found).toMatchObject({ severity: 'danger', load: 4.5, limit: 4, moment: 'write-burst' })
    expect(found!.message).toContain('K1 5 V delivers')
    expect(findingsOf(railOverLimit, drives(2), powerCatalog)).toEqual([])
  })

  it('names the board and the supply behind it as shared fate', () => {
    const roles = drives(3)
    const [note] = findingsOf(
      sharedFate,
      { ...roles, parts: roles.parts.map((part) => (part.ref.startsWith('C') ? { ...part, role: 'data' } : part)) },
      powerCatalog,
    )
    expect(note!.message).toContain('K1 (3 of 3)')
    expect(note!.message).toContain('T1 (3 of 3)')
  })

  it('does not take the board for a second supply', () => {
    const two = powerDocument(
      { T1: 'only-12', T2: 'supply', K1: 'board', C1: 'own' },
      ['T1.s1 K1.main', 'K1.out-1 C1.plug'],
      { models: [only12, board(), motorDrive('own', { plug: 'bare-plug' })] },
    )
    const [note] = findingsOf(twoSupplies, two, powerCatalog)
    expect(note).toMatchObject({ severity: 'note' })
    expect(note!.message).toContain('T1 feeds C1 (1 drive lost with it); T2 feeds no drive')
  })

  it('sees a 5 V rail of a supply tied to that of the board', () => {
    const tied = model('tied', {
      ...board(),
      connectors: [...board().connectors, connector('aux', 'bare-plug')],
      wiring: [...board().wiring, ...planes([['aux', 'out-1', 1]], ['5V', 'return'])],
    })
    const found = findingsOf(
      suppliesJoined,
      powerDocument({ T1: 'supply', K1: 'tied' }, ['T1.s1 K1.main', 'T1.s2 K1.aux'], {
        models: [{ ...tied, id: 'tied' }],
      }),
      powerCatalog,
    )
    expect(found.map(({ message }) => message)).toEqual([
      expect.stringContaining('T1 5 V and K1 5 V are tied together'),
    ])
  })
})
