import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { momentIds } from '#shared/check/result.ts'
import type { BuildDocumentInput } from '#shared/build/document.ts'
import {
  motorDrive,
  planes,
  model,
  connector,
  powerDocument,
  solidState,
  steadyLoad,
} from '../../helpers/powerCatalog.ts'
import { allNumbers, powerOf } from '../../helpers/powerOf.ts'

type SpinUp = NonNullable<BuildDocumentInput['settings']>['spinUp']

/** Drives C1 to Cn, four to a lead, on one supply. */
function rack(
  drives: number,
  spinUp: SpinUp,
  own = motorDrive('own', { sleep_A: [0.1, 0.2] }),
  role?: (i: number) => object,
) {
  const leads = Math.ceil(drives / 4)
  const refs = (letter: string, count: number) => Array.from({ length: count }, (_, i) => `${letter}${i + 1}`)
  return powerDocument(
    {
      T1: 'supply-8',
      ...Object.fromEntries(refs('W', leads).map((ref) => [ref, 'lead'])),
      ...Object.fromEntries(refs('C', drives).map((ref, i) => [ref, { model: 'own', ...role?.(i) }])),
    },
    [
      ...refs('W', leads).map((ref, i) => `T1.s${i + 1} ${ref}.supply`),
      ...refs('C', drives).map((ref, i) => `W${Math.floor(i / 4) + 1}.out-${(i % 4) + 1} ${ref}.plug`),
    ],
    { settings: { spinUp }, models: [own, supply8] },
  )
}

const supply8 = model('supply-8', {
  kind: 'supply',
  connectors: Array.from({ length: 8 }, (_, i) =>
    connector(`s${i + 1}`, 'bare-receptacle', { feeds: { '12V': '12V', '5V': '5V' } }),
  ),
  supply: {
    rails: [
      { id: '12V', rail: '12V', setPoint_V: { value: 12, origin: 'maker' }, limit_A: { value: 100, origin: 'maker' } },
      { id: '5V', rail: '5V', setPoint_V: { value: 5, origin: 'maker' }, limit_A: { value: 100, origin: 'maker' } },
    ],
    total_W: { value: 1000, origin: 'maker' },
    toleranceAt: 'socket',
  },
})

const one12s: SpinUp = { mode: 'staged', by: 'standby-command', groupSize: 1, interval_s: 12 }

describe('moments', () => {
  it('start all motors at once, with all else at work', () => {
    const { rail } = powerOf(rack(8, { mode: 'together' }))
    expect(rail('12V', 'cold-start')).toBeCloseTo(8 * 2, 12)
    expect(rail('5V', 'cold-start')).toBeCloseTo(8 * 0.5, 12)
    expect(rail('12V', 'full-scan')).toBeCloseTo(8 * 0.6, 12)
    expect(rail('12V', 'at-rest')).toBeCloseTo(8 * 0.5, 12)
  })

  it('apply where the build has them', () => {
    const plain = powerOf(rack(2, { mode: 'together' })).power.applies
    expect([...plain]).toEqual(['cold-start', 'wake', 'full-scan', 'at-rest'])
    const staged = powerOf(rack(2, one12s)).power.applies
    expect([...staged]).toEqual(['staged-start', 'wake', 'full-scan', 'at-rest'])
    const flash = powerOf(
      powerDocument({ T1: 'supply', W1: 'lead', C1: 'ssd' }, ['T1.s1 W1.supply', 'W1.out-1 C1.plug']),
    ).power.applies
    expect([...flash]).toEqual(['full-scan', 'write-burst', 'at-rest'])
  })

  it('take 96 W on 12 V and 24 W on 5 V for four bays at 2 A and 1.2 A, as a published backplane plans [S64]', () => {
    const planned = steadyLoad('planned', { '12V': 2, '5V': 1.2 }, 'sata-drive-plug')
    const { power, rail } = powerOf(
      powerDocument(
        { T1: 'supply', W1: 'lead', E1: 'planned', E2: 'planned', E3: 'planned', E4: 'planned' },
        ['T1.s1 W1.supply', ...[1, 2, 3, 4].map((i) => `W1.out-${i} E${i}.power`)],
        { models: [planned] },
      ),
    )
    expect(rail('12V', 'at-rest') * 12).toBeCloseTo(96, 9)
    expect(rail('5V', 'at-rest') * 5).toBeCloseTo(24, 9)
    expect(power.totals[0]!.load_W[5]).toBeCloseTo(120, 9)
  })

  it.each([
    // WD Re, amperes on 12 V and 5 V against the printed watts [S41].
    { what: 'random', on12V: 0.6, on5V: 0.36, watts: 9.0 },
    { what: 'sequential read', on12V: 0.4, on5V: 0.65, watts: 8.1 },
    { what: 'idle', on12V: 0.39, on5V: 0.35, watts: 6.4 },
  ])('turn printed amperes into the printed watts: $what', ({ on12V, on5V, watts }) => {
    const { power } = powerOf(
      powerDocument({ T1: 'supply', E1: 'drive-load' }, ['T1.s1 E1.power'], {
        models: [steadyLoad('drive-load', { '12V': on12V, '5V': on5V })],
      }),
    )
    expect(Math.abs(power.totals[0]!.load_W[5]! - watts)).toBeLessThan(0.0501)
  })
})

