import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { planNetwork } from '#shared/electrical/solve/plan.ts'
import { columnsOf, solveNetwork } from '#shared/electrical/solve/solve.ts'
import type { PlainNetwork } from '../../../helpers/ngspice.ts'
import { connectedNetwork, solvePlain, wildNetwork, type Solved } from '../../../helpers/randomNetworks.ts'

const network = (
  nodes: number,
  branches: readonly (readonly [from: number, to: number, ohm: number])[],
  draw_A: readonly number[],
  held: ReadonlyMap<number, number> = new Map([[0, 12]]),
): PlainNetwork => ({ nodes, branches: branches.map(([from, to, ohm]) => ({ from, to, ohm })), held, draw_A })

const expectVoltages = ({ solution }: Solved, wanted: readonly number[]) =>
  wanted.forEach((volts, node) => expect(solution.voltage_V[node]).toBeCloseTo(volts, 11))
const expectCurrents = ({ solution }: Solved, wanted: readonly number[]) =>
  wanted.forEach((amperes, branch) => expect(solution.current_A[branch]).toBeCloseTo(amperes, 11))

/** What flows in equals what is drawn, at every free node; returns the largest difference. */
function imbalance({ plan, solution, drawn_A }: Solved): number {
  const sum = drawn_A.map((ampere) => -ampere)
  solution.current_A.forEach((ampere, branch) => {
    sum[plan.to[branch]!]! += ampere
    sum[plan.from[branch]!]! -= ampere
  })
  return Math.max(0, ...sum.filter((_, node) => plan.held[node] === 0).map(Math.abs))
}

describe('networks worked out by hand', () => {
  it('solves a ladder', () => {
    // 12 V - 0.010 - [2 A] - 0.020 - [3 A] - 0.030 - [1 A]: 6 A, 4 A and 1 A fall on the three stretches.
    const solved = solvePlain(
      network(
        4,
        [
          [0, 1, 0.01],
          [1, 2, 0.02],
          [2, 3, 0.03],
        ],
        [0, 2, 3, 1],
      ),
    )
    expectCurrents(solved, [6, 4, 1])
    expectVoltages(solved, [12, 11.94, 11.86, 11.83])
  })

  it('gives the same whichever way a branch is drawn', () => {
    const solved = solvePlain(
      network(
        3,
        [
          [1, 0, 0.01],
          [2, 1, 0.02],
        ],
        [0, 2, 3],
      ),
    )
    expectCurrents(solved, [-5, -3])
    expectVoltages(solved, [12, 11.95, 11.89])
  })

  it('solves a ring', () => {
    // 12 V feeds node 1 through 0.01 and node 2 through 0.03; 0.02 joins them; 2 A and 4 A are drawn. The drops a, b
    // follow from a/0.01 = 2 + (b - a)/0.02 and b/0.03 + (b - a)/0.02 = 4: b = 0.07, a = 0.11/3.
    const solved = solvePlain(
      network(
        3,
        [
          [0, 1, 0.01],
          [1, 2, 0.02],
          [0, 2, 0.03],
        ],
        [0, 2, 4],
      ),
    )
    expectVoltages(solved, [12, 12 - 0.11 / 3, 11.93])
    expectCurrents(solved, [11 / 3, 5 / 3, 7 / 3])
  })

  it('solves an unbalanced bridge', () => {
    // A source of 10 V, arms of 1 and 2 ohm, 3 and 1 ohm, a bridge of 4 ohm, sink node held at 0 V.
    // Nodes a, b: a(1 + 1/2 + 1/4) - b/4 = 10 and b(1/3 + 1 + 1/4) - a/4 = 10/3, so a = 80/13, b = 40/13.
    const solved = solvePlain(
      network(
        4,
        [
          [0, 1, 1],
          [1, 3, 2],
          [0, 2, 3],
          [2, 3, 1],
          [1, 2, 4],
        ],
        [0, 0, 0, 0],
        new Map([
          [0, 10],
          [3, 0],
        ]),
      ),
    )
    expectVoltages(solved, [10, 80 / 13, 40 / 13, 0])
    expectCurrents(solved, [50 / 13, 40 / 13, 30 / 13, 40 / 13, 10 / 13])
  })

  it('shares between two sources by resistance', () => {
    // 12 V through 0.01 and 12 V through 0.03 feed 4 A: 3 A and 1 A.
    const solved = solvePlain(
      network(
        3,
        [
          [0, 2, 0.01],
          [1, 2, 0.03],
        ],
        [0, 0, 4],
        new Map([
          [0, 12],
          [1, 12],
        ]),
      ),
    )
    expectCurrents(solved, [3, 1])
    expectVoltages(solved, [12, 12, 11.97])
  })

  it('shares between equal wires in parallel', () => {
    const solved = solvePlain(
      network(
        2,
        [
          [0, 1, 0.02],
          [0, 1, 0.02],
        ],
        [0, 4],
      ),
    )
    expectCurrents(solved, [2, 2])
    expectVoltages(solved, [12, 11.96])
  })
})

