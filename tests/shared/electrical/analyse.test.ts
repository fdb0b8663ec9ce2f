import { describe, expect, it } from 'vitest'
import {
  chain,
  connector,
  model,
  motorDrive,
  planes,
  powerDocument,
  steadyLoad,
  supply,
} from '../../helpers/powerCatalog.ts'
import { allNumbers, powerOf } from '../../helpers/powerOf.ts'

const at20 = { wireTemperature_C: 20 }

describe('a lead worked out on paper', () => {
  /**
   * Own check sum on cited figures (contact 3.5 mohm [S25], 18 AWG [S57], copper [S58]): 0.60 m of 18 AWG at 20 degC,
   * four drives on one 4-pin lead, 2.0 A on 12 V and 0.7 A on 5 V each, two contacts of 3.5 mohm per line.
   * 12 V: (12.57 + 7) mohm x 8.0 A = 0.157 V; return, two wires: 9.79 mohm x 10.8 A = 0.106 V; together 0.262 V.
   * 5 V: 19.57 mohm x 2.8 A = 0.055 V, with the same return 0.161 V: a sum by separate loops misses that.
   */
  const four = powerOf(
    powerDocument({ T1: 'supply-4pin', W1: 'lead-4pin', E1: 'four-drives' }, ['T1.s1 W1.in', 'W1.out-1 E1.power'], {
      settings: at20,
      models: [
        supply('supply-4pin', { type: 'peripheral-receptacle' }),
        model('lead-4pin', {
          kind: 'lead',
          connectors: [connector('in', 'peripheral-plug'), connector('out-1', 'peripheral-receptacle')],
          wiring: [
            ...chain(['in', 'out-1'], { length_mm: 600, lines: ['12V', '5V'] }),
            { from: 'in', to: 'out-1', line: 'return', awg: 18, wires: 2, length_mm: { value: 600, origin: 'maker' } },
          ],
        }),
        steadyLoad('four-drives', { '12V': 8, '5V': 2.8 }, 'peripheral-plug'),
      ],
    }),
  )

  it('splits the drop into wire, contact and shared return', () => {
    const on12V = four.drop('E1', '12V', 'at-rest')
    const on5V = four.drop('E1', '5V', 'at-rest')
    expect(on12V.wire + on12V.contact).toBeCloseTo(0.157, 3)
    expect(on12V.contact).toBeCloseTo(0.007 * 8, 9)
    expect(on12V.return).toBeCloseTo(0.106, 3)
    expect(12 - four.voltage('E1', '12V', 'at-rest')).toBeCloseTo(0.262, 3)
    expect(on5V.return).toBeCloseTo(on12V.return, 12)
    // Printed as the sum of 0.055 and 0.106, each already rounded.
    expect(Math.abs(5 - four.voltage('E1', '5V', 'at-rest') - 0.161)).toBeLessThan(0.001)
  })

  it('carries both rails back in one return, against the drawn direction', () => {
    expect(four.current(1, '12V', 'at-rest')).toBeCloseTo(8, 12)
    expect(four.current(1, 'return', 'at-rest')).toBeCloseTo(-10.8, 12)
  })

  it('judges the contact by the wire in it', () => {
    expect(four.contact(1, '12V').limit_A).toBe(9)
    expect(four.contact(1, 'return').limit_A).toBe(18)
  })
})

describe('a ladder of outlets', () => {
  const ladder = powerOf(
    powerDocument(
      { T1: 'supply', W1: 'planes-3', E1: 'two', E2: 'two', E3: 'one' },
      ['T1.s1 W1.in', 'W1.out-1 E1.power', 'W1.out-2 E2.power', 'W1.out-3 E3.power'],
      {
        models: [
          model('planes-3', {
            kind: 'lead',
            connectors: ['in', 'out-1', 'out-2', 'out-3'].map((id) =>
              connector(id, id === 'in' ? 'bare-plug' : 'bare-receptacle'),
            ),
            wiring: planes([
              ['in', 'out-1', 10],
              ['out-1', 'out-2', 20],
              ['out-2', 'out-3', 30],
            ]),
          }),
          steadyLoad('two', { '12V': 2 }),
          steadyLoad('one', { '12V': 1 }),
        ],
      },
    ),
  )

  it('sums currents towards the supply and drops away from it, to 1e-9', () => {
    // 5 A, 3 A, 1 A through 10, 20, 30 mohm: 0.05, 0.06, 0.03 V on the rail and as much on the return.
    expect(ladder.current(1, '12V', 'full-scan')).toBeCloseTo(5, 9)
    expect(ladder.conductor('W1', 'out-1', 'out-2', '12V').current_A[3]).toBeCloseTo(3, 9)
    expect(ladder.voltage('E1', '12V', 'full-scan')).toBeCloseTo(12 - 0.1, 9)
    expect(ladder.voltage('E2', '12V', 'full-scan')).toBeCloseTo(12 - 0.22, 9)
    expect(ladder.voltage('E3', '12V', 'full-scan')).toBeCloseTo(12 - 0.28, 9)
  })
})