describe('a staged start', () => {
  it('starts twelve drives one by one, 12 s apart, the last after 132 s [S45]', () => {
    const { power } = powerOf(rack(12, one12s))
    const starts = power.timeline.filter(({ starting }) => starting.length > 0)
    expect(starts.map(({ from_s }) => from_s)).toEqual(Array.from({ length: 12 }, (_, i) => i * 12))
    expect(starts.at(-1)!.from_s).toBe(132)
    expect(starts.map(({ starting }) => starting[0]!.part.ref)).toEqual(
      Array.from({ length: 12 }, (_, i) => `C${i + 1}`),
    )
  })

  it('adds waiting, starting and started drives at each step', () => {
    const { power, rail } = powerOf(rack(3, one12s))
    // 2 A for 10 s; 0.1 A before, 0.5 A after.
    expect(power.timeline.map(({ from_s }) => from_s)).toEqual([0, 10, 12, 22, 24, 34])
    const on12V = power.timeline.map(({ rails_A }) => rails_A[0]!)
    ;[2.2, 0.7, 2.6, 1.1, 3, 1.5].forEach((ampere, i) => expect(on12V[i]).toBeCloseTo(ampere, 12))
    expect(rail('12V', 'staged-start')).toBeCloseTo(3, 12)
  })

  it('starts groups of drives together', () => {
    const { power, rail } = powerOf(rack(8, { ...one12s, groupSize: 4 }))
    expect(power.timeline.filter(({ starting }) => starting.length > 0).map(({ starting }) => starting.length)).toEqual(
      [4, 4],
    )
    expect(rail('12V', 'staged-start')).toBeCloseTo(4 * 2 + 4 * 0.5, 12)
  })

  it('overlaps where the interval is shorter than a start', () => {
    const { rail } = powerOf(rack(4, { ...one12s, interval_s: 5 }))
    // At 15 s the fourth starts while the third still does: 2 + 2 + 0.5 + 0.5.
    expect(rail('12V', 'staged-start')).toBeCloseTo(5, 12)
  })

  it('starts a drive that does not understand the means with the power', () => {
    const deaf = motorDrive('own', { sleep_A: [0.1, 0.2], drive: { startControl: [] } })
    const { power, rail } = powerOf(rack(4, one12s, deaf))
    expect(power.startPlan.idle).toHaveLength(4)
    expect(rail('12V', 'staged-start')).toBeCloseTo(8, 12)
    expect(power.timeline[0]!.starting).toHaveLength(4)
  })

  it('keeps the worst second of each hop, not of the whole', () => {
    const { current } = powerOf(rack(8, { ...one12s, groupSize: 4 }))
    expect(current(1, '12V', 'staged-start')).toBeCloseTo(8, 12)
    expect(current(2, '12V', 'staged-start')).toBeCloseTo(8, 12)
  })
})

