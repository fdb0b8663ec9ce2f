import fc from 'fast-check'
import { planNetwork } from '#shared/electrical/solve/plan.ts'
import { evenColumns, solveNetwork, type Solution } from '#shared/electrical/solve/solve.ts'
import type { Plan } from '#shared/electrical/solve/plan.ts'
import type { PlainNetwork } from './ngspice.ts'

const ohms = fc.integer({ min: 1, max: 200_000 }).map((tenthsOfMicroohm) => tenthsOfMicroohm / 1e6)
const amperes = fc.integer({ min: 0, max: 3000 }).map((milliampere) => milliampere / 1000)

export interface Shape {
  maxNodes: number
  /** Branches beyond those of a tree. */
  maxChords: number
  maxHeld?: number
}

/** Connected networks: a random tree, chords that close loops, one held node or more. */
export const connectedNetwork = ({ maxNodes, maxChords, maxHeld = 1 }: Shape): fc.Arbitrary<PlainNetwork> =>
  fc
    .integer({ min: 2, max: maxNodes })
    .chain((nodes) =>
      fc.record({
        nodes: fc.constant(nodes),
        parents: fc.tuple(...Array.from({ length: nodes - 1 }, (_, i) => fc.nat({ max: i }))),
        treeOhms: fc.array(ohms, { minLength: nodes - 1, maxLength: nodes - 1 }),
        chords: fc.array(fc.tuple(fc.nat({ max: nodes - 1 }), fc.nat({ max: nodes - 1 }), ohms), {
          maxLength: maxChords,
        }),
        draw_A: fc.array(amperes, { minLength: nodes, maxLength: nodes }),
        others: fc.array(
          fc.tuple(
            fc.nat({ max: nodes - 1 }),
            fc.integer({ min: 1190, max: 1210 }).map((hundredths) => hundredths / 100),
          ),
          { maxLength: maxHeld - 1 },
        ),
      }),
    )
    .map(({ nodes, parents, treeOhms, chords, draw_A, others }) => ({
      nodes,
      branches: [
        ...parents.map((parent, i) => ({ from: parent, to: i + 1, ohm: treeOhms[i]! })),
        ...chords.filter(([from, to]) => from !== to).map(([from, to, ohm]) => ({ from, to, ohm })),
      ],
      held: new Map([[0, 12], ...others]),
      draw_A,
    }))

/** Anything at all: floating pieces, branches without resistance, branches from a node to itself, no source. */
export const wildNetwork: fc.Arbitrary<PlainNetwork> = fc.integer({ min: 1, max: 12 }).chain((nodes) =>
  fc.record({
    nodes: fc.constant(nodes),
    branches: fc.array(
      fc.record({
        from: fc.nat({ max: nodes - 1 }),
        to: fc.nat({ max: nodes - 1 }),
        ohm: fc.oneof(fc.constant(0), ohms),
      }),
      { maxLength: 24 },
    ),
    held: fc
      .array(fc.tuple(fc.nat({ max: nodes - 1 }), fc.constantFrom(12, 12, 12.1)), { maxLength: 3 })
      .map((entries) => new Map(entries)),
    draw_A: fc.array(amperes, { minLength: nodes, maxLength: nodes }),
  }),
)

export interface Solved {
  plan: Plan
  solution: Solution
  /** Current drawn at each node, none where nothing reaches. */
  drawn_A: number[]
}

/** Solves a plain network with one column. */
export function solvePlain({ nodes, branches, held, draw_A }: PlainNetwork): Solved {
  const plan = planNetwork({
    nodes,
    from: Int32Array.from(branches, ({ from }) => from),
    to: Int32Array.from(branches, ({ to }) => to),
    held: Uint8Array.from({ length: nodes }, (_, node) => (held.has(node) ? 1 : 0)),
  })
  const held_V = Float64Array.from({ length: nodes }, (_, node) => held.get(node) ?? 0)
  const ohm = Float64Array.from(branches, (branch) => branch.ohm)
  const solution = solveNetwork(plan, evenColumns(plan, 1), ohm, held_V, Float64Array.from(draw_A))
  return { plan, solution, drawn_A: draw_A.map((ampere, node) => (plan.reached[node] === 1 ? ampere : 0)) }
}