describe('a backplane fed twice', () => {
  const backplane = model('backplane-2', {
    kind: 'backplane',
    connectors: [
      connector('power-1', 'bare-plug'),
      connector('power-2', 'bare-plug'),
      connector('bay-1', 'bare-receptacle', { bay: 1 }),
      connector('bay-2', 'bare-receptacle', { bay: 2 }),
    ],
    wiring: planes([
      ['power-1', 'power-2', 20],
      ['power-1', 'bay-1', 5],
      ['power-2', 'bay-2', 5],
    ]),
  })
  const stub = (id: string, mohm: number) =>
    model(id, {
      kind: 'lead',
      connectors: [connector('in', 'bare-plug'), connector('out-1', 'bare-receptacle')],
      wiring: planes([['in', 'out-1', mohm]]),
    })
  const mesh = powerOf(
    powerDocument(
      { T1: 'supply', W1: 'stub-10', W2: 'stub-30', U1: 'backplane-2', E1: 'two', E2: 'four' },
      [
        'T1.s1 W1.in',
        'T1.s2 W2.in',
        'W1.out-1 U1.power-1',
        'W2.out-1 U1.power-2',
        'U1.bay-1 E1.power',
        'U1.bay-2 E2.power',
      ],
      {
        models: [
          backplane,
          stub('stub-10', 10),
          stub('stub-30', 30),
          steadyLoad('two', { '12V': 2 }),
          steadyLoad('four', { '12V': 4 }),
        ],
      },
    ),
  )

  it('shares between the inlets by resistance, to 1e-9', () => {
    // The ring of the solver's own test: drops of 0.11/3 V and 0.07 V at the inlets, 11/3 A and 7/3 A through the leads.
    expect(mesh.current(1, '12V', 'at-rest')).toBeCloseTo(11 / 3, 9)
    expect(mesh.current(2, '12V', 'at-rest')).toBeCloseTo(7 / 3, 9)
    expect(mesh.conductor('U1', 'power-1', 'power-2', '12V').current_A[5]).toBeCloseTo(5 / 3, 9)
    expect(mesh.voltage('E1', '12V', 'at-rest')).toBeCloseTo(12 - 2 * (0.11 / 3 + 0.01), 9)
    expect(mesh.voltage('E2', '12V', 'at-rest')).toBeCloseTo(12 - 2 * (0.07 + 0.02), 9)
  })

  it('is one source fed twice, not two sources joined', () => {
    expect(mesh.power.problems).toEqual([])
  })

  it('splits the whole drop of a device behind a loop', () => {
    const { wire, contact, return: back } = mesh.drop('E1', '12V', 'at-rest')
    expect(wire + contact + back).toBeCloseTo(12 - mesh.voltage('E1', '12V', 'at-rest'), 9)
  })

  it('knows what hangs on the loop', () => {
    const behind = mesh.power.behind('12V', mesh.contact(1, '12V').branch)
    expect(behind.map(({ part }) => part.part.ref).sort()).toEqual(['E1', 'E2'])
    const single = mesh.power.behind('12V', mesh.contact(5, '12V').branch)
    expect(single.map(({ part }) => part.part.ref)).toEqual(['E1'])
  })
})