describe('a wake', () => {
  it('starts what may sleep while the rest works', () => {
    const roles = (i: number) => (i === 0 ? { role: 'boot' } : i === 1 ? { role: 'cache' } : {})
    const { rail } = powerOf(rack(4, { mode: 'together' }, undefined, roles))
    expect(rail('12V', 'wake')).toBeCloseTo(2 * 0.6 + 2 * 2, 12)
  })

  it('goes group by group where the staging also holds after sleep', () => {
    expect(powerOf(rack(4, one12s)).rail('12V', 'wake')).toBeCloseTo(2 + 3 * 0.6, 12)
  })

  it('comes all at once where contact 11 delays the first start only [S39]', () => {
    const byPin = motorDrive('own', { drive: { startControl: ['device-pin'] } })
    expect(powerOf(rack(4, { ...one12s, by: 'device-pin' }, byPin)).rail('12V', 'wake')).toBeCloseTo(8, 12)
  })
})

describe('a write burst', () => {
  it('takes solid-state drives at their peak and the rest at work', () => {
    const { rail } = powerOf(
      powerDocument(
        { T1: 'supply', W1: 'lead', C1: 'drive', C2: 'ssd' },
        ['T1.s1 W1.supply', 'W1.out-1 C1.plug', 'W1.out-2 C2.plug'],
        {
          models: [solidState('ssd')],
        },
      ),
    )
    expect(rail('5V', 'write-burst')).toBeCloseTo(0.5 + 0.9, 12)
    expect(rail('5V', 'full-scan')).toBeCloseTo(0.5 + 0.5, 12)
  })
})

describe('any plan', () => {
  const spinUps = fc.record({
    mode: fc.constantFrom('together' as const, 'staged' as const),
    by: fc.constantFrom('standby-command' as const, 'controller' as const, 'device-pin' as const),
    groupSize: fc.integer({ min: 1, max: 5 }),
    interval_s: fc.integer({ min: 1, max: 30 }),
  })

  it('never disagrees with its timeline', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 14 }), spinUps, (drives, spinUp) => {
        const { power } = powerOf(rack(drives, spinUp))
        const staged = momentIds.indexOf('staged-start')
        if (spinUp.mode === 'together') {
          expect(power.timeline).toEqual([])
          return
        }
        power.rails.forEach((rail, i) => {
          const worst = Math.max(...power.timeline.map(({ rails_A }) => rails_A[i]!))
          expect(rail.current_A[staged]).toBeCloseTo(worst, 12)
        })
        const times = power.timeline.map(({ from_s }) => from_s)
        expect(times).toEqual([...times].sort((a, b) => a - b))
        expect(new Set(times).size).toBe(times.length)
        expect(power.timeline.flatMap(({ starting }) => starting)).toHaveLength(drives)
      }),
      { numRuns: 40 },
    )
  })

  it('never takes more staged than at once, nor less with one more drive', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 10 }), spinUps, (drives, spinUp) => {
        const before = powerOf(rack(drives, spinUp))
        const after = powerOf(rack(drives + 1, spinUp))
        expect(before.rail('12V', 'staged-start')).toBeLessThanOrEqual(before.rail('12V', 'cold-start') + 1e-12)
        for (const contact of before.power.contacts) {
          const same = after.power.contacts.find(
            ({ joint, line }) => joint.joint.id === contact.joint.joint.id && line === contact.line,
          )
          // Joints are numbered leads first: only builds with as many leads compare by number.
          if (!same || Math.ceil(drives / 4) !== Math.ceil((drives + 1) / 4)) continue
          contact.current_A.forEach((ampere, m) => {
            if (momentIds[m] !== 'staged-start' && momentIds[m] !== 'wake')
              expect(Math.abs(same.current_A[m]!)).toBeGreaterThanOrEqual(Math.abs(ampere) - 1e-12)
          })
        }
      }),
      { numRuns: 25 },
    )
  })

  it('never raises the worst load of a lead that is split in two', () => {
    const worstOn12V = (leads: number, drives: number) => {
      const refs = Array.from({ length: leads }, (_, i) => `W${i + 1}`)
      const { power } = powerOf(
        powerDocument(
          {
            T1: 'supply',
            ...Object.fromEntries(refs.map((ref) => [ref, 'lead'])),
            ...Object.fromEntries(Array.from({ length: drives }, (_, i) => [`C${i + 1}`, 'drive'])),
          },
          [
            ...refs.map((ref, i) => `T1.s${i + 1} ${ref}.supply`),
            ...Array.from(
              { length: drives },
              (_, i) => `W${(i % leads) + 1}.out-${Math.floor(i / leads) + 1} C${i + 1}.plug`,
            ),
          ],
        ),
      )
      return Math.max(...power.contacts.map(({ current_A }) => Math.max(...current_A.map(Math.abs))))
    }
    for (const drives of [1, 2, 3, 4]) expect(worstOn12V(2, drives)).toBeLessThanOrEqual(worstOn12V(1, drives) + 1e-12)
  })

  it('keeps Kirchhoff at every connector and gives only numbers', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 9 }), spinUps, fc.boolean(), (drives, spinUp, looped) => {
        const document = rack(drives, spinUp)
        const joined = looped && drives > 4 ? withTie(document) : document
        const { power } = powerOf(joined)
        expect(allNumbers(power).every(Number.isFinite)).toBe(true)
        for (const [m, moment] of momentIds.entries()) {
          if (moment === 'staged-start' || moment === 'wake') continue
          expect(largestImbalance(power, m)).toBeLessThan(1e-9)
        }
      }),
      { numRuns: 30 },
    )
  })
})