describe('degenerate networks', () => {
  it('passes currents through branches without resistance', () => {
    const solved = solvePlain(
      network(
        4,
        [
          [0, 1, 0],
          [1, 2, 0.01],
          [1, 3, 0],
        ],
        [0, 1, 2, 3],
      ),
    )
    expectCurrents(solved, [6, 2, 3])
    expectVoltages(solved, [12, 12, 11.98, 12])
    expect(solved.solution.loops).toEqual([])
  })

  it('finds currents of bare branches inside a loop that has resistance elsewhere', () => {
    // Two ways of 0.01 ohm join at node 3 over bare branches from 1 and 2.
    const solved = solvePlain(
      network(
        4,
        [
          [0, 1, 0.01],
          [0, 2, 0.01],
          [1, 3, 0],
          [2, 3, 0],
        ],
        [0, 0, 1, 3],
      ),
    )
    expectCurrents(solved, [2, 2, 2, 1])
    expect(solved.solution.loops).toEqual([])
  })

  it('names a loop without resistance and shares it alike', () => {
    const solved = solvePlain(
      network(
        3,
        [
          [0, 1, 0],
          [0, 2, 0],
          [1, 2, 0],
        ],
        [0, 3, 3],
      ),
    )
    expectCurrents(solved, [3, 3, 0])
    expect(solved.solution.loops).toEqual([[0, 1, 2]])
  })

  it('names sources of different voltage that meet without resistance, and stays finite', () => {
    const solved = solvePlain(
      network(
        3,
        [
          [0, 1, 0],
          [1, 2, 0.01],
        ],
        [0, 0, 2],
        new Map([
          [0, 12],
          [1, 12.2],
        ]),
      ),
    )
    expectVoltages(solved, [12, 12.2, 12.18])
    expect(solved.solution.loops).toEqual([[0]])
  })

  it('leaves what nothing reaches without current', () => {
    const solved = solvePlain(
      network(
        5,
        [
          [0, 1, 0.01],
          [2, 3, 0.01],
          [3, 4, 0.01],
          [4, 2, 0.01],
        ],
        [0, 1, 1, 1, 1],
      ),
    )
    expectCurrents(solved, [1, 0, 0, 0])
    expect([...solved.plan.reached]).toEqual([1, 1, 0, 0, 0])
  })

  it('takes a network without branches or nodes', () => {
    expect(solvePlain(network(1, [], [1], new Map())).solution.voltage_V).toEqual(Float64Array.of(0))
    expect(solvePlain(network(0, [], [], new Map())).solution.voltage_V).toHaveLength(0)
  })

  it('ignores a branch from a node to itself', () => {
    const solved = solvePlain(
      network(
        2,
        [
          [0, 1, 0.01],
          [1, 1, 0.01],
          [1, 1, 0],
        ],
        [0, 1],
      ),
    )
    expectCurrents(solved, [1, 0, 0])
  })
})