describe('where a device draws', () => {
  const board = (extra: object = {}) =>
    model('board', {
      kind: 'board',
      connectors: [
        connector('main', 'bare-plug'),
        connector('aux', 'bare-plug'),
        connector('slot-1', 'bare-receptacle'),
      ],
      wiring: planes([['main', 'slot-1', 1]]),
      load: { '12V': { rest_A: { value: 6, origin: 'maker' }, scan_A: { value: 6, origin: 'maker' } } },
      ...extra,
    })
  const placed = (extra: object, joints: readonly string[]) =>
    powerOf(
      powerDocument({ T1: 'supply', K1: 'board', E1: 'one' }, joints, {
        models: [board(extra), steadyLoad('one', { '12V': 1 })],
      }),
    )

  it('shares between the inlets that are fed, by what their contacts may carry', () => {
    const both = placed({}, ['T1.s1 K1.main', 'T1.s2 K1.aux', 'K1.slot-1 E1.power'])
    expect(both.current(1, '12V', 'at-rest')).toBeCloseTo(3 + 1, 12)
    expect(both.current(2, '12V', 'at-rest')).toBeCloseTo(3, 12)
    const one = placed({}, ['T1.s1 K1.main', 'K1.slot-1 E1.power'])
    expect(one.current(1, '12V', 'at-rest')).toBeCloseTo(6 + 1, 12)
  })

  it('draws where the model says', () => {
    const named = placed({ loadAt: { '12V': 'aux' } }, ['T1.s1 K1.main', 'T1.s2 K1.aux', 'K1.slot-1 E1.power'])
    expect(named.current(1, '12V', 'at-rest')).toBeCloseTo(1, 12)
    expect(named.current(2, '12V', 'at-rest')).toBeCloseTo(6, 12)
  })

  it('passes a card through the board to its slot', () => {
    const { contact } = placed({}, ['T1.s1 K1.main', 'K1.slot-1 E1.power'])
    expect(contact(2, '12V').current_A[5]).toBeCloseTo(1, 12)
  })
})

describe('the supply', () => {
  it('counts no drop in its own leads where its tolerance holds at their end, but keeps their currents', () => {
    const captive = (toleranceAt: 'lead-end' | 'socket') => {
      const made = supply('captive', {
        sockets: 1,
        extra: {
          connectors: [
            connector('l1-1', 'bare-receptacle', { feeds: { '12V': '12V', '5V': '5V', '3.3V': '3.3V' } }),
            connector('l1-2', 'bare-receptacle'),
          ],
          wiring: planes([['l1-1', 'l1-2', 50]]),
        },
      })
      const own = { ...made, supply: { ...made.supply!, toleranceAt } }
      return powerOf(
        powerDocument({ T1: 'captive', E1: 'two', E2: 'two' }, ['T1.l1-1 E1.power', 'T1.l1-2 E2.power'], {
          models: [own, steadyLoad('two', { '12V': 2 })],
        }),
      )
    }
    const atEnd = captive('lead-end')
    expect(atEnd.voltage('E2', '12V', 'at-rest')).toBeCloseTo(12, 12)
    expect(atEnd.conductor('T1', 'l1-1', 'l1-2', '12V').current_A[5]).toBeCloseTo(2, 12)
    expect(atEnd.rail('12V', 'at-rest')).toBeCloseTo(4, 12)
    expect(captive('socket').voltage('E2', '12V', 'at-rest')).toBeCloseTo(12 - 0.2, 12)
  })

  it('stands at its set point', () => {
    const set = powerOf(
      powerDocument({ T1: 'warm', E1: 'two' }, ['T1.s1 E1.power'], {
        models: [supply('warm', { setPoints: { '12V': 12.2 } }), steadyLoad('two', { '12V': 2 })],
      }),
    )
    expect(set.voltage('E1', '12V', 'at-rest')).toBeCloseTo(12.2, 12)
  })
})