/** Joins the last outlets of two leads by a bridge of 5 mohm, so that a loop arises. */
function withTie(document: ReturnType<typeof rack>): ReturnType<typeof rack> {
  const bridge = model('bridge', {
    kind: 'adapter',
    connectors: [connector('a', 'sata-power-plug'), connector('b', 'sata-power-plug')],
    wiring: planes([['a', 'b', 5]]),
  })
  const free = document.joints.filter(({ a }) => !(a.connector === 'out-4'))
  return {
    ...document,
    models: [...document.models, bridge],
    parts: [...document.parts, { id: 'W9', ref: 'W9', model: 'bridge' }],
    joints: [
      ...free,
      { id: 't1', a: { part: 'W1', connector: 'out-4' }, b: { part: 'W9', connector: 'a' } },
      { id: 't2', a: { part: 'W2', connector: 'out-4' }, b: { part: 'W9', connector: 'b' } },
    ],
  }
}

/** What flows into each connector of a line against what is drawn there, at moments without steps of their own. */
function largestImbalance(power: ReturnType<typeof powerOf>['power'], m: number): number {
  let largest = 0
  power.network.byLine.forEach((network, l) => {
    const sense = network.line === 'return' ? -1 : 1
    const sum = new Float64Array(network.plan.nodes)
    for (const draw of power.draws) {
      if (!draw.flows || (network.line !== 'return' && draw.rail !== network.line)) continue
      const device = power.devices[power.draws.indexOf(draw)]!
      sum[draw.connector.index]! -= device.current_A[m]!
    }
    const fed = new Uint8Array(network.plan.nodes)
    power.byBranch[l]!.forEach((load, branch) => {
      const from = network.plan.from[branch]!
      const to = network.plan.to[branch]!
      if (!load) {
        fed[from] = fed[to] = 1
        return
      }
      sum[to]! += sense * load.current_A[m]!
      sum[from]! -= sense * load.current_A[m]!
    })
    sum.forEach((left, node) => {
      if (fed[node] === 0) largest = Math.max(largest, Math.abs(left))
    })
  })
  return largest
}