describe('columns', () => {
  it('solves several cases at once, with widths that differ between pieces', () => {
    // Two leads on one source: the first has two columns, the second three.
    const plan = planNetwork({
      nodes: 3,
      from: Int32Array.of(0, 0),
      to: Int32Array.of(1, 2),
      held: Uint8Array.of(1, 0, 0),
    })
    const columns = columnsOf(plan, Int32Array.of(0, 0, 2, 5))
    const solution = solveNetwork(
      plan,
      columns,
      Float64Array.of(0.01, 0.1),
      Float64Array.of(12, 0, 0),
      Float64Array.of(1, 2, 1, 2, 3),
    )
    expect([...columns.branch]).toEqual([0, 2, 5])
    expect([...solution.current_A]).toEqual([1, 2, 1, 2, 3])
    ;[11.99, 11.98, 11.9, 11.8, 11.7].forEach((volts, i) => expect(solution.voltage_V[i]).toBeCloseTo(volts, 12))
  })
})

describe('any network', () => {
  const runs = { numRuns: 150 }

  it('keeps Kirchhoff at every node, radial and meshed', () => {
    fc.assert(
      fc.property(connectedNetwork({ maxNodes: 60, maxChords: 20, maxHeld: 3 }), (any) => {
        expect(imbalance(solvePlain(any))).toBeLessThan(1e-8)
      }),
      runs,
    )
  })

  it('keeps Kirchhoff and stays finite whatever is joined', () => {
    fc.assert(
      fc.property(wildNetwork, (any) => {
        const solved = solvePlain(any)
        expect(solved.solution.voltage_V.every(Number.isFinite)).toBe(true)
        expect(solved.solution.current_A.every(Number.isFinite)).toBe(true)
        expect(imbalance(solved)).toBeLessThan(1e-6)
      }),
      { numRuns: 1000 },
    )
  })

  it('obeys Ohm on every branch', () => {
    fc.assert(
      fc.property(connectedNetwork({ maxNodes: 40, maxChords: 10, maxHeld: 2 }), (any) => {
        const { solution } = solvePlain(any)
        any.branches.forEach(({ from, to, ohm }, i) =>
          expect(solution.voltage_V[from]! - solution.voltage_V[to]!).toBeCloseTo(ohm * solution.current_A[i]!, 9),
        )
      }),
      runs,
    )
  })

  it('is the same network however nodes and branches are numbered', () => {
    fc.assert(
      fc.property(
        connectedNetwork({ maxNodes: 25, maxChords: 8, maxHeld: 2 }),
        fc.infiniteStream(fc.nat()),
        (any, stream) => {
          const order = shuffled(any.nodes, stream)
          const branchOrder = shuffled(any.branches.length, stream)
          const draw_A = new Array<number>(any.nodes)
          any.draw_A.forEach((ampere, node) => (draw_A[order[node]!] = ampere))
          const renumbered: PlainNetwork = {
            nodes: any.nodes,
            branches: branchOrder.map((i) => {
              const { from, to, ohm } = any.branches[i]!
              return { from: order[from]!, to: order[to]!, ohm }
            }),
            held: new Map([...any.held].map(([node, volts]) => [order[node]!, volts])),
            draw_A,
          }
          const one = solvePlain(any).solution
          const other = solvePlain(renumbered).solution
          for (let node = 0; node < any.nodes; node++)
            expect(other.voltage_V[order[node]!]).toBeCloseTo(one.voltage_V[node]!, 9)
        },
      ),
      runs,
    )
  })

  it('never lowers a current upstream when more is drawn', () => {
    fc.assert(
      fc.property(connectedNetwork({ maxNodes: 40, maxChords: 0 }), fc.nat(), (any, pick) => {
        const more = [...any.draw_A]
        more[pick % any.nodes]! += 1
        const before = solvePlain(any).solution.current_A
        const after = solvePlain({ ...any, draw_A: more }).solution.current_A
        after.forEach((ampere, i) => expect(Math.abs(ampere)).toBeGreaterThanOrEqual(Math.abs(before[i]!) - 1e-12))
      }),
      runs,
    )
  })
})

function shuffled(count: number, stream: fc.Stream<number>): number[] {
  const order = Array.from({ length: count }, (_, i) => i)
  for (let i = count - 1; i > 0; i--) {
    const j = stream.next().value % (i + 1)
    ;[order[i], order[j]] = [order[j]!, order[i]!]
  }
  return order
}