describe('what the network cannot be', () => {
  const two = steadyLoad('two', { '12V': 2 })

  it('names supplies tied together and shares their current', () => {
    const tied = powerOf(
      powerDocument(
        { T1: 'supply', T2: 'supply', U1: 'tie', E1: 'two' },
        ['T1.s1 U1.in-1', 'T2.s1 U1.in-2', 'U1.out-1 E1.power'],
        {
          models: [
            two,
            model('tie', {
              kind: 'backplane',
              connectors: [
                connector('in-1', 'bare-plug'),
                connector('in-2', 'bare-plug'),
                connector('out-1', 'bare-receptacle'),
              ],
              wiring: planes([
                ['in-1', 'out-1', 10],
                ['in-2', 'out-1', 30],
              ]),
            }),
          ],
        },
      ),
    )
    expect(tied.power.problems.filter(({ kind }) => kind === 'sources-joined')).toHaveLength(3)
    expect(tied.current(1, '12V', 'at-rest')).toBeCloseTo(1.5, 9)
    expect(tied.current(2, '12V', 'at-rest')).toBeCloseTo(0.5, 9)
  })

  it('names a loop without resistance', () => {
    const loop = powerOf(
      powerDocument({ T1: 'supply', U1: 'tie', E1: 'two' }, ['T1.s1 U1.in-1', 'T1.s2 U1.in-2', 'U1.out-1 E1.power'], {
        models: [
          two,
          model('tie', {
            kind: 'backplane',
            connectors: [
              connector('in-1', 'bare-plug'),
              connector('in-2', 'bare-plug'),
              connector('out-1', 'bare-receptacle'),
            ],
            wiring: planes([
              ['in-1', 'out-1', 0],
              ['in-2', 'out-1', 0],
            ]),
          }),
        ],
      }),
    )
    expect(loop.power.problems.some(({ kind }) => kind === 'indeterminate-loop')).toBe(true)
    expect(loop.current(1, '12V', 'at-rest')).toBeCloseTo(1, 9)
    expect(allNumbers(loop.power).every(Number.isFinite)).toBe(true)
  })

  it('draws nothing where the return is missing, and says so', () => {
    const cut = powerOf(
      powerDocument({ T1: 'supply', W1: 'no-return', E1: 'two' }, ['T1.s1 W1.in', 'W1.out-1 E1.power'], {
        models: [
          two,
          model('no-return', {
            kind: 'lead',
            connectors: [connector('in', 'bare-plug'), connector('out-1', 'bare-receptacle')],
            wiring: planes([['in', 'out-1', 10]], ['12V']),
          }),
        ],
      }),
    )
    expect(cut.power.problems).toMatchObject([{ kind: 'no-return', line: '12V' }])
    expect(cut.rail('12V', 'at-rest')).toBe(0)
    expect(cut.device('E1', '12V').fedBy).toEqual([])
  })

  it('takes a build of nothing', () => {
    const { power } = powerOf(powerDocument({}))
    expect(power.contacts).toEqual([])
    expect([...power.applies]).toEqual(['full-scan', 'at-rest'])
  })
})

describe('unknown figures', () => {
  const drawing = (start: object, more: object = {}) =>
    powerOf(
      powerDocument({ T1: 'supply', W1: 'lead', C1: 'unsure' }, ['T1.s1 W1.supply', 'W1.out-1 C1.plug'], {
        models: [motorDrive('unsure', { start_A: { value: null, origin: 'class default', ...start }, ...more })],
      }),
    )

  it('take their own high end', () => {
    const own = drawing({ low: 1, high: 2.4 })
    expect(own.current(2, '12V', 'cold-start')).toBeCloseTo(2.4, 12)
    expect(own.contact(2, '12V').about).toBe(true)
    expect(own.contact(2, '12V').range_A.low[0]).toBeCloseTo(1, 12)
    expect(own.contact(1, '5V').about).toBe(false)
  })

  it('else take a stated worst, never zero', () => {
    expect(drawing({}).current(2, '12V', 'cold-start')).toBeCloseTo(3, 12)
  })

  it('else take their class', () => {
    const ofClass = drawing(
      { high: 2 },
      { scan_A: [{ value: null, origin: 'class default' }, 0.5], extra: { class: 'hungry' } },
    )
    expect(ofClass.current(2, '12V', 'full-scan')).toBeCloseTo(1.4, 12)
  })

  it('leave what does not rest on them alone', () => {
    const mixed = powerOf(
      powerDocument(
        { T1: 'supply', W1: 'lead', C1: 'drive', C2: 'unsure' },
        ['T1.s1 W1.supply', 'W1.out-1 C1.plug', 'W1.out-2 C2.plug'],
        {
          models: [motorDrive('unsure', { start_A: { value: null, high: 2, origin: 'class default' } })],
        },
      ),
    )
    expect(mixed.contact(2, '12V').about).toBe(false)
    expect(mixed.contact(3, '12V').about).toBe(true)
    expect(mixed.contact(1, '12V').about).toBe(true)
  })
})
